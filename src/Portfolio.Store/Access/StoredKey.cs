namespace Portfolio.Store.Access;

/// <summary>A key as shown to administrators; the secret itself is never stored.</summary>
public sealed record StoredKey
{
    public required string Id { get; init; }
    public required string Name { get; init; }
    public required DateTimeOffset CreatedAt { get; init; }
    public DateTimeOffset? ExpiresAt { get; init; }
    public DateTimeOffset? RevokedAt { get; init; }
    public required IReadOnlyList<Grant> Grants { get; init; }
}

/// <summary>A key just made, with the text that its holder presents. The text is shown once and cannot be read again.</summary>
public sealed record NewKey(StoredKey Key, string Secret);

internal sealed record KeyRow
{
    public string Id { get; init; } = "";
    public string Name { get; init; } = "";
    public long CreatedAt { get; init; }
    public long? ExpiresAt { get; init; }
    public long? RevokedAt { get; init; }

    public StoredKey ToKey(IEnumerable<GrantRow> grants) => new()
    {
        Id = Id,
        Name = Name,
        CreatedAt = CreatedAt.ToInstant(),
        ExpiresAt = ExpiresAt.ToInstant(),
        RevokedAt = RevokedAt.ToInstant(),
        Grants = GrantRow.ToGrants(grants.Where(grant => grant.Key == Id)),
    };
}

/// <summary>A grant as kept: one row for each project that it is limited to.</summary>
internal sealed record GrantRow
{
    public string Key { get; init; } = "";
    public string Granted { get; init; } = "";
    public string Portfolio { get; init; } = "";
    public string? Project { get; init; }

    public static IReadOnlyList<Grant> ToGrants(IEnumerable<GrantRow> rows) =>
    [
        .. rows.GroupBy(row => (row.Granted, row.Portfolio, Limited: row.Project is not null))
            .Select(group => new Grant(
                RightsTable.Parse(group.Key.Granted),
                group.Key.Portfolio,
                group.Key.Limited ? [.. group.Select(row => row.Project!)] : null)),
    ];

    public static IEnumerable<GrantRow> From(string key, Grant grant)
    {
        var row = new GrantRow { Key = key, Granted = RightsTable.Word(grant.Right), Portfolio = grant.Portfolio };
        return grant.Projects is null ? [row] : grant.Projects.Select(project => row with { Project = project });
    }
}
