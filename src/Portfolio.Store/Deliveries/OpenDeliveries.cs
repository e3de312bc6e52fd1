namespace Portfolio.Store.Deliveries;

/// <summary>What waits for listeners when their portfolio is archived or they are no longer told.</summary>
internal static class OpenDeliveries
{
    private const string DeadSql = """
        update delivery set state = 'dead', next_attempt_at = null, last_error = @Error
        where portfolio = @Portfolio and (@Subscription is null or subscription = @Subscription) and state = 'waiting'
        """;

    /// <summary>Nothing of it is sent any more; what is being sent just now comes to its end.</summary>
    public static Task StopAsync(StoreTransaction open, string portfolio) =>
        StopAsync(open, portfolio, null, "The portfolio was archived before it could be sent.");

    /// <summary>The same for one subscription (null: for all).</summary>
    /// <param name="why">A sentence.</param>
    public static Task StopAsync(StoreTransaction open, string portfolio, string? subscription, string? why) =>
        open.ExecuteAsync(DeadSql, new { Portfolio = portfolio, Subscription = subscription, Error = why });

    private const string ToldSql = """
        select count(*) from subscription s join portfolio p on p.id = s.portfolio
        where s.portfolio = @Portfolio and s.id = @Subscription and s.active = 1 and p.archived_at is null
        """;

    /// <summary>Whether a subscription is still told of anything.</summary>
    public static async Task<bool> IsToldAsync(StoreTransaction open, string portfolio, string subscription) =>
        await open.FirstAsync<long>(ToldSql, new { Portfolio = portfolio, Subscription = subscription }) > 0;

    private const string ArchivedSql = "select count(*) from portfolio where id = @Portfolio and archived_at is not null";

    public static async Task<bool> IsArchivedAsync(StoreTransaction open, string portfolio) =>
        await open.FirstAsync<long>(ArchivedSql, new { Portfolio = portfolio }) > 0;
}
