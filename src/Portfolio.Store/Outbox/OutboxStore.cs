using System.Text.Json;
using Portfolio.Store.Access;

namespace Portfolio.Store.Outbox;

/// <summary>Something that happened, for those who listen.</summary>
public sealed record OutboxEvent
{
    /// <summary>Rises in the order of commits; the cursor of a reader.</summary>
    public required long Sequence { get; init; }
    public required DateTimeOffset At { get; init; }
    public required string Portfolio { get; init; }
    /// <summary><c>revision.created</c>, <c>run.queued</c>, <c>run.succeeded</c> …</summary>
    public required string Kind { get; init; }
    /// <summary>What it happened to: a revision number, a run id.</summary>
    public required string Subject { get; init; }
    /// <summary>JSON.</summary>
    public required string Payload { get; init; }
}

/// <summary>Events, written in the same transaction as the fact they tell.</summary>
public sealed class OutboxStore(Database database)
{
    private static readonly string ReadSql = $"""
        select o.sequence, o.at, o.portfolio, o.kind, o.subject, o.payload from outbox o
        where o.sequence > @Cursor and (@Portfolio is null or o.portfolio = @Portfolio) and {Granted.Whole(Right.Read, "o.portfolio")}
        order by o.sequence limit @Limit
        """;

    /// <summary>Events after the cursor (0: from the first), oldest first, of the portfolios that the caller reads whole.</summary>
    /// <param name="portfolio">Only this one; null for all.</param>
    public async Task<IReadOnlyList<OutboxEvent>> ReadAfterAsync(
        Caller caller, string? portfolio, long cursor, int limit, CancellationToken cancellation)
    {
        var rows = await database.ReadAsync(
            open => open.ListAsync<Row>(
                ReadSql, new { Caller = caller.KeyId, open.Now, Portfolio = portfolio, Cursor = cursor, Limit = limit }), cancellation);
        return [.. rows.Select(row => row.ToEvent())];
    }

    private const string InsertSql = """
        insert into outbox (sequence, at, portfolio, kind, subject, payload)
        select coalesce(max(sequence), 0) + 1, @Now, @Portfolio, @Kind, @Subject, @Payload from outbox
        """;

    internal static Task AppendAsync(
        StoreTransaction open, string portfolio, string kind, string subject, object payload) => open.ExecuteAsync(
        InsertSql,
        new
        {
            open.Now,
            Portfolio = portfolio,
            Kind = kind,
            Subject = subject,
            Payload = JsonSerializer.Serialize(payload, JsonSerializerOptions.Web),
        });

    private sealed record Row
    {
        public long Sequence { get; init; }
        public long At { get; init; }
        public string Portfolio { get; init; } = "";
        public string Kind { get; init; } = "";
        public string Subject { get; init; } = "";
        public string Payload { get; init; } = "";

        public OutboxEvent ToEvent() =>
            new() { Sequence = Sequence, At = At.ToInstant(), Portfolio = Portfolio, Kind = Kind, Subject = Subject, Payload = Payload };
    }
}
