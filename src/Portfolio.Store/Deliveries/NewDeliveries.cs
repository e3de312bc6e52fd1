using Portfolio.Store.Outbox;

namespace Portfolio.Store.Deliveries;

/// <summary>Deliveries are made in the transaction that hands their event on, one for each subscription.</summary>
internal static class NewDeliveries
{
    // A subscription that was ended, made after the event or is one of an archived portfolio gets none.
    private const string AddSql = """
        insert into delivery (id, portfolio, subscription, event, state, next_attempt_at, give_up_at)
        select @Id, s.portfolio, s.id, @Event, 'waiting', @Now, @GiveUpAt
        from subscription s join portfolio p on p.id = s.portfolio and p.archived_at is null
        where s.portfolio = @Portfolio and s.id = @Subscription and s.active = 1 and s.after_event < @Event
        on conflict (portfolio, subscription, event) do nothing
        """;

    public static Task AddAsync(StoreTransaction open, OutboxEvent told, string subscription, TimeSpan triedFor) => open.ExecuteAsync(
        AddSql,
        new
        {
            Id = Guid.CreateVersion7(open.Now.ToInstant()).ToString(),
            told.Portfolio,
            Subscription = subscription,
            Event = told.Sequence,
            open.Now,
            GiveUpAt = open.Now.ToInstant().Add(triedFor).ToMicroseconds(),
        });
}
