namespace Portfolio.Store.Access;

/// <summary>A key as shown to administrators; the secret itself is never stored.</summary>
public sealed record StoredKey
{
    public required string Id { get; init; }
    public required string Name { get; init; }
    public required DateTimeOffset CreatedAt { get; init; }
    public DateTimeOffset? ExpiresAt { get; init; }
    public DateTimeOffset? RevokedAt { get; init; }
    /// <summary>To the hour.</summary>
    public DateTimeOffset? LastUsedAt { get; init; }
    /// <summary>Until when the secret before the last rotation still opens; null when it does not.</summary>
    public DateTimeOffset? OldSecretUntil { get; init; }
    /// <summary>A person who comes with tokens of an issuer: its rights and its end are theirs.</summary>
    public bool IsPerson { get; init; }
    public required IReadOnlyList<Grant> Grants { get; init; }
}

/// <summary>A key just made or rotated, with the text that its holder presents. The text is shown once and cannot be read again.</summary>
public sealed record NewKey(StoredKey Key, string Secret);

internal sealed record KeyRow
{
    /// <summary>Stands where there is no key, so that something is compared all the same.</summary>
    public static readonly KeyRow Nobody = new();

    public string Id { get; init; } = "";
    public string Name { get; init; } = "";
    public long CreatedAt { get; init; }
    public long? ExpiresAt { get; init; }
    public long? RevokedAt { get; init; }
    public long? LastUsedAt { get; init; }
    public string? SecretHash { get; init; }
    public string? OldHash { get; init; }
    public long? OldUntil { get; init; }
    public long Person { get; init; }

    public StoredKey ToKey(IEnumerable<GrantRow> grants, long now) => new()
    {
        Id = Id,
        Name = Name,
        CreatedAt = CreatedAt.ToInstant(),
        ExpiresAt = ExpiresAt.ToInstant(),
        RevokedAt = RevokedAt.ToInstant(),
        LastUsedAt = LastUsedAt.ToInstant(),
        OldSecretUntil = OldUntil > now ? OldUntil.ToInstant() : null,
        IsPerson = Person == 1,
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

    private static IEnumerable<GrantRow> From(string key, Grant grant)
    {
        var row = new GrantRow { Key = key, Granted = RightsTable.Word(grant.Right), Portfolio = grant.Portfolio };
        return grant.Projects is null ? [row] : grant.Projects.Select(project => row with { Project = project });
    }

    private const string ClearSql = "delete from key_grant where key = @Key";

    private const string InsertSql =
        "insert into key_grant (key, granted, portfolio, project) values (@Key, @Granted, @Portfolio, @Project)";

    /// <summary>Puts these grants in the place of whatever the key has.</summary>
    public static async Task ReplaceAsync(StoreTransaction open, string key, IReadOnlyList<Grant> grants)
    {
        await open.ExecuteAsync(ClearSql, new { Key = key });
        await open.ExecuteEachAsync(InsertSql, grants.SelectMany(grant => From(key, grant)).Distinct());
    }
}
