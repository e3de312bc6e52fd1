using Portfolio.Store.Access;
using Portfolio.Store.Audit;

namespace Portfolio.Store.Schedules;

/// <summary>When a portfolio is run by itself.</summary>
public sealed record StoredSchedule
{
    public required string Portfolio { get; init; }
    /// <summary>Five fields, read in the portfolio's time zone.</summary>
    public required string Cron { get; init; }
    /// <summary>Null: as in the settings.</summary>
    public int? Iterations { get; init; }
    public required bool Enabled { get; init; }
    /// <summary>When it was last set: instants before it are not missed ones.</summary>
    public required DateTimeOffset ChangedAt { get; init; }
}

/// <summary>How setting a schedule ended.</summary>
public enum SchedulePutOutcome
{
    Stored,
    Unchanged,
    NotFound,
    Forbidden,
    Archived,
}

/// <summary>The answer, with the schedule as it stands; null when it was not set.</summary>
public sealed record SchedulePutResult(SchedulePutOutcome Outcome, StoredSchedule? Schedule);

/// <summary>Schedules, one to a portfolio.</summary>
public sealed class ScheduleStore(Database database)
{
    private const string Columns = "s.portfolio, s.cron, s.iterations, s.enabled, s.changed_at";

    private static readonly string FindSql =
        $"select {Columns} from schedule s where s.portfolio = @Portfolio and {Granted.Some(Right.Read, "s.portfolio")}";

    public async Task<StoredSchedule?> FindAsync(Caller caller, string portfolio, CancellationToken cancellation) =>
        (await database.ReadAsync(open => FindAsync(open, caller, portfolio), cancellation))?.ToSchedule();

    private static Task<Row?> FindAsync(StoreTransaction open, Caller caller, string portfolio) =>
        open.FirstAsync<Row>(FindSql, new { Caller = caller.KeyId, open.Now, Portfolio = portfolio });

    private const string PutSql = """
        insert into schedule (portfolio, cron, iterations, enabled, changed_at)
        values (@Portfolio, @Cron, @Iterations, @Enabled, @ChangedAt)
        on conflict (portfolio) do update
          set cron = excluded.cron, iterations = excluded.iterations, enabled = excluded.enabled, changed_at = excluded.changed_at
        """;

    /// <summary>Sets the schedule, with an audit entry. Needs <see cref="Right.Manage"/>.</summary>
    /// <param name="joining">Called last inside the transaction, for rows that stand or fall with the schedule; null for none.</param>
    public Task<SchedulePutResult> PutAsync(
        Caller caller, string portfolio, string cron, int? iterations, bool enabled,
        Func<StoreTransaction, StoredSchedule, CancellationToken, Task>? joining, CancellationToken cancellation) => database.WriteAsync(
        async open =>
        {
            if (Turned(await Standing.ReadAsync(open, caller, Right.Manage, portfolio)) is { } turned)
                return new SchedulePutResult(turned, null);
            var old = await FindAsync(open, caller, portfolio);
            var flag = enabled ? 1 : 0;
            var row = new Row { Portfolio = portfolio, Cron = cron, Iterations = iterations, Enabled = flag, ChangedAt = open.Now };
            var unchanged = old is not null && old with { ChangedAt = row.ChangedAt } == row;
            if (!unchanged)
            {
                await open.ExecuteAsync(PutSql, row);
                await AuditChain.AppendAsync(
                    open, caller.KeyId, "schedule.put", $"portfolios/{portfolio}/schedule", new { cron, iterations, enabled });
            }
            var set = (unchanged ? old! : row).ToSchedule();
            if (joining is not null)
                await joining(open, set, cancellation);
            return new SchedulePutResult(unchanged ? SchedulePutOutcome.Unchanged : SchedulePutOutcome.Stored, set);
        },
        cancellation);

    private static SchedulePutOutcome? Turned(Standing standing) => standing switch
    {
        { Exists: false } or { Known: false } => SchedulePutOutcome.NotFound,
        { Whole: false } => SchedulePutOutcome.Forbidden,
        { Archived: true } => SchedulePutOutcome.Archived,
        _ => null,
    };

    private static readonly string EnabledSql = $"""
        select {Columns} from schedule s join portfolio p on p.id = s.portfolio
        where s.enabled = 1 and p.archived_at is null and {Granted.Whole(Right.Manage, "s.portfolio")}
        order by s.portfolio
        """;

    /// <summary>The enabled schedules of all portfolios that the caller manages and that are not archived.</summary>
    public async Task<IReadOnlyList<StoredSchedule>> ListEnabledAsync(Caller caller, CancellationToken cancellation)
    {
        var rows = await database.ReadAsync(open => open.ListAsync<Row>(EnabledSql, new { Caller = caller.KeyId, open.Now }), cancellation);
        return [.. rows.Select(row => row.ToSchedule())];
    }

    private sealed record Row
    {
        public string Portfolio { get; init; } = "";
        public string Cron { get; init; } = "";
        public long? Iterations { get; init; }
        public long Enabled { get; init; }
        public long ChangedAt { get; init; }

        public StoredSchedule ToSchedule() => new()
        {
            Portfolio = Portfolio,
            Cron = Cron,
            Iterations = (int?)Iterations,
            Enabled = Enabled == 1,
            ChangedAt = ChangedAt.ToInstant(),
        };
    }
}
