namespace Portfolio.Store.Deliveries;

/// <summary>What waits for the listeners of a portfolio when it is archived.</summary>
internal static class OpenDeliveries
{
    private const string DeadSql = """
        update delivery set state = 'dead', next_attempt_at = null, last_error = @Error
        where portfolio = @Portfolio and state = 'waiting'
        """;

    /// <summary>Nothing of it is sent any more; what is being sent just now comes to its end.</summary>
    public static Task StopAsync(StoreTransaction open, string portfolio) =>
        open.ExecuteAsync(DeadSql, new { Portfolio = portfolio, Error = "The portfolio was archived before it could be sent." });

    private const string ArchivedSql = "select count(*) from portfolio where id = @Portfolio and archived_at is not null";

    public static async Task<bool> IsArchivedAsync(StoreTransaction open, string portfolio) =>
        await open.FirstAsync<long>(ArchivedSql, new { Portfolio = portfolio }) > 0;
}
