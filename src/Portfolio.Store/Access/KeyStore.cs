namespace Portfolio.Store.Access;

/// <summary>Keys and their grants. Of the presented text only the SHA-256 is kept.</summary>
public sealed partial class KeyStore(Database database)
{
    private const string Living = "k.revoked_at is null and (k.expires_at is null or k.expires_at > @Now)";

    private const string OfPerson = "exists (select 1 from person p where p.key = k.id)";

    private const string Columns = $"""
        k.id, k.name, k.created_at, k.expires_at, k.revoked_at, k.last_used_at, k.old_until,
          case when {OfPerson} then 1 else 0 end as person
        """;

    private const string GrantsSql = "select key, granted, portfolio, project from key_grant where key = @Key";

    private const string NamedSql = $"select {Columns}, k.secret_hash, k.old_hash from api_key k where k.id = @Id and {Living}";

    private const string PlainSql = $"""
        select {Columns}, k.secret_hash, k.old_hash from api_key k where k.plain = 1 and k.secret_hash is not null and {Living}
        """;

    /// <summary>
    /// The caller behind a presented key; null when it is unknown, expired or revoked. The key is found by the id that its text names and
    /// hashes are compared in constant time; where there is no such key a hash is compared all the same.
    /// </summary>
    public async Task<Caller?> AuthenticateAsync(string presented, CancellationToken cancellation)
    {
        var (row, caller) = await database.ReadAsync(
            async open =>
            {
                var id = KeySecret.IdIn(presented);
                var rows = await open.ListAsync<KeyRow>(id is null ? PlainSql : NamedSql, new { Id = id, open.Now });
                var found = Opened(rows.DefaultIfEmpty(KeyRow.Nobody), KeySecret.HashOf(presented), open.Now);
                var grants = await open.ListAsync<GrantRow>(GrantsSql, new { Key = found?.Id ?? "" });
                return (found, found is null ? null : new Caller(found.Id, found.Name, GrantRow.ToGrants(grants)));
            },
            cancellation);
        if (row is not null)
            await RememberUseAsync(row, cancellation);
        return caller;
    }

    // All are compared, whether or not one was found already.
    private static KeyRow? Opened(IEnumerable<KeyRow> rows, string hash, long now)
    {
        KeyRow? found = null;
        foreach (var row in rows)
        {
            var (current, old) = (KeySecret.Same(row.SecretHash, hash), KeySecret.Same(row.OldHash, hash));
            if (current || (old && row.OldUntil > now))
                found = row;
        }
        return found;
    }

    private const long Hour = 3_600_000_000;

    private const string UsedSql = """
        update api_key set last_used_at = @Used where id = @Id and (last_used_at is null or last_used_at < @Used)
        """;

    /// <summary>Kept to the hour, so that reading stays reading; a disk that takes no writes keeps nobody from reading either.</summary>
    private async Task RememberUseAsync(KeyRow row, CancellationToken cancellation)
    {
        var now = database.Clock.GetUtcNow().ToMicroseconds();
        var used = now - (now % Hour);
        if (row.LastUsedAt >= used)
            return;
        try
        {
            await database.WriteAsync(open => open.ExecuteAsync(UsedSql, new { row.Id, Used = used }), cancellation);
        }
        catch (StoreUnavailableException)
        {
        }
    }

    private static readonly string FindSql = $"""
        select {Columns} from api_key k
        where k.id = @Id and k.secret_hash is not null and (k.id = @Caller or {Granted.Everywhere(Right.Admin)})
        """;

    /// <summary>
    /// One key with its grants; null when there is none or the caller may not see it (administrators see all, others themselves).
    /// </summary>
    public Task<StoredKey?> FindAsync(Caller caller, string id, CancellationToken cancellation) =>
        database.ReadAsync(open => FindAsync(open, caller, id), cancellation);

    private static async Task<StoredKey?> FindAsync(StoreTransaction open, Caller caller, string id)
    {
        var row = await open.FirstAsync<KeyRow>(FindSql, new { Caller = caller.KeyId, open.Now, Id = id });
        return row?.ToKey(await open.ListAsync<GrantRow>(GrantsSql, new { Key = row.Id }), open.Now);
    }

    private static readonly string ListSql = $"""
        select {Columns} from api_key k
        where k.secret_hash is not null and {Granted.Everywhere(Right.Admin)}
          and (@After is null or (k.created_at, k.id) > (select a.created_at, a.id from api_key a where a.id = @After))
        order by k.created_at, k.id limit @Limit
        """;

    private const string AllGrantsSql = "select key, granted, portfolio, project from key_grant";

    /// <summary>Keys of all kinds, oldest first; none when the caller is no administrator.</summary>
    /// <param name="after">The last id of the page before; null for the first page.</param>
    public Task<IReadOnlyList<StoredKey>> ListAsync(
        Caller caller, string? after, int limit, CancellationToken cancellation) => database.ReadAsync<IReadOnlyList<StoredKey>>(
        async open =>
        {
            var rows = await open.ListAsync<KeyRow>(
                ListSql, new { Caller = caller.KeyId, open.Now, After = after, Limit = limit });
            var grants = (await open.ListAsync<GrantRow>(AllGrantsSql)).ToLookup(grant => grant.Key);
            return [.. rows.Select(row => row.ToKey(grants[row.Id], open.Now))];
        },
        cancellation);
}
