using Portfolio.Store.Access;

namespace Portfolio.Server.Contracts.Keys;

/// <summary>A key. Its text is shown once, in the answer that made it.</summary>
public sealed record KeyJson
{
    public required string Id { get; init; }

    /// <summary>key, or person: somebody with tokens of the configured issuer, which say what they may do and how long.</summary>
    public required string Kind { get; init; }

    public required string Name { get; init; }

    public required IReadOnlyList<GrantJson> Grants { get; init; }

    public required DateTimeOffset CreatedAt { get; init; }

    /// <summary>Absent: never.</summary>
    public DateTimeOffset? ExpiresAt { get; init; }

    public DateTimeOffset? RevokedAt { get; init; }

    /// <summary>To the hour.</summary>
    public DateTimeOffset? LastUsedAt { get; init; }

    /// <summary>After a rotation: until when the text before still opens.</summary>
    public DateTimeOffset? OldSecretUntil { get; init; }

    /// <summary>What the holder presents. Only where a key is made or rotated; it cannot be read again.</summary>
    public string? Secret { get; init; }

    internal static KeyJson From(StoredKey key) => From(key, null);

    internal static KeyJson From(StoredKey key, string? secret) => new()
    {
        Id = key.Id,
        Kind = key.IsPerson ? "person" : "key",
        Name = key.Name,
        Grants = [.. key.Grants.Select(GrantJson.From)],
        CreatedAt = key.CreatedAt,
        ExpiresAt = key.ExpiresAt,
        RevokedAt = key.RevokedAt,
        LastUsedAt = key.LastUsedAt,
        OldSecretUntil = key.OldSecretUntil,
        Secret = secret,
    };
}

/// <summary>A right on one portfolio or on all.</summary>
public sealed record GrantJson
{
    /// <summary>read, submit, manage, finance or admin.</summary>
    public string? Right { get; init; }

    /// <summary>A portfolio's id, which need not exist yet, or * for all.</summary>
    public string? Portfolio { get; init; }

    /// <summary>The only projects it reaches. Left out: the whole portfolio.</summary>
    public IReadOnlyList<string>? Projects { get; init; }

    internal static GrantJson From(Grant grant) => new()
    {
        Right = RightWords.Of(grant.Right), Portfolio = grant.Portfolio, Projects = grant.Projects,
    };
}
