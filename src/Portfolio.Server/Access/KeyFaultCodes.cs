using System.ComponentModel;

namespace Portfolio.Server.Access;

/// <summary>Codes of faults in keys that are asked for. A code never changes meaning.</summary>
internal static class KeyFaultCodes
{
    [Description("A key without any grant could do nothing.")]
    public const string GrantsEmpty = "grants.empty";

    [Description("An earlier entry grants this right on this portfolio already.")]
    public const string GrantRepeated = "grant.repeated";

    [Description("An empty list of projects reaches nothing; leave it out for the whole portfolio.")]
    public const string ProjectsEmpty = "grant.projects-empty";

    [Description("The text is not an instant of the form 2027-12-31T23:00:00Z.")]
    public const string InstantFormat = "instant.format";

    [Description("The end of the key has passed already.")]
    public const string ExpiryPast = "expiry.past";

    [Description("The hours for which the text before still opens are out of range.")]
    public const string OverlapRange = "overlap.range";
}
