using Portfolio.Store.Access;
using Portfolio.Store.Audit;
using Portfolio.Store.Outbox;

namespace Portfolio.Store.Deliveries;

/// <summary>How asking for a delivery again ended.</summary>
public enum RedeliverOutcome
{
    Accepted,
    /// <summary>No such delivery for this caller (404).</summary>
    NotFound,
    /// <summary>It is being sent (409).</summary>
    UnderWay,
    /// <summary>Its subscription is not active (409).</summary>
    Inactive,
    /// <summary>The portfolio is archived (409).</summary>
    Archived,
}

/// <summary>What became of events on their way. Needs <see cref="Right.Manage"/> on the whole portfolio.</summary>
public sealed class DeliveryStore(Database database)
{
    private const string Columns = """
        d.id as delivery, d.state, d.attempt, d.next_attempt_at, d.give_up_at, d.last_attempt_at, d.last_status, d.last_error,
        d.delivered_at
        """;

    private static readonly string ListSql = $"""
        select {Columns}, {OutboxRow.Columns} from delivery d join outbox o on o.sequence = d.event
        where d.portfolio = @Portfolio and d.subscription = @Subscription and (@State is null or d.state = @State)
          and (@Before is null or d.event < @Before) and (@Id is null or d.id = @Id) and {Granted.Whole(Right.Manage, "d.portfolio")}
        order by d.event desc limit @Limit
        """;

    /// <summary>Deliveries of a subscription, the newest event first.</summary>
    /// <param name="before">Sequence of the last event of the page before; null for the first page.</param>
    public async Task<IReadOnlyList<StoredDelivery>> ListAsync(
        Caller caller, string portfolio, string subscription, DeliveryState? state, long? before, int limit,
        CancellationToken cancellation) =>
        await database.ReadAsync(
            async open => (await RowsAsync(open, caller, portfolio, subscription, state, before, null, limit))
                .Select(row => row.ToDelivery()).ToArray(),
            cancellation);

    public async Task<StoredDelivery?> FindAsync(
        Caller caller, string portfolio, string subscription, string id, CancellationToken cancellation) =>
        (await database.ReadAsync(open => RowsAsync(open, caller, portfolio, subscription, null, null, id, 1), cancellation))
        .FirstOrDefault()?.ToDelivery();

    private static Task<List<Row>> RowsAsync(
        StoreTransaction open, Caller caller, string portfolio, string subscription, DeliveryState? state, long? before, string? id,
        int limit) => open.ListAsync<Row>(
        ListSql,
        new
        {
            Caller = caller.KeyId,
            open.Now,
            Portfolio = portfolio,
            Subscription = subscription,
            State = state is { } asked ? DeliveryWords.Of(asked) : null,
            Before = before,
            Id = id,
            Limit = limit,
        });

    private const string ActiveSql = "select active from subscription where portfolio = @Portfolio and id = @Subscription";

    // What waits already only loses its wait; what had come to an end begins anew, with all its time.
    private const string AgainSql = """
        update delivery set attempt = case state when 'waiting' then attempt else 0 end,
          give_up_at = case state when 'waiting' then give_up_at else @GiveUpAt end,
          state = 'waiting', next_attempt_at = @Now, delivered_at = null
        where id = @Id and state <> 'sending'
        """;

    private const string AskAgainSql = "update subscription set quiet_until = null where portfolio = @Portfolio and id = @Subscription";

    /// <summary>Has an event sent once more, even to a target that wanted to wait, with an audit entry.</summary>
    /// <param name="joining">Called last inside the transaction, for rows that stand or fall with it; null for none.</param>
    public Task<(RedeliverOutcome Outcome, StoredDelivery? Delivery)> RedeliverAsync(
        Caller caller, string portfolio, string subscription, string id, TimeSpan triedFor,
        Func<StoreTransaction, StoredDelivery, CancellationToken, Task>? joining, CancellationToken cancellation) =>
        database.WriteAsync<(RedeliverOutcome, StoredDelivery?)>(
            async open =>
            {
                if ((await RowsAsync(open, caller, portfolio, subscription, null, null, id, 1)).Count == 0)
                    return (RedeliverOutcome.NotFound, null);
                if (await OpenDeliveries.IsArchivedAsync(open, portfolio))
                    return (RedeliverOutcome.Archived, null);
                if (await open.FirstAsync<long>(ActiveSql, new { Portfolio = portfolio, Subscription = subscription }) == 0)
                    return (RedeliverOutcome.Inactive, null);
                var until = open.Now.ToInstant().Add(triedFor).ToMicroseconds();
                if (await open.ExecuteAsync(AgainSql, new { Id = id, GiveUpAt = until, open.Now }) == 0)
                    return (RedeliverOutcome.UnderWay, null);
                await open.ExecuteAsync(AskAgainSql, new { Portfolio = portfolio, Subscription = subscription });
                var told = $"portfolios/{portfolio}/subscriptions/{subscription}";
                await AuditChain.AppendAsync(open, caller.KeyId, "delivery.redeliver", told, new { delivery = id });
                var again = (await RowsAsync(open, caller, portfolio, subscription, null, null, id, 1))[0].ToDelivery();
                if (joining is not null)
                    await joining(open, again, cancellation);
                return (RedeliverOutcome.Accepted, again);
            },
            cancellation);

    private sealed record Row : OutboxRow
    {
        public string Delivery { get; init; } = "";
        public string State { get; init; } = "";
        public long Attempt { get; init; }
        public long? NextAttemptAt { get; init; }
        public long GiveUpAt { get; init; }
        public long? LastAttemptAt { get; init; }
        public long? LastStatus { get; init; }
        public string? LastError { get; init; }
        public long? DeliveredAt { get; init; }

        public StoredDelivery ToDelivery() => new()
        {
            Id = Delivery,
            Event = ToEvent(),
            State = Enum.Parse<DeliveryState>(State, ignoreCase: true),
            Attempt = (int)Attempt,
            NextAttemptAt = NextAttemptAt.ToInstant(),
            GiveUpAt = GiveUpAt.ToInstant(),
            LastAttemptAt = LastAttemptAt.ToInstant(),
            LastStatus = (int?)LastStatus,
            LastError = LastError,
            DeliveredAt = DeliveredAt.ToInstant(),
        };
    }
}
