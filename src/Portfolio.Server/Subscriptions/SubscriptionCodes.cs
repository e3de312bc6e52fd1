using System.ComponentModel;

namespace Portfolio.Server.Subscriptions;

/// <summary>Codes of faults in subscriptions, beside those of every document and those of <see cref="Webhooks.TargetCodes"/>. A code never changes meaning.</summary>
internal static class SubscriptionCodes
{
    [Description("The id is not 1 to 64 letters, digits, dots, hyphens and underscores that begin with a letter or a digit.")]
    public const string IdFormat = "id.format";

    [Description("The id of a subscription cannot change.")]
    public const string IdFixed = "id.fixed";

    [Description("The subscription names no event.")]
    public const string NothingWanted = "events.none";

    [Description("The subscription names too many events.")]
    public const string TooManyWanted = "events.too-many";

    [Description("The subscription names an event twice.")]
    public const string WantedTwice = "events.duplicate";

    [Description("The text names no scope: portfolio, programme/…, project/… or milestone/….")]
    public const string ScopeFormat = "scope.format";

    [Description("A milestone has a finish, but no cost.")]
    public const string MilestoneWithoutCost = "metric.milestone";

    [Description("The level is none of those that are kept of every run; the message names them.")]
    public const string LevelNotKept = "level.not-kept";

    [Description("The number or date is out of range; the message names the range.")]
    public const string OutOfRange = "number.range";
}
