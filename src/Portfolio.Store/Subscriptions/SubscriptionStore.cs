using Portfolio.Store.Access;

namespace Portfolio.Store.Subscriptions;

/// <summary>Reading subscriptions. Who does not manage the whole portfolio finds none.</summary>
public sealed partial class SubscriptionStore(Database database)
{
    private static readonly string FindSql = $"""
        select {SubscriptionRow.Columns} from subscription s
        where s.portfolio = @Portfolio and s.id = @Id and {Granted.Whole(Right.Manage, "s.portfolio")}
        """;

    public Task<StoredSubscription?> FindAsync(Caller caller, string portfolio, string id, CancellationToken cancellation) =>
        database.ReadAsync(open => FindAsync(open, caller, portfolio, id), cancellation);

    private static async Task<StoredSubscription?> FindAsync(StoreTransaction open, Caller caller, string portfolio, string id) =>
        (await open.FirstAsync<SubscriptionRow>(FindSql, new { Caller = caller.KeyId, open.Now, Portfolio = portfolio, Id = id }))
        ?.ToSubscription(open.Now);

    private static readonly string ListSql = $"""
        select {SubscriptionRow.Columns} from subscription s
        where s.portfolio = @Portfolio and (@After is null or s.id > @After) and {Granted.Whole(Right.Manage, "s.portfolio")}
        order by s.id limit @Limit
        """;

    /// <summary>Subscriptions by id.</summary>
    /// <param name="after">The last id of the page before; null for the first page.</param>
    public Task<IReadOnlyList<StoredSubscription>> ListAsync(
        Caller caller, string portfolio, string? after, int limit, CancellationToken cancellation) =>
        ListAsync(
            ListSql, now => new { Caller = caller.KeyId, Now = now, Portfolio = portfolio, After = after, Limit = limit }, cancellation);

    private static readonly string ActiveSql = $"""
        select {SubscriptionRow.Columns} from subscription s join portfolio p on p.id = s.portfolio
        where s.active = 1 and (@Portfolio is null or s.portfolio = @Portfolio) and p.archived_at is null
          and {Granted.Whole(Right.Manage, "s.portfolio")}
        order by s.portfolio, s.id
        """;

    /// <summary>Those that are to be told, of portfolios that are not archived.</summary>
    /// <param name="portfolio">Only this one; null for all.</param>
    public Task<IReadOnlyList<StoredSubscription>> ListActiveAsync(Caller caller, string? portfolio, CancellationToken cancellation) =>
        ListAsync(ActiveSql, now => new { Caller = caller.KeyId, Now = now, Portfolio = portfolio }, cancellation);

    private Task<IReadOnlyList<StoredSubscription>> ListAsync(
        string sql, Func<long, object> asked, CancellationToken cancellation) => database.ReadAsync<IReadOnlyList<StoredSubscription>>(
        async open =>
        {
            var rows = await open.ListAsync<SubscriptionRow>(sql, asked(open.Now));
            return [.. rows.Select(row => row.ToSubscription(open.Now))];
        },
        cancellation);
}
