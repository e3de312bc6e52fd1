using Dapper;
using Portfolio.Store.Access;

namespace Portfolio.Store.Runs;

/// <summary>Reading runs and the points of the series.</summary>
public sealed class RunStore(Database database)
{
    private static readonly string Visible = $"r.portfolio = @Portfolio and {Granted.Some(Right.Read, "r.portfolio")}";

    private static readonly string FindSql = $"select {RunRow.Columns} from run r where r.id = @Run and {Visible}";

    /// <summary>One run; null when the caller may not see it.</summary>
    public Task<StoredRun?> FindAsync(Caller caller, string portfolio, string run, CancellationToken cancellation) =>
        FirstAsync(FindSql, caller, portfolio, new { Run = run }, cancellation);

    internal static Task<RunRow?> FindAsync(StoreTransaction open, Caller caller, string portfolio, string run) =>
        open.FirstAsync<RunRow>(FindSql, new { Caller = caller.KeyId, open.Now, Portfolio = portfolio, Run = run });

    private static readonly string ListSql = $"""
        select {RunRow.Columns} from run r where (@Before is null or r.sequence < @Before) and {Visible}
        order by r.sequence desc limit @Limit
        """;

    /// <summary>Runs, newest first, with sequence numbers below <paramref name="before"/> (null: from the newest).</summary>
    public Task<IReadOnlyList<StoredRun>> ListAsync(
        Caller caller, string portfolio, long? before, int limit, CancellationToken cancellation) =>
        ListAsync(ListSql, caller, portfolio, new { Before = before, Limit = limit }, cancellation);

    private static readonly string PointSql = $"""
        select {RunRow.Columns} from series_point s join run r on r.id = s.run
        where s.portfolio = @Portfolio and (@AsOf is null or s.as_of <= @AsOf) and {Visible}
        order by s.as_of desc limit 1
        """;

    /// <summary>The point with the greatest date.</summary>
    public Task<StoredRun?> FindLatestAsync(Caller caller, string portfolio, CancellationToken cancellation) =>
        FirstAsync(PointSql, caller, portfolio, new { AsOf = (string?)null }, cancellation);

    /// <summary>The point of a date, or of the nearest earlier one.</summary>
    public Task<StoredRun?> FindPointAsync(Caller caller, string portfolio, DateOnly asOf, CancellationToken cancellation) =>
        FirstAsync(PointSql, caller, portfolio, new { AsOf = asOf.ToText() }, cancellation);

    private static readonly string PointsSql = $"""
        select {RunRow.Columns} from series_point s join run r on r.id = s.run
        where s.portfolio = @Portfolio and (@From is null or s.as_of >= @From) and (@To is null or s.as_of <= @To) and {Visible}
        order by s.as_of
        """;

    /// <summary>Points in date order between two dates (both included; null: open).</summary>
    public Task<IReadOnlyList<StoredRun>> ListPointsAsync(
        Caller caller, string portfolio, DateOnly? from, DateOnly? to, CancellationToken cancellation) =>
        ListAsync(PointsSql, caller, portfolio, new { From = from?.ToText(), To = to?.ToText() }, cancellation);

    private static readonly string DigestsSql = $"""
        select r.result_digest from series_point s join run r on r.id = s.run
        where s.portfolio = @Portfolio and s.as_of < @Before and {Visible}
        order by s.as_of
        """;

    /// <summary>The result digests of the points before a date, in date order: two that are equal had the same figures.</summary>
    public Task<List<string>> ListDigestsAsync(Caller caller, string portfolio, DateOnly before, CancellationToken cancellation) =>
        database.ReadAsync(
            open => open.ListAsync<string>(DigestsSql, Asked(open, caller, portfolio, new { Before = before.ToText() })), cancellation);

    private static readonly string DueSql = $"""
        select {RunRow.Columns} from run r where r.due_date is not null and {Visible} order by r.due_date desc limit @Limit
        """;

    /// <summary>Scheduled runs, latest due date first.</summary>
    public Task<IReadOnlyList<StoredRun>> ListDueAsync(Caller caller, string portfolio, int limit, CancellationToken cancellation) =>
        ListAsync(DueSql, caller, portfolio, new { Limit = limit }, cancellation);

    private static readonly string QueuedSql =
        $"select count(*) from run r where r.state = 'queued' and {Granted.Some(Right.Read, "r.portfolio")}";

    /// <summary>How many runs wait, over all portfolios that the caller reads.</summary>
    public Task<int> CountQueuedAsync(Caller caller, CancellationToken cancellation) =>
        database.ReadAsync(open => open.FirstAsync<int>(QueuedSql, new { Caller = caller.KeyId, open.Now }), cancellation);

    private async Task<StoredRun?> FirstAsync(string sql, Caller caller, string portfolio, object more, CancellationToken cancellation) =>
        (await database.ReadAsync(open => open.FirstAsync<RunRow>(sql, Asked(open, caller, portfolio, more)), cancellation))?.ToRun();

    private async Task<IReadOnlyList<StoredRun>> ListAsync(
        string sql, Caller caller, string portfolio, object more, CancellationToken cancellation)
    {
        var rows = await database.ReadAsync(open => open.ListAsync<RunRow>(sql, Asked(open, caller, portfolio, more)), cancellation);
        return [.. rows.Select(row => row.ToRun())];
    }

    private static DynamicParameters Asked(StoreTransaction open, Caller caller, string portfolio, object more)
    {
        var asked = new DynamicParameters(more);
        asked.AddDynamicParams(new { Caller = caller.KeyId, open.Now, Portfolio = portfolio });
        return asked;
    }
}
