using Portfolio.Store.Audit;

namespace Portfolio.Store.Access;

/// <summary>
/// Keys and their grants. Of the presented text only the SHA-256 is kept: a slow hash is for passwords, not for 256 random bits.
/// </summary>
public sealed class KeyStore(Database database)
{
    private const string Columns = "k.id, k.name, k.created_at, k.expires_at, k.revoked_at";

    private const string GrantsSql = "select key, granted, portfolio, project from key_grant where key = @Key";

    private const string AuthenticateSql = $"""
        select {Columns} from api_key k
        where k.secret_hash = @Hash and k.revoked_at is null and (k.expires_at is null or k.expires_at > @Now)
        """;

    /// <summary>The caller behind a presented key; null when it is unknown, expired or revoked.</summary>
    public Task<Caller?> AuthenticateAsync(string presented, CancellationToken cancellation) => database.ReadAsync(
        async open =>
        {
            var row = await open.FirstAsync<KeyRow>(AuthenticateSql, new { Hash = KeySecret.HashOf(presented), open.Now });
            if (row is null)
                return null;
            var grants = await open.ListAsync<GrantRow>(GrantsSql, new { Key = row.Id });
            return new Caller(row.Id, row.Name, GrantRow.ToGrants(grants));
        },
        cancellation);

    /// <summary>Makes <paramref name="secret"/> the first administrator key when there is none, and says whether it did.</summary>
    /// <exception cref="ArgumentException">The secret is shorter than 32 characters.</exception>
    public Task<bool> BootstrapAsync(string secret, CancellationToken cancellation)
    {
        if (secret.Length < KeySecret.ShortestAllowed)
            throw new ArgumentException($"A key needs at least {KeySecret.ShortestAllowed} characters.", nameof(secret));
        return database.WriteAsync(
            async open =>
            {
                if (await HasAdministratorAsync(open))
                    return false;
                var key = new KeyRow { Id = KeySecret.NewId(), Name = "first administrator", CreatedAt = open.Now };
                await InsertAsync(open, Caller.System, key, secret, [new Grant(Right.Admin, Grant.Everywhere)]);
                return true;
            },
            cancellation);
    }

    private const string AdministratorSql = """
        select count(*) from api_key k join key_grant g on g.key = k.id
        where k.secret_hash is not null and k.revoked_at is null and (k.expires_at is null or k.expires_at > @Now)
          and g.granted = 'admin' and g.portfolio = '*' and g.project is null
        """;

    /// <summary>True when an administrator key exists, so that nothing has to be generated.</summary>
    public Task<bool> HasAdministratorAsync(CancellationToken cancellation) => database.ReadAsync(HasAdministratorAsync, cancellation);

    private static async Task<bool> HasAdministratorAsync(StoreTransaction open) =>
        await open.FirstAsync<long>(AdministratorSql, new { open.Now }) > 0;

    private static readonly string MayAdministerSql = $"select case when {Granted.Everywhere(Right.Admin)} then 1 else 0 end";

    /// <summary>Makes a key; null when the caller is no administrator of all portfolios.</summary>
    public Task<NewKey?> CreateAsync(
        Caller caller,
        string name,
        IReadOnlyList<Grant> grants,
        DateTimeOffset? expiresAt,
        CancellationToken cancellation) => database.WriteAsync(
        async open =>
        {
            if (await open.FirstAsync<long>(MayAdministerSql, new { Caller = caller.KeyId, open.Now }) == 0)
                return null;
            var row = new KeyRow { Id = KeySecret.NewId(), Name = name, CreatedAt = open.Now, ExpiresAt = expiresAt?.ToMicroseconds() };
            var secret = KeySecret.New(row.Id);
            var kept = await InsertAsync(open, caller, row, secret, grants);
            return new NewKey(row.ToKey(kept), secret);
        },
        cancellation);

    private static readonly string FindSql = $"""
        select {Columns} from api_key k
        where k.id = @Id and k.secret_hash is not null and (k.id = @Caller or {Granted.Everywhere(Right.Admin)})
        """;

    /// <summary>
    /// One key with its grants; null when there is none or the caller may not see it (administrators see all, others themselves).
    /// </summary>
    public Task<StoredKey?> FindAsync(Caller caller, string id, CancellationToken cancellation) => database.ReadAsync(
        async open =>
        {
            var row = await open.FirstAsync<KeyRow>(FindSql, new { Caller = caller.KeyId, open.Now, Id = id });
            return row?.ToKey(await open.ListAsync<GrantRow>(GrantsSql, new { Key = row.Id }));
        },
        cancellation);

    private static readonly string ListSql = $"""
        select {Columns} from api_key k where k.secret_hash is not null and {Granted.Everywhere(Right.Admin)} order by k.created_at, k.id
        """;

    private const string AllGrantsSql = "select key, granted, portfolio, project from key_grant";

    /// <summary>All keys, oldest first; none when the caller is no administrator.</summary>
    public Task<IReadOnlyList<StoredKey>> ListAsync(
        Caller caller, CancellationToken cancellation) => database.ReadAsync<IReadOnlyList<StoredKey>>(
        async open =>
        {
            var rows = await open.ListAsync<KeyRow>(ListSql, new { Caller = caller.KeyId, open.Now });
            var grants = (await open.ListAsync<GrantRow>(AllGrantsSql)).ToLookup(grant => grant.Key);
            return [.. rows.Select(row => row.ToKey(grants[row.Id]))];
        },
        cancellation);

    private static readonly string RevokeSql = $"""
        update api_key set revoked_at = @Now
        where id = @Id and revoked_at is null and secret_hash is not null and {Granted.Everywhere(Right.Admin)}
        """;

    /// <summary>Ends a key at once; false when there is no such living key or the caller is no administrator.</summary>
    public Task<bool> RevokeAsync(Caller caller, string id, CancellationToken cancellation) => database.WriteAsync(
        async open =>
        {
            if (await open.ExecuteAsync(RevokeSql, new { Caller = caller.KeyId, open.Now, Id = id }) == 0)
                return false;
            await AuditChain.AppendAsync(open, caller.KeyId, "key.revoke", $"keys/{id}", new { });
            return true;
        },
        cancellation);

    private const string InsertKeySql = """
        insert into api_key (id, name, secret_hash, created_at, expires_at) values (@Id, @Name, @Hash, @CreatedAt, @ExpiresAt)
        """;

    private const string InsertGrantSql =
        "insert into key_grant (key, granted, portfolio, project) values (@Key, @Granted, @Portfolio, @Project)";

    private static async Task<IReadOnlyList<GrantRow>> InsertAsync(
        StoreTransaction open, Caller caller, KeyRow key, string secret, IReadOnlyList<Grant> grants)
    {
        await open.ExecuteAsync(InsertKeySql, new { key.Id, key.Name, Hash = KeySecret.HashOf(secret), key.CreatedAt, key.ExpiresAt });
        GrantRow[] rows = [.. grants.SelectMany(grant => GrantRow.From(key.Id, grant)).Distinct()];
        foreach (var row in rows)
            await open.ExecuteAsync(InsertGrantSql, row);
        await AuditChain.AppendAsync(
            open, caller.KeyId, "key.create", $"keys/{key.Id}", new { key.Name, grants, expiresAt = key.ExpiresAt.ToInstant() });
        return rows;
    }
}
