namespace Portfolio.Store.Audit;

/// <summary>One line of the audit trail.</summary>
public sealed record AuditEntry
{
    /// <summary>1, 2, 3 … without gaps.</summary>
    public required long Sequence { get; init; }
    public required DateTimeOffset At { get; init; }
    /// <summary>The id of the key that acted.</summary>
    public required string Actor { get; init; }
    public required string Action { get; init; }
    public required string Object { get; init; }
    /// <summary>JSON; its members depend on the action.</summary>
    public required string Detail { get; init; }
    public required string PreviousHash { get; init; }
    public required string Hash { get; init; }
}

/// <summary>Which entries are asked for; what is null does not narrow them.</summary>
public sealed record AuditQuestion
{
    /// <summary>Only numbers below this one: the page after.</summary>
    public long? Before { get; init; }
    public string? Actor { get; init; }
    /// <summary>The beginning of the action: <c>key</c> for all of <c>key.create</c>, <c>key.rotate</c> …</summary>
    public string? Action { get; init; }
    public string? Portfolio { get; init; }
    public DateTimeOffset? From { get; init; }
    /// <summary>The first instant that is no longer asked for.</summary>
    public DateTimeOffset? Until { get; init; }
}

/// <summary>What a check of the chain found.</summary>
/// <param name="Entries">Entries that are whole, counted from the first.</param>
/// <param name="FirstBroken">The sequence number of the first entry that is missing or altered; null when the chain is whole.</param>
/// <param name="HeadHash">The hash of the last whole entry: kept elsewhere, it shows a trail cut short.</param>
public sealed record AuditVerification(long Entries, long? FirstBroken, string HeadHash);
