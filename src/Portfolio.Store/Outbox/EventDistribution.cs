using Portfolio.Store.Access;
using Portfolio.Store.Deliveries;

namespace Portfolio.Store.Outbox;

/// <summary>Something that was noticed and is told at most once.</summary>
/// <param name="Once">The name under which it is remembered for ever; telling it again does nothing.</param>
/// <param name="Project">The one project it is about; null when it is about more.</param>
/// <param name="Payload">An object that serialises to JSON.</param>
public sealed record NoticedEvent(string Once, string Kind, string Subject, string? Project, object Payload);

/// <summary>
/// Hands events to subscriptions, one after the other in the order of commits. Each step is one transaction: what follows from an event,
/// its deliveries and the place that is reached stand or fall together, so that a process killed in between neither loses nor doubles.
/// </summary>
public sealed class EventDistribution(Database database)
{
    private static readonly string NextSql = $"""
        select {OutboxRow.Columns} from outbox o
        where o.sequence > (select c.through from event_cursor c) and {Granted.Whole(Right.Admin, "o.portfolio")}
        order by o.sequence limit @Limit
        """;

    /// <summary>The first events that were not handed on yet.</summary>
    public async Task<IReadOnlyList<OutboxEvent>> ListNextAsync(Caller caller, int limit, CancellationToken cancellation)
    {
        var rows = await database.ReadAsync(
            open => open.ListAsync<OutboxRow>(NextSql, new { Caller = caller.KeyId, open.Now, Limit = limit }), cancellation);
        return [.. rows.Select(row => row.ToEvent())];
    }

    private const string ReachSql = "update event_cursor set through = @Sequence where through < @Sequence";

    /// <summary>Hands on one event, passing over those before it. False, and nothing is written, when it was handed on meanwhile.</summary>
    /// <param name="noticed">What follows from it.</param>
    /// <param name="subscriptions">Ids of the subscriptions of its portfolio that want it.</param>
    /// <param name="triedFor">How long its deliveries are tried.</param>
    public Task<bool> HandOnAsync(
        OutboxEvent told, IReadOnlyList<NoticedEvent> noticed, IReadOnlyList<string> subscriptions, TimeSpan triedFor,
        CancellationToken cancellation) => database.WriteAsync(
        async open =>
        {
            if (await open.ExecuteAsync(ReachSql, new { told.Sequence }) == 0)
                return false;
            await TellAsync(open, told.Portfolio, noticed);
            foreach (var subscription in subscriptions)
                await NewDeliveries.AddAsync(open, told, subscription, triedFor);
            return true;
        },
        cancellation);

    /// <summary>Before the names of looks, so that none is taken for the name of what was told.</summary>
    internal const string Look = "looked/";

    /// <summary>Tells what was noticed by a look of its own. False, and nothing is written, when the look was taken already.</summary>
    /// <param name="look">Its name, which is remembered as long as events are kept.</param>
    public Task<bool> TellAsync(
        string portfolio, string look, IReadOnlyList<NoticedEvent> noticed, CancellationToken cancellation) => database.WriteAsync(
        async open =>
        {
            if (!await TakeAsync(open, portfolio, Look + look))
                return false;
            await TellAsync(open, portfolio, noticed);
            return true;
        },
        cancellation);

    private const string TakenSql = "select count(*) from event_marker where portfolio = @Portfolio and name = @Name";

    /// <summary>Whether a look was taken under this name.</summary>
    public async Task<bool> IsTakenAsync(string portfolio, string look, CancellationToken cancellation) =>
        await database.ReadAsync(
            open => open.FirstAsync<long>(TakenSql, new { Portfolio = portfolio, Name = Look + look }), cancellation) > 0;

    private static async Task TellAsync(StoreTransaction open, string portfolio, IReadOnlyList<NoticedEvent> noticed)
    {
        foreach (var found in noticed)
        {
            if (await TakeAsync(open, portfolio, found.Once))
                await OutboxStore.AppendAsync(open, new NewEvent(portfolio, found.Kind, found.Subject, found.Payload, found.Project));
        }
    }

    private const string TakeSql =
        "insert into event_marker (portfolio, name, at) values (@Portfolio, @Name, @Now) on conflict (portfolio, name) do nothing";

    /// <summary>Takes a name for ever; false when it was taken before.</summary>
    private static async Task<bool> TakeAsync(StoreTransaction open, string portfolio, string name) =>
        await open.ExecuteAsync(TakeSql, new { Portfolio = portfolio, Name = name, open.Now }) == 1;

    /// <summary>Before the names of keys whose refused posts are told of.</summary>
    internal const string Refused = "post.refused/";

    private const string TakeAgainSql = """
        insert into event_marker (portfolio, name, at) values (@Portfolio, @Name, @Now)
        on conflict (portfolio, name) do update set at = excluded.at where event_marker.at <= @Before
        """;

    /// <summary>Takes a name anew, one row however often; false when it was taken within the time before now.</summary>
    /// <param name="within">Microseconds.</param>
    internal static async Task<bool> TakeAgainAsync(StoreTransaction open, string portfolio, string name, long within) =>
        await open.ExecuteAsync(TakeAgainSql, new { Portfolio = portfolio, Name = name, open.Now, Before = open.Now - within }) == 1;
}
