namespace Portfolio.Store.Runs;

/// <summary>
/// Which run stands for a date. While the date lasts, every recorded run may; the last one created before its end does. Afterwards the date
/// is closed: a run is taken only where none stands and none accepted earlier is under way, or in the place of the one that stands.
/// </summary>
internal static class SeriesDates
{
    private const string PointSql = "select run from series_point where portfolio = @Portfolio and as_of = @AsOf";

    private const string UnderWaySql = """
        select id from run where portfolio = @Portfolio and as_of = @AsOf and recorded = 1 and state in ('queued', 'running')
        order by sequence limit 1
        """;

    private const string ReplaceableSql =
        "select count(*) from run where id = @Replaces and portfolio = @Portfolio and as_of = @AsOf and recorded = 1";

    /// <summary>What stands in the way of a new recorded run; null when nothing does.</summary>
    public static async Task<(RunRequestOutcome Outcome, string? Run)?> ObstacleAsync(StoreTransaction open, NewRun run)
    {
        if (!run.Recorded)
            return run.Replaces is null ? null : (RunRequestOutcome.ReplacesUnknown, null);
        var asked = new { run.Portfolio, AsOf = run.AsOf.ToText(), run.Replaces };
        var point = await open.FirstAsync<string>(PointSql, asked);
        if (run.Replaces is not null && await open.FirstAsync<long>(ReplaceableSql, asked) == 0)
            return (RunRequestOutcome.ReplacesUnknown, null);
        if (run.Replaces is not null && run.Replaces != point)
            return (RunRequestOutcome.ReplacesNotThePoint, point);
        if (open.Now < run.DateEndsAt.ToMicroseconds())
            return null;
        var holder = await open.FirstAsync<string>(UnderWaySql, asked) ?? (run.Replaces is null ? point : null);
        return holder is null ? null : (RunRequestOutcome.DateHeld, holder);
    }

    private const string StandingSql = """
        select r.id, r.sequence from series_point s join run r on r.id = s.run where s.portfolio = @Portfolio and s.as_of = @AsOf
        """;

    private const string TakeSql = """
        insert into series_point (portfolio, as_of, run) values (@Portfolio, @AsOf, @Id)
        on conflict (portfolio, as_of) do update set run = excluded.run
        """;

    /// <summary>Makes a run that has just succeeded the point of its date, if it is its turn; says whether it was.</summary>
    public static async Task<bool> TakeAsync(StoreTransaction open, RunRow run)
    {
        if (run.Recorded == 0)
            return false;
        var standing = await open.FirstAsync<RunRow>(StandingSql, run);
        var createdInTime = run.QueuedAt < run.DateEndsAt;
        if (standing is not null && standing.Id != run.Replaces && !(createdInTime && standing.Sequence < run.Sequence))
            return false;
        await open.ExecuteAsync(TakeSql, run);
        return true;
    }
}
