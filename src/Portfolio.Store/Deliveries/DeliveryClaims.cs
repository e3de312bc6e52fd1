using Portfolio.Store.Access;
using Portfolio.Store.Outbox;

namespace Portfolio.Store.Deliveries;

/// <summary>Who sends what, and for how long. Of one subscription one delivery is sent at a time, the oldest event first.</summary>
public sealed class DeliveryClaims(Database database)
{
    private static readonly string Due = $"""
        (d.state = 'waiting' and d.next_attempt_at <= @Now or d.state = 'sending' and d.lease_until <= @Now)
          and s.active = 1 and (@Failing = 1 or s.failures = 0) and (s.quiet_until is null or s.quiet_until <= @Now)
          and not exists (select 1 from delivery b where b.portfolio = d.portfolio and b.subscription = d.subscription
            and b.state = 'sending' and b.lease_until > @Now)
          and {Granted.Whole(Right.Admin, "d.portfolio")}
        """;

    // Targets that answer go before those that did not.
    private static readonly string NextSql = $"""
        select d.id from delivery d join subscription s on s.portfolio = d.portfolio and s.id = d.subscription
          join portfolio p on p.id = d.portfolio and p.archived_at is null
        where {Due}
        order by case s.failures when 0 then 0 else 1 end, d.event, d.id limit 1
        """;

    // Asked again: where several processes write, another may have been quicker.
    private const string ClaimSql = """
        update delivery set state = 'sending', fence = fence + 1, attempt = attempt + 1, owner = @Owner, lease_until = @LeaseUntil,
          next_attempt_at = null, last_attempt_at = @Now
        where id = @Id and (state = 'waiting' and next_attempt_at <= @Now or state = 'sending' and lease_until <= @Now)
        """;

    private static readonly string ClaimedSql = $"""
        select d.id as delivery, d.fence, d.attempt, d.give_up_at, d.subscription, s.url, s.failures, s.secret,
          case when s.previous_until > @Now then s.previous_secret end as previous_secret, {OutboxRow.Columns}
        from delivery d join subscription s on s.portfolio = d.portfolio and s.id = d.subscription join outbox o on o.sequence = d.event
        where d.id = @Id
        """;

    /// <summary>Takes the next delivery that is due; null when there is none.</summary>
    /// <param name="owner">Names the sender, for people.</param>
    /// <param name="failing">Whether targets whose last attempt failed are looked at too.</param>
    public async Task<DeliveryLease?> ClaimAsync(
        Caller caller, string owner, TimeSpan lease, bool failing, CancellationToken cancellation)
    {
        // Nearly always there is nothing: that is found out beside the writers, not between them.
        if (await database.ReadAsync(open => NextAsync(open, caller, failing), cancellation) is null)
            return null;
        return await database.WriteAsync(
            async open =>
            {
                if (await NextAsync(open, caller, failing) is not { } next)
                    return null;
                var until = open.Now.ToInstant().Add(lease).ToMicroseconds();
                if (await open.ExecuteAsync(ClaimSql, new { Id = next, Owner = owner, LeaseUntil = until, open.Now }) == 0)
                    return null;
                return (await open.FirstAsync<Row>(ClaimedSql, new { Id = next, open.Now }))!.ToLease();
            },
            cancellation);
    }

    private static Task<string?> NextAsync(StoreTransaction open, Caller caller, bool failing) =>
        open.FirstAsync<string>(NextSql, new { Caller = caller.KeyId, open.Now, Failing = failing ? 1 : 0 });

    private const string ReleaseSql = """
        update delivery set state = 'waiting', owner = null, lease_until = null, next_attempt_at = @Now, attempt = attempt - 1
        where id = @Id and fence = @Fence and state = 'sending'
        """;

    /// <summary>Puts it back, as if it had not been tried; for a sender that stops in good order.</summary>
    public Task<bool> ReleaseAsync(DeliveryLease held, CancellationToken cancellation) =>
        database.WriteAsync(async open => await open.ExecuteAsync(ReleaseSql, new { held.Id, held.Fence, open.Now }) == 1, cancellation);

    private static readonly string ExpireSql = $"""
        update delivery set lease_until = @Now
        where state = 'sending' and lease_until > @Now and {Granted.Whole(Right.Admin, "delivery.portfolio")}
        """;

    /// <summary>
    /// Ends all leases, so that what was being sent is sent again at once. For the start of a process that has the storage to itself.
    /// </summary>
    public Task<int> ExpireAllAsync(Caller caller, CancellationToken cancellation) =>
        database.WriteAsync(open => open.ExecuteAsync(ExpireSql, new { Caller = caller.KeyId, open.Now }), cancellation);

    private sealed record Row : OutboxRow
    {
        public string Delivery { get; init; } = "";
        public long Fence { get; init; }
        public long Attempt { get; init; }
        public long GiveUpAt { get; init; }
        public string Subscription { get; init; } = "";
        public string Url { get; init; } = "";
        public long Failures { get; init; }
        public string Secret { get; init; } = "";
        public string? PreviousSecret { get; init; }

        public DeliveryLease ToLease() => new(
            Delivery, Fence, (int)Attempt, GiveUpAt.ToInstant(), Subscription, Url, Failures > 0,
            new SigningSecrets(Secret, PreviousSecret), ToEvent());
    }
}
