namespace Portfolio.Store.Access;

/// <content>That somebody can always make keys. People with tokens do not count: they come and go with their issuer.</content>
public sealed partial class KeyStore
{
    private static readonly Grant Everything = new(Right.Admin, Grant.Everywhere);

    /// <summary>Makes <paramref name="secret"/> the first administrator key when there is none, and says whether it did.</summary>
    /// <exception cref="ArgumentException">The secret is shorter than 32 characters.</exception>
    public Task<bool> BootstrapAsync(string secret, CancellationToken cancellation)
    {
        if (secret.Length < KeySecret.ShortestAllowed)
            throw new ArgumentException($"A key needs at least {KeySecret.ShortestAllowed} characters.", nameof(secret));
        return database.WriteAsync(
            async open =>
            {
                if (await StrengthOfOthersAsync(open, "") > 0)
                    return false;
                var id = KeySecret.IdIn(secret) ?? KeySecret.NewId();
                var key = new KeyRow { Id = id, Name = "first administrator", CreatedAt = open.Now };
                await InsertAsync(open, Caller.System, key, secret, [Everything]);
                return true;
            },
            cancellation);
    }

    /// <summary>True when an administrator key exists, so that nothing has to be generated.</summary>
    public Task<bool> HasAdministratorAsync(CancellationToken cancellation) =>
        database.ReadAsync(async open => await StrengthOfOthersAsync(open, "") > 0, cancellation);

    private const string StrengthSql = $"""
        select coalesce(max(case when k.expires_at is null then 2 else 1 end), 0)
        from api_key k join key_grant g on g.key = k.id
        where k.id <> @Id and k.secret_hash is not null and {Living} and not {OfPerson}
          and g.granted = 'admin' and g.portfolio = '*' and g.project is null
        """;

    /// <summary>2: an administrator key for ever; 1: for some time; 0: none.</summary>
    private static Task<long> StrengthOfOthersAsync(StoreTransaction open, string id) =>
        open.FirstAsync<long>(StrengthSql, new { Id = id, open.Now });

    private static long Strength(StoredKey key, long now) =>
        key.RevokedAt is not null || key.IsPerson || key.ExpiresAt?.ToMicroseconds() <= now
        || !key.Grants.Any(grant => grant is { Right: Right.Admin, Portfolio: Grant.Everywhere, Projects: null }) ? 0
        : key.ExpiresAt is null ? 2
        : 1;

    /// <summary>
    /// Whether a change takes away the last administrator key, or leaves only keys that will end by themselves where one was for ever.
    /// </summary>
    private static async Task<bool> LocksOutAsync(StoreTransaction open, StoredKey before, StoredKey after)
    {
        var others = await StrengthOfOthersAsync(open, before.Id);
        return Math.Max(others, Strength(after, open.Now)) < Math.Max(others, Strength(before, open.Now));
    }
}
