using Portfolio.Store.Audit;

namespace Portfolio.Store.Access;

/// <content>Making keys and changing them, for administrators of all portfolios.</content>
public sealed partial class KeyStore
{
    private static readonly string MayAdministerSql = $"select case when {Granted.Everywhere(Right.Admin)} then 1 else 0 end";

    private static async Task<bool> MayAdministerAsync(StoreTransaction open, Caller caller) =>
        await open.FirstAsync<long>(MayAdministerSql, new { Caller = caller.KeyId, open.Now }) == 1;

    /// <summary>The same, with nothing that joins.</summary>
    public Task<NewKey?> CreateAsync(
        Caller caller, string name, IReadOnlyList<Grant> grants, DateTimeOffset? expiresAt, CancellationToken cancellation) =>
        CreateAsync(caller, name, grants, expiresAt, joining: null, cancellation);

    /// <summary>Makes a key; null when the caller is no administrator of all portfolios.</summary>
    /// <param name="joining">Called last inside the transaction with what was made, but not its text; null for none.</param>
    public Task<NewKey?> CreateAsync(
        Caller caller,
        string name,
        IReadOnlyList<Grant> grants,
        DateTimeOffset? expiresAt,
        Func<StoreTransaction, StoredKey, CancellationToken, Task>? joining,
        CancellationToken cancellation) => database.WriteAsync(
        async open =>
        {
            if (!await MayAdministerAsync(open, caller))
                return null;
            var row = new KeyRow { Id = KeySecret.NewId(), Name = name, CreatedAt = open.Now, ExpiresAt = expiresAt?.ToMicroseconds() };
            var secret = KeySecret.New(row.Id);
            await InsertAsync(open, caller, row, secret, grants);
            var made = (await FindAsync(open, Caller.System, row.Id))!;
            if (joining is not null)
                await joining(open, made, cancellation);
            return new NewKey(made, secret);
        },
        cancellation);

    private const string InsertSql = """
        insert into api_key (id, name, secret_hash, plain, created_at, expires_at)
        values (@Id, @Name, @Hash, @Plain, @CreatedAt, @ExpiresAt)
        """;

    private static async Task InsertAsync(StoreTransaction open, Caller caller, KeyRow key, string secret, IReadOnlyList<Grant> grants)
    {
        var plain = KeySecret.IdIn(secret) == key.Id ? 0 : 1;
        await open.ExecuteAsync(
            InsertSql, new { key.Id, key.Name, Hash = KeySecret.HashOf(secret), Plain = plain, key.CreatedAt, key.ExpiresAt });
        await GrantRow.ReplaceAsync(open, key.Id, grants);
        await AuditChain.AppendAsync(
            open, caller.KeyId, "key.create", $"keys/{key.Id}",
            new { key.Name, grants = grants.Select(Told), expiresAt = key.ExpiresAt.ToInstant() });
    }

    private static object Told(Grant grant) => new { right = RightsTable.Word(grant.Right), grant.Portfolio, grant.Projects };

    private const string ChangeSql = "update api_key set name = @Name, expires_at = @Expires where id = @Id";

    /// <summary>Changes name, end or grants.</summary>
    /// <param name="joining">As everywhere here: called last inside the transaction with the key as it then is; null for none.</param>
    public Task<KeyResult> ChangeAsync(
        Caller caller, string id, KeyChange change, Func<StoreTransaction, StoredKey, CancellationToken, Task>? joining,
        CancellationToken cancellation) => OnKeyAsync(
        caller, id, joining,
        async (open, key) =>
        {
            if (key.IsPerson)
                return KeyOutcome.Person;
            if (key.RevokedAt is not null)
                return KeyOutcome.Ended;
            var changed = key with
            {
                Name = change.Name ?? key.Name,
                ExpiresAt = change.ChangesExpiry ? change.ExpiresAt : key.ExpiresAt,
                Grants = change.Grants ?? key.Grants,
            };
            if (await LocksOutAsync(open, key, changed))
                return KeyOutcome.LastAdministrator;
            await open.ExecuteAsync(ChangeSql, new { changed.Name, Expires = changed.ExpiresAt?.ToMicroseconds(), Id = id });
            if (change.Grants is { } grants)
                await GrantRow.ReplaceAsync(open, id, grants);
            await AuditChain.AppendAsync(
                open, caller.KeyId, "key.patch", $"keys/{id}",
                new { changed.Name, grants = changed.Grants.Select(Told), changed.ExpiresAt });
            return KeyOutcome.Done;
        },
        cancellation);

    private const string RotateSql = """
        update api_key set old_hash = secret_hash, old_until = @Until, secret_hash = @Hash where id = @Id
        """;

    /// <summary>Gives a key a new text; the one before still opens for a while, one before that no longer.</summary>
    public async Task<KeyResult> RotateAsync(
        Caller caller, string id, TimeSpan overlap, Func<StoreTransaction, StoredKey, CancellationToken, Task>? joining,
        CancellationToken cancellation)
    {
        var secret = KeySecret.New(id);
        var result = await OnKeyAsync(
            caller, id, joining,
            async (open, key) =>
            {
                if (key.IsPerson)
                    return KeyOutcome.Person;
                if (Strength(key with { Grants = [Everything] }, open.Now) == 0)
                    return KeyOutcome.Ended;
                var until = open.Now + (overlap.Ticks / TimeSpan.TicksPerMicrosecond);
                await open.ExecuteAsync(RotateSql, new { Until = until, Hash = KeySecret.HashOf(secret), Id = id });
                await AuditChain.AppendAsync(
                    open, caller.KeyId, "key.rotate", $"keys/{id}", new { oldSecretUntil = until.ToInstant() });
                return KeyOutcome.Done;
            },
            cancellation);
        return result.Outcome == KeyOutcome.Done ? result with { Secret = secret } : result;
    }

    private const string RevokeSql = "update api_key set revoked_at = @Now where id = @Id";

    /// <summary>Ends a key at once; a second time changes nothing.</summary>
    public Task<KeyResult> RevokeAsync(
        Caller caller, string id, Func<StoreTransaction, StoredKey, CancellationToken, Task>? joining, CancellationToken cancellation) =>
        OnKeyAsync(caller, id, joining, (open, key) => RevokeAsync(open, caller, key), cancellation);

    private static async Task<KeyOutcome> RevokeAsync(StoreTransaction open, Caller caller, StoredKey key)
    {
        if (key.RevokedAt is not null)
            return KeyOutcome.Done;
        if (await LocksOutAsync(open, key, key with { RevokedAt = open.Now.ToInstant() }))
            return KeyOutcome.LastAdministrator;
        await open.ExecuteAsync(RevokeSql, new { open.Now, key.Id });
        await AuditChain.AppendAsync(open, caller.KeyId, "key.revoke", $"keys/{key.Id}", new { });
        return KeyOutcome.Done;
    }

    private Task<KeyResult> OnKeyAsync(
        Caller caller, string id, Func<StoreTransaction, StoredKey, CancellationToken, Task>? joining,
        Func<StoreTransaction, StoredKey, Task<KeyOutcome>> work, CancellationToken cancellation) => database.WriteAsync(
        async open =>
        {
            if (!await MayAdministerAsync(open, caller))
                return new KeyResult(KeyOutcome.Forbidden);
            if (await FindAsync(open, caller, id) is not { } key)
                return new KeyResult(KeyOutcome.NotFound);
            if (await work(open, key) is not KeyOutcome.Done and var refused)
                return new KeyResult(refused);
            var done = (await FindAsync(open, Caller.System, id))!;
            if (joining is not null)
                await joining(open, done, cancellation);
            return new KeyResult(KeyOutcome.Done, done);
        },
        cancellation);
}
