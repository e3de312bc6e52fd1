using Portfolio.Store.Access;

namespace Portfolio.Store.Outbox;

/// <summary>What an event's id given as a cursor means.</summary>
public enum EventCursor
{
    /// <summary>The event is there, or none was given.</summary>
    Known,
    /// <summary>It is older than every event that is kept of the portfolio: what followed it may be gone.</summary>
    Expired,
    /// <summary>No event of the portfolio ever had it, as far as can be told.</summary>
    Unknown,
}

/// <summary>Events after a cursor; none unless it is known.</summary>
public sealed record EventPage(EventCursor Cursor, IReadOnlyList<OutboxEvent> Events);

/// <content>Reading on from an event that was seen.</content>
public sealed partial class OutboxStore
{
    private const string PlaceSql = "select o.sequence from outbox o where o.portfolio = @Portfolio and o.id = @After";

    private const string OldestSql = "select min(o.at) from outbox o where o.portfolio = @Portfolio";

    /// <summary>Events after the one with an id (null: from the oldest that is kept), oldest first.</summary>
    public Task<EventPage> ReadAfterAsync(
        Caller caller, string portfolio, string? after, int limit, CancellationToken cancellation) => database.ReadAsync(
        async open =>
        {
            var place = after is null ? 0 : await open.FirstAsync<long?>(PlaceSql, new { Portfolio = portfolio, After = after });
            if (place is { } known)
                return new EventPage(EventCursor.Known, await ReadAsync(open, caller, portfolio, known, limit));
            var oldest = await open.FirstAsync<long?>(OldestSql, new { Portfolio = portfolio });
            return new EventPage(MadeAt(after) < oldest ? EventCursor.Expired : EventCursor.Unknown, []);
        },
        cancellation);

    /// <summary>The instant, microseconds, that an id of version 7 begins with (RFC 9562); null for other ids.</summary>
    private static long? MadeAt(string? id) => Guid.TryParseExact(id, "D", out var guid) && guid.Version == 7
        ? Convert.ToInt64(id!.Replace("-", "", StringComparison.Ordinal)[..12], 16) * 1000
        : null;

    // The newest event of a portfolio stays, so that whoever has read everything can always read on.
    private static readonly string OutlivedSql = $"""
        from outbox where at < @Before and sequence <= (select through from event_cursor)
          and sequence < (select max(n.sequence) from outbox n where n.portfolio = outbox.portfolio)
          and {Granted.Whole(Right.Admin, "outbox.portfolio")}
        """;

    private static readonly string ForgetDeliveriesSql = $"delete from delivery where event in (select sequence {OutlivedSql})";

    private static readonly string ForgetSql = $"delete {OutlivedSql}";

    // What was told once stays told; only what is asked anew every day or minute is forgotten.
    private static readonly string ForgetMarkersSql = $"""
        delete from event_marker where at < @Before and {Granted.Whole(Right.Admin, "event_marker.portfolio")}
          and (substr(name, 1, {EventDistribution.Look.Length}) = '{EventDistribution.Look}'
            or substr(name, 1, {EventDistribution.Refused.Length}) = '{EventDistribution.Refused}')
        """;

    /// <summary>Removes events older than an instant, with their deliveries; says how many.</summary>
    public Task<int> ForgetAsync(Caller caller, DateTimeOffset before, CancellationToken cancellation) => database.WriteAsync(
        async open =>
        {
            var asked = new { Caller = caller.KeyId, open.Now, Before = before.ToMicroseconds() };
            await open.ExecuteAsync(ForgetDeliveriesSql, asked);
            await open.ExecuteAsync(ForgetMarkersSql, asked);
            return await open.ExecuteAsync(ForgetSql, asked);
        },
        cancellation);
}
