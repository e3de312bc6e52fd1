namespace Portfolio.Store.Outbox;

/// <summary>Something that happened, for those who listen.</summary>
public sealed record OutboxEvent
{
    /// <summary>Rises in the order of commits.</summary>
    public required long Sequence { get; init; }
    /// <summary>Unique; what readers and receivers know it by.</summary>
    public required string Id { get; init; }
    public required DateTimeOffset At { get; init; }
    public required string Portfolio { get; init; }
    /// <summary><c>revision.created</c>, <c>run.queued</c>, <c>run.succeeded</c> …</summary>
    public required string Kind { get; init; }
    /// <summary>What it happened to: a revision number, a run id, a scope.</summary>
    public required string Subject { get; init; }
    /// <summary>The one project it is about; null when it is about more.</summary>
    public string? Project { get; init; }
    /// <summary>JSON.</summary>
    public required string Payload { get; init; }
}

/// <summary>An event to be told.</summary>
/// <param name="Project">The one project it is about; null when it is about more.</param>
/// <param name="Payload">An object that serialises to JSON.</param>
internal sealed record NewEvent(string Portfolio, string Kind, string Subject, object Payload, string? Project = null);

internal record OutboxRow
{
    /// <summary>Of an event called <c>o</c>.</summary>
    public const string Columns = "o.sequence, o.id, o.at, o.portfolio, o.kind, o.subject, o.project, o.payload";

    public long Sequence { get; init; }
    public string Id { get; init; } = "";
    public long At { get; init; }
    public string Portfolio { get; init; } = "";
    public string Kind { get; init; } = "";
    public string Subject { get; init; } = "";
    public string? Project { get; init; }
    public string Payload { get; init; } = "";

    public OutboxEvent ToEvent() => new()
    {
        Sequence = Sequence,
        Id = Id,
        At = At.ToInstant(),
        Portfolio = Portfolio,
        Kind = Kind,
        Subject = Subject,
        Project = Project,
        Payload = Payload,
    };
}
