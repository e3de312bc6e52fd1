namespace Portfolio.Server.Events;

/// <summary>What events are called: here and in subscriptions without, on the wire with the prefix. A name never changes meaning.</summary>
internal static class EventTypes
{
    public const string RunSucceeded = "run.succeeded";
    public const string RunFailed = "run.failed";
    public const string RunCancelled = "run.cancelled";
    public const string RevisionCreated = "revision.created";
    public const string PostRefused = "post.refused";
    public const string LevelMoved = "level.moved";
    public const string CommitmentBelow = "commitment.belowProbability";
    public const string EstimatesStale = "estimates.stale";

    /// <summary>Those that a subscription can ask for.</summary>
    public static readonly IReadOnlyList<string> Wanted =
        [RunSucceeded, RunFailed, RunCancelled, RevisionCreated, PostRefused, LevelMoved, CommitmentBelow, EstimatesStale];

    private const string Prefix = "portfolio.";

    /// <summary>The CloudEvents type of a kind.</summary>
    public static string Of(string kind) => Prefix + kind;
}
