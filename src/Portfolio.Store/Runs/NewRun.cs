namespace Portfolio.Store.Runs;

/// <summary>A run that is asked for. Revision, seed and iterations are already settled.</summary>
public sealed record NewRun
{
    public required string Portfolio { get; init; }
    public required DateOnly AsOf { get; init; }

    /// <summary>The first instant after the local date <see cref="AsOf"/>: until then the date is open.</summary>
    public required DateTimeOffset DateEndsAt { get; init; }
    public required long Revision { get; init; }
    public required long Seed { get; init; }
    public required int Iterations { get; init; }
    public required bool Recorded { get; init; }

    /// <summary>The run that this one shall take the place of, once it has succeeded.</summary>
    public string? Replaces { get; init; }
    public byte[]? Overlay { get; init; }

    /// <summary>It is not taken when this many runs of the portfolio wait already; null: however many there are.</summary>
    public int? MostQueued { get; init; }

    /// <summary>W3C trace context of the request, so that the job continues its trace.</summary>
    public string? TraceParent { get; init; }
}

/// <summary>How asking for a run ended.</summary>
public enum RunRequestOutcome
{
    Created,
    /// <summary>The due date already has its run, which is returned.</summary>
    AlreadyDue,
    /// <summary>No such portfolio or revision for this caller (404).</summary>
    NotFound,
    /// <summary>The caller knows the portfolio but does not manage it (403).</summary>
    Forbidden,
    /// <summary>The portfolio is archived (409).</summary>
    Archived,
    /// <summary>The date is closed and a run stands for it, or one accepted earlier is on its way to (409).</summary>
    DateHeld,
    /// <summary>
    /// <see cref="NewRun.Replaces"/> names no recorded run of this portfolio and date, or the new run is not recorded (422).
    /// </summary>
    ReplacesUnknown,
    /// <summary><see cref="NewRun.Replaces"/> names a run that does not stand for the date (409).</summary>
    ReplacesNotThePoint,
    /// <summary>As many runs of the portfolio wait as <see cref="NewRun.MostQueued"/> allows (429).</summary>
    QueueFull,
}

/// <summary>
/// The answer; <see cref="Run"/> is the new run, for <see cref="RunRequestOutcome.AlreadyDue"/> and <see
/// cref="RunRequestOutcome.DateHeld"/> the one in the way, else null.
/// </summary>
public sealed record RunRequestResult(RunRequestOutcome Outcome, StoredRun? Run);
