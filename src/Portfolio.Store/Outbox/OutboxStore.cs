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
    /// <summary>Events after the cursor (0: from the first), oldest first, of the portfolios that the caller reads whole.</summary>
    /// <param name="portfolio">Only this one; null for all.</param>
    public Task<IReadOnlyList<OutboxEvent>> ReadAfterAsync(Caller caller, string? portfolio, long cursor, int limit, CancellationToken cancellation) =>
        throw new NotSupportedException(database.ToString());
}
