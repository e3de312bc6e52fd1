using Portfolio.Store.Access;

namespace Portfolio.Store.Runs;

/// <summary>Asking for runs, and asking them to stop. Each answer is one transaction with its audit entry and outbox row.</summary>
public sealed partial class RunRequests(Database database)
{
    /// <summary>Queues a run that somebody asked for. Needs <see cref="Right.Manage"/>.</summary>
    /// <param name="joining">Called last inside the transaction, for rows that stand or fall with the request; null for none.</param>
    public Task<RunRequestResult> CreateAsync(
        Caller caller,
        NewRun run,
        Func<StoreTransaction, StoredRun, CancellationToken, Task>? joining,
        CancellationToken cancellation) => database.WriteAsync(
        async open =>
        {
            if (await TurnedAsync(open, caller, run) is { } turned)
                return new RunRequestResult(turned, null);
            if (await SeriesDates.ObstacleAsync(open, run) is { } obstacle)
                return new RunRequestResult(obstacle.Outcome, await ReadAsync(open, caller, run.Portfolio, obstacle.Run));
            if (run.MostQueued is { } most && await open.FirstAsync<long>(QueuedSql, new { run.Portfolio }) >= most)
                return new RunRequestResult(RunRequestOutcome.QueueFull, null);
            var made = await QueueAsync(open, caller, run, null);
            if (joining is not null)
                await joining(open, made, cancellation);
            return new RunRequestResult(RunRequestOutcome.Created, made);
        },
        cancellation);

    private const string QueuedSql = "select count(*) from run where portfolio = @Portfolio and state = 'queued'";

    private const string DueSql = "select id from run where portfolio = @Portfolio and due_date = @DueDate";

    /// <summary>
    /// Queues the one run of a due date; a second time it returns the first. When the date is closed and held already the run is made all
    /// the same, but not recorded.
    /// </summary>
    public Task<RunRequestResult> CreateDueAsync(
        Caller caller, NewRun run, DateOnly dueDate, CancellationToken cancellation) => database.WriteAsync(
        async open =>
        {
            if (await TurnedAsync(open, caller, run) is { } turned)
                return new RunRequestResult(turned, null);
            if (await open.FirstAsync<string>(DueSql, new { run.Portfolio, DueDate = dueDate.ToText() }) is { } first)
                return new RunRequestResult(RunRequestOutcome.AlreadyDue, await ReadAsync(open, caller, run.Portfolio, first));
            var free = await SeriesDates.ObstacleAsync(open, run) is null;
            var made = await QueueAsync(open, caller, run with { Recorded = run.Recorded && free, Replaces = null }, dueDate);
            return new RunRequestResult(RunRequestOutcome.Created, made);
        },
        cancellation);

    private const string RevisionSql = "select count(*) from revision where portfolio = @Portfolio and number = @Revision";

    private static async Task<RunRequestOutcome?> TurnedAsync(StoreTransaction open, Caller caller, NewRun run)
    {
        var standing = await Standing.ReadAsync(open, caller, Right.Manage, run.Portfolio);
        if (!standing.Exists || !standing.Known)
            return RunRequestOutcome.NotFound;
        if (!standing.Whole)
            return RunRequestOutcome.Forbidden;
        if (standing.Archived)
            return RunRequestOutcome.Archived;
        return await open.FirstAsync<long>(RevisionSql, new { run.Portfolio, run.Revision }) == 0 ? RunRequestOutcome.NotFound : null;
    }

    private const string InsertSql = """
        insert into run (id, sequence, portfolio, kind, recorded, as_of, date_ends_at, revision, overlay, seed, iterations, replaces,
          due_date, state, trace_parent, queued_at, requested_by)
        select @Id, coalesce(max(sequence), 0) + 1, @Portfolio, @Kind, @Recorded, @AsOf, @DateEndsAt, @Revision, @Overlay, @Seed,
          @Iterations, @Replaces, @DueDate, 'queued', @TraceParent, @Now, @Caller from run
        """;

    private static async Task<StoredRun> QueueAsync(StoreTransaction open, Caller caller, NewRun run, DateOnly? dueDate)
    {
        var id = Guid.CreateVersion7(open.Now.ToInstant()).ToString();
        await open.ExecuteAsync(InsertSql, new
        {
            Id = id,
            run.Portfolio,
            Kind = dueDate is null ? "request" : "nightly",
            Recorded = run.Recorded ? 1 : 0,
            AsOf = run.AsOf.ToText(),
            DateEndsAt = run.DateEndsAt.ToMicroseconds(),
            run.Revision,
            run.Overlay,
            run.Seed,
            run.Iterations,
            run.Replaces,
            DueDate = dueDate?.ToText(),
            run.TraceParent,
            open.Now,
            Caller = caller.KeyId,
        });
        var detail = new { run.AsOf, run.Revision, run.Seed, run.Iterations, run.Recorded, run.Replaces, dueDate };
        await RunEvents.TellAsync(open, caller, run.Portfolio, id, "queued", detail);
        return (await ReadAsync(open, caller, run.Portfolio, id))!;
    }

    private static async Task<StoredRun?> ReadAsync(StoreTransaction open, Caller caller, string portfolio, string? run) =>
        run is null ? null : (await RunStore.FindAsync(open, caller, portfolio, run))?.ToRun();
}
