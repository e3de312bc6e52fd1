using Portfolio.Store.Access;

namespace Portfolio.Store.Runs;

/// <summary>Stops whatever has not ended of a portfolio: queued runs at once, running ones by their workers.</summary>
internal static class OpenRuns
{
    private const string ListSql = """
        select id, state from run where portfolio = @Portfolio and cancel_requested = 0 and state in ('queued', 'running') order by sequence
        """;

    private const string StopSql = """
        update run set cancel_requested = 1,
          finished_at = case state when 'queued' then @Now end,
          state = case state when 'queued' then 'cancelled' else state end
        where id = @Id
        """;

    public static async Task StopAsync(StoreTransaction open, Caller caller, string portfolio)
    {
        foreach (var run in await open.ListAsync<Row>(ListSql, new { Portfolio = portfolio }))
        {
            await open.ExecuteAsync(StopSql, new { run.Id, open.Now });
            var what = run.State == "queued" ? "cancelled" : "cancel-requested";
            await RunEvents.TellAsync(open, caller, portfolio, run.Id, what, new { because = "archived" });
        }
    }

    private sealed record Row
    {
        public string Id { get; init; } = "";
        public string State { get; init; } = "";
    }
}
