namespace Portfolio.Store.Access;

/// <summary>What shall change of a key; what is null stays.</summary>
public sealed record KeyChange
{
    public string? Name { get; init; }

    /// <summary>True: <see cref="ExpiresAt"/> is set, even to never (null).</summary>
    public bool ChangesExpiry { get; init; }

    public DateTimeOffset? ExpiresAt { get; init; }

    /// <summary>Replace those that it has.</summary>
    public IReadOnlyList<Grant>? Grants { get; init; }
}

/// <summary>How changing, rotating or revoking a key ended.</summary>
public enum KeyOutcome
{
    Done,
    /// <summary>No such key for this caller.</summary>
    NotFound,
    /// <summary>The caller does not administer all portfolios.</summary>
    Forbidden,
    /// <summary>Nobody could make keys any more.</summary>
    LastAdministrator,
    /// <summary>It is expired or revoked.</summary>
    Ended,
    /// <summary>What a person may do, and how long, stands in the tokens of the issuer.</summary>
    Person,
}

/// <summary>The answer.</summary>
/// <param name="Key">As it now is; null unless done.</param>
/// <param name="Secret">The new text, after a rotation.</param>
public sealed record KeyResult(KeyOutcome Outcome, StoredKey? Key = null, string? Secret = null);
