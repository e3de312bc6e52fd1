using Portfolio.Store.Access;
using Portfolio.Store.Audit;
using Portfolio.Store.Deliveries;

namespace Portfolio.Store.Subscriptions;

/// <summary>How a write of a subscription ended.</summary>
public enum SubscriptionOutcome
{
    Done,
    /// <summary>No such portfolio or subscription for this caller (404).</summary>
    NotFound,
    /// <summary>The caller knows the portfolio but does not manage the whole of it (403).</summary>
    Forbidden,
    /// <summary>The portfolio is archived (409).</summary>
    Archived,
    /// <summary>There is one with this id already (409).</summary>
    Exists,
    /// <summary>The portfolio has as many as it may have (409).</summary>
    TooMany,
    /// <summary>The caller's condition refused.</summary>
    Refused,
}

/// <summary>The answer to a write; the subscription as it stands afterwards, null unless done.</summary>
/// <param name="Refusal">What the condition said.</param>
public sealed record SubscriptionResult(SubscriptionOutcome Outcome, StoredSubscription? Subscription = null, object? Refusal = null);

/// <summary>Called last inside a transaction that is done, for rows that stand or fall with the write; null for none.</summary>
public delegate Task SubscriptionJoining(StoreTransaction open, SubscriptionResult result, CancellationToken cancellation);

/// <content>Writing subscriptions: each write one transaction with its audit entry, in which no secret and no whole URL stands.</content>
public sealed partial class SubscriptionStore
{
    private const string CountSql = "select count(*) from subscription where portfolio = @Portfolio";

    private const string InsertSql = """
        insert into subscription (portfolio, id, url, events, active, secret, after_event, created_at, changed_at, created_by)
        select @Portfolio, @Id, @Url, @Events, @Active, @Secret, coalesce(max(sequence), 0), @Now, @Now, @Caller from outbox
        """;

    /// <param name="most">How many a portfolio may have.</param>
    public Task<SubscriptionResult> CreateAsync(
        Caller caller, string portfolio, string id, SubscriptionContent content, string secret, int most,
        SubscriptionJoining? joining, CancellationToken cancellation) =>
        WriteAsync(
            caller, portfolio, id, joining,
            async (open, found) =>
            {
                if (found is not null)
                    return new SubscriptionResult(SubscriptionOutcome.Exists);
                if (await open.FirstAsync<long>(CountSql, new { Portfolio = portfolio }) >= most)
                    return new SubscriptionResult(SubscriptionOutcome.TooMany);
                await open.ExecuteAsync(InsertSql, Row(open, caller, portfolio, id, content, secret));
                return await ToldAsync(open, caller, "create", portfolio, id);
            },
            cancellation);

    // Made active again it begins anew: what was ended is forgotten, what happened meanwhile was missed.
    private const string ReplaceSql = """
        update subscription set url = @Url, events = @Events, changed_at = @Now, failures = 0, quiet_until = null,
          after_event = case when active = 0 and @Active = 1 then (select coalesce(max(sequence), 0) from outbox) else after_event end,
          ended = case @Active when 1 then null else ended end, active = @Active
        where portfolio = @Portfolio and id = @Id
        """;

    /// <param name="refuse">Looks at what is there; what it returns refuses the write.</param>
    public Task<SubscriptionResult> ReplaceAsync(
        Caller caller, string portfolio, string id, SubscriptionContent content, Func<StoredSubscription, object?> refuse,
        SubscriptionJoining? joining, CancellationToken cancellation) => ChangeAsync(
        caller, portfolio, id, refuse, joining,
        async open =>
        {
            await open.ExecuteAsync(ReplaceSql, Row(open, caller, portfolio, id, content, null));
            if (!content.Active)
                await OpenDeliveries.StopAsync(open, portfolio, id, "The subscription was switched off before it could be sent.");
            return await ToldAsync(open, caller, "put", portfolio, id);
        },
        cancellation);

    private const string RotateSql = """
        update subscription set previous_secret = secret, previous_until = @Until, secret = @Secret, changed_at = @Now
        where portfolio = @Portfolio and id = @Id
        """;

    /// <summary>Gives it a new secret; the present one signs beside it for a while.</summary>
    public Task<SubscriptionResult> RotateAsync(
        Caller caller, string portfolio, string id, string secret, TimeSpan overlap, Func<StoredSubscription, object?> refuse,
        SubscriptionJoining? joining, CancellationToken cancellation) => ChangeAsync(
        caller, portfolio, id, refuse, joining,
        async open =>
        {
            var until = open.Now.ToInstant().Add(overlap).ToMicroseconds();
            await open.ExecuteAsync(RotateSql, new { Portfolio = portfolio, Id = id, Secret = secret, Until = until, open.Now });
            return await ToldAsync(open, caller, "rotate", portfolio, id);
        },
        cancellation);

    private const string DeleteSql = "delete from subscription where portfolio = @Portfolio and id = @Id";

    /// <summary>Removes it with its deliveries.</summary>
    public Task<SubscriptionResult> DeleteAsync(
        Caller caller, string portfolio, string id, Func<StoredSubscription, object?> refuse, SubscriptionJoining? joining,
        CancellationToken cancellation) => ChangeAsync(
        caller, portfolio, id, refuse, joining,
        async open =>
        {
            await open.ExecuteAsync(DeleteSql, new { Portfolio = portfolio, Id = id });
            await AuditChain.AppendAsync(open, caller.KeyId, "subscription.delete", ObjectOf(portfolio, id), new { });
            return new SubscriptionResult(SubscriptionOutcome.Done);
        },
        cancellation);

    private Task<SubscriptionResult> ChangeAsync(
        Caller caller, string portfolio, string id, Func<StoredSubscription, object?> refuse, SubscriptionJoining? joining,
        Func<StoreTransaction, Task<SubscriptionResult>> change, CancellationToken cancellation) => WriteAsync(
        caller, portfolio, id, joining,
        async (open, found) => found is null ? new SubscriptionResult(SubscriptionOutcome.NotFound)
            : refuse(found) is { } refusal ? new SubscriptionResult(SubscriptionOutcome.Refused, null, refusal)
            : await change(open),
        cancellation);

    private Task<SubscriptionResult> WriteAsync(
        Caller caller, string portfolio, string id, SubscriptionJoining? joining,
        Func<StoreTransaction, StoredSubscription?, Task<SubscriptionResult>> write, CancellationToken cancellation) => database.WriteAsync(
        async open =>
        {
            var result = await Standing.ReadAsync(open, caller, Right.Manage, portfolio) switch
            {
                { Exists: false } or { Known: false } => new SubscriptionResult(SubscriptionOutcome.NotFound),
                { Whole: false } => new SubscriptionResult(SubscriptionOutcome.Forbidden),
                { Archived: true } => new SubscriptionResult(SubscriptionOutcome.Archived),
                _ => await write(open, await FindAsync(open, caller, portfolio, id)),
            };
            if (result.Outcome == SubscriptionOutcome.Done && joining is not null)
                await joining(open, result, cancellation);
            return result;
        },
        cancellation);

    private static object Row(
        StoreTransaction open, Caller caller, string portfolio, string id, SubscriptionContent content, string? secret) => new
    {
        Portfolio = portfolio,
        Id = id,
        content.Url,
        content.Events,
        Active = content.Active ? 1 : 0,
        Secret = secret,
        open.Now,
        Caller = caller.KeyId,
    };

    private static async Task<SubscriptionResult> ToldAsync(
        StoreTransaction open, Caller caller, string what, string portfolio, string id)
    {
        var stands = (await FindAsync(open, caller, portfolio, id))!;
        // A URL may carry what only its owner should know: the host is enough for the trail.
        var detail = new { host = new Uri(stands.Url).Host, stands.Events, stands.Active };
        await AuditChain.AppendAsync(open, caller.KeyId, $"subscription.{what}", ObjectOf(portfolio, id), detail);
        return new SubscriptionResult(SubscriptionOutcome.Done, stands);
    }

    private static string ObjectOf(string portfolio, string id) => $"portfolios/{portfolio}/subscriptions/{id}";
}
