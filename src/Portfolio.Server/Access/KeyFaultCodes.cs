namespace Portfolio.Server.Access;

/// <summary>Codes of faults in keys that are asked for. A code never changes meaning.</summary>
internal static class KeyFaultCodes
{
    public const string GrantsEmpty = "grants.empty";
    public const string GrantRepeated = "grant.repeated";
    public const string ProjectsEmpty = "grant.projects-empty";
    public const string InstantFormat = "instant.format";
    public const string ExpiryPast = "expiry.past";
    public const string OverlapRange = "overlap.range";
}
