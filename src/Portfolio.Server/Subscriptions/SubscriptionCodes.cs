namespace Portfolio.Server.Subscriptions;

/// <summary>Codes of faults in subscriptions, beside those of every document and <c>url.…</c>. A code never changes meaning.</summary>
internal static class SubscriptionCodes
{
    public const string IdFormat = "id.format";
    public const string IdFixed = "id.fixed";
    public const string NothingWanted = "events.none";
    public const string TooManyWanted = "events.too-many";
    public const string WantedTwice = "events.duplicate";
    public const string ScopeFormat = "scope.format";
    public const string MilestoneWithoutCost = "metric.milestone";
    public const string LevelNotKept = "level.not-kept";
    public const string OutOfRange = "number.range";
}
