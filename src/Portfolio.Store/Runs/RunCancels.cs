using Portfolio.Store.Access;

namespace Portfolio.Store.Runs;

/// <summary>How asking a run to stop ended.</summary>
public enum RunCancelOutcome
{
    Accepted,
    NotFound,
    Forbidden,
    AlreadyEnded,
}

/// <summary>The answer, with the run as it is then; null when it was not found or is not the caller's to stop.</summary>
public sealed record RunCancelResult(RunCancelOutcome Outcome, StoredRun? Run);

/// <content>Asking runs to stop.</content>
public sealed partial class RunRequests
{
    private const string CancelSql = """
        update run set cancel_requested = 1,
          finished_at = case state when 'queued' then @Now end,
          state = case state when 'queued' then 'cancelled' else state end
        where id = @Id and cancel_requested = 0 and state in ('queued', 'running')
        """;

    /// <summary>
    /// Asks a run to stop: a queued one is cancelled at once, a running one by its worker. Needs <see cref="Right.Manage"/>.
    /// </summary>
    /// <param name="joining">Called last inside the transaction of an accepted request; null for none.</param>
    public Task<RunCancelResult> RequestCancelAsync(
        Caller caller, string portfolio, string run, Func<StoreTransaction, StoredRun, CancellationToken, Task>? joining,
        CancellationToken cancellation) => database.WriteAsync(
        async open =>
        {
            var result = await RequestCancelAsync(open, caller, portfolio, run);
            if (joining is not null && result is { Outcome: RunCancelOutcome.Accepted, Run: { } stopping })
                await joining(open, stopping, cancellation);
            return result;
        },
        cancellation);

    private static async Task<RunCancelResult> RequestCancelAsync(StoreTransaction open, Caller caller, string portfolio, string run)
    {
        var standing = await Standing.ReadAsync(open, caller, Right.Manage, portfolio);
        var row = await RunStore.FindAsync(open, caller, portfolio, run);
        if (row is null)
            return new RunCancelResult(
                standing is { Exists: true, Known: true, Whole: false } ? RunCancelOutcome.Forbidden : RunCancelOutcome.NotFound, null);
        if (!standing.Whole)
            return new RunCancelResult(RunCancelOutcome.Forbidden, null);
        if (row.FinishedAt is not null)
            return new RunCancelResult(RunCancelOutcome.AlreadyEnded, row.ToRun());
        if (await open.ExecuteAsync(CancelSql, new { row.Id, open.Now }) == 0)
            return new RunCancelResult(RunCancelOutcome.Accepted, row.ToRun());
        await RunEvents.TellAsync(
            open, caller, portfolio, run, row.State == "queued" ? "cancelled" : "cancel-requested", new { row.AsOf, row.Revision });
        return new RunCancelResult(RunCancelOutcome.Accepted, (await RunStore.FindAsync(open, caller, portfolio, run))!.ToRun());
    }
}
