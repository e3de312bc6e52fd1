namespace Portfolio.Store.Runs;

/// <summary>
/// queued → running → succeeded, failed or cancelled; running → queued when a worker stops in good order; queued → cancelled.
/// </summary>
public enum RunState
{
    Queued,
    Running,
    Succeeded,
    Failed,
    Cancelled,
}

/// <summary>What a run was made by.</summary>
public enum RunKind
{
    /// <summary>A due instant of the schedule.</summary>
    Nightly,
    /// <summary>Somebody asked for it.</summary>
    Request,
}

/// <summary>One run of one frozen revision.</summary>
public sealed record StoredRun
{
    /// <summary>UUIDv7 as text.</summary>
    public required string Id { get; init; }
    /// <summary>Order of creation over all portfolios; the cursor of lists.</summary>
    public required long Sequence { get; init; }
    public required string Portfolio { get; init; }
    public required RunKind Kind { get; init; }
    /// <summary>Whether it shall be a point of the series.</summary>
    public required bool Recorded { get; init; }
    /// <summary>Whether it is one: the run that stands for its date.</summary>
    public required bool Represents { get; init; }
    public required DateOnly AsOf { get; init; }
    public required long Revision { get; init; }
    /// <summary>A scenario laid over the revision, JSON; null for the portfolio as it is.</summary>
    public byte[]? Overlay { get; init; }
    public required long Seed { get; init; }
    public required int Iterations { get; init; }
    /// <summary>Iterations whose samples are stored.</summary>
    public required int IterationsDone { get; init; }
    public string? Replaces { get; init; }
    public DateOnly? DueDate { get; init; }
    public required RunState State { get; init; }
    public required int Attempt { get; init; }
    public required bool CancelRequested { get; init; }
    public string? EngineVersion { get; init; }
    public string? InputsDigest { get; init; }
    public string? ResultDigest { get; init; }
    public string? TraceParent { get; init; }
    public required DateTimeOffset QueuedAt { get; init; }
    public DateTimeOffset? StartedAt { get; init; }
    public DateTimeOffset? FinishedAt { get; init; }
    /// <summary>The id of the key that asked.</summary>
    public required string RequestedBy { get; init; }
    /// <summary>JSON array; null before the end.</summary>
    public string? Warnings { get; init; }
    public string? Error { get; init; }
}
