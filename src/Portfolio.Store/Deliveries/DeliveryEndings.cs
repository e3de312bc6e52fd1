using Portfolio.Store.Access;
using Portfolio.Store.Audit;

namespace Portfolio.Store.Deliveries;

/// <summary>The ways in which an attempt ends. Each returns false, and writes nothing, when the lease was lost.</summary>
public sealed class DeliveryEndings(Database database)
{
    private const string Ended = """
        owner = null, lease_until = null, last_status = @Status, last_error = @Error
        where id = @Id and fence = @Fence and state = 'sending'
        """;

    private const string DeliveredSql = $"update delivery set state = 'delivered', delivered_at = @Now, {Ended}";

    private const string HealthySql =
        "update subscription set failures = 0 where portfolio = @Portfolio and id = @Subscription and failures > 0";

    public Task<bool> DeliveredAsync(DeliveryLease held, AttemptResult result, CancellationToken cancellation) =>
        database.WriteAsync(open => EndAsync(open, DeliveredSql, held, result, null, HealthySql), cancellation);

    private const string AgainSql = $"update delivery set state = 'waiting', next_attempt_at = @Next, {Ended}";

    private const string DeadSql = $"update delivery set state = 'dead', {Ended}";

    // A wish to wait holds for everything that the target is sent.
    private const string FailingSql = """
        update subscription set failures = failures + 1, quiet_until = @Quiet where portfolio = @Portfolio and id = @Subscription
        """;

    /// <param name="next">When it is tried again, unless nothing more is sent there; null: never.</param>
    public Task<bool> FailedAsync(DeliveryLease held, AttemptResult result, DateTimeOffset? next, CancellationToken cancellation) =>
        database.WriteAsync(open => FailAsync(open, held, result, next), cancellation);

    private static async Task<bool> FailAsync(StoreTransaction open, DeliveryLease held, AttemptResult result, DateTimeOffset? next)
    {
        var over = next is null || !await OpenDeliveries.IsToldAsync(open, held.Event.Portfolio, held.Subscription);
        return await EndAsync(open, over ? DeadSql : AgainSql, held, result, next, FailingSql);
    }

    private const string EndSubscriptionSql = """
        update subscription set active = 0, ended = 'gone', failures = failures + 1, changed_at = @Now
        where portfolio = @Portfolio and id = @Subscription
        """;

    private const string UrlSql = "select url from subscription where portfolio = @Portfolio and id = @Subscription";

    /// <summary>The target says that it is gone for good: the subscription ends, and whatever waits for it is dead.</summary>
    /// <returns>False also when the subscription has another target by now, to which the event is sent instead.</returns>
    public Task<bool> GoneAsync(DeliveryLease held, AttemptResult result, CancellationToken cancellation) => database.WriteAsync(
        async open =>
        {
            var (portfolio, subscription) = (held.Event.Portfolio, held.Subscription);
            var url = await open.FirstAsync<string>(UrlSql, new { Portfolio = portfolio, Subscription = subscription });
            if (url is not null && url != held.Url)
            {
                await FailAsync(open, held, result, open.Now.ToInstant());
                return false;
            }
            if (!await EndAsync(open, DeadSql, held, result, null))
                return false;
            await open.ExecuteAsync(EndSubscriptionSql, new { Portfolio = portfolio, Subscription = subscription, open.Now });
            await OpenDeliveries.StopAsync(open, portfolio, subscription, result.Error);
            await AuditChain.AppendAsync(
                open, Caller.System.KeyId, "subscription.end", $"portfolios/{portfolio}/subscriptions/{subscription}",
                new { because = "gone" });
            return true;
        },
        cancellation);

    private static async Task<bool> EndAsync(
        StoreTransaction open, string sql, DeliveryLease held, AttemptResult result, DateTimeOffset? next, string subscriptionSql)
    {
        if (!await EndAsync(open, sql, held, result, next))
            return false;
        var quiet = result.RetryAt is null ? null : next?.ToMicroseconds();
        await open.ExecuteAsync(subscriptionSql, new { held.Event.Portfolio, held.Subscription, Quiet = quiet });
        return true;
    }

    private static async Task<bool> EndAsync(
        StoreTransaction open, string sql, DeliveryLease held, AttemptResult result, DateTimeOffset? next) =>
        await open.ExecuteAsync(
            sql,
            new { held.Id, held.Fence, open.Now, result.Status, result.Error, Next = next?.ToMicroseconds() }) == 1;
}
