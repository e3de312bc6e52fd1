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

/// <summary>Keys and their grants. Of the presented text only the SHA-256 is kept: a slow hash is for passwords, not for 256 random bits.</summary>
public sealed class KeyStore(Database database)
{
    /// <summary>The caller behind a presented key; null when it is unknown, expired or revoked.</summary>
    public Task<Caller?> AuthenticateAsync(string presented, CancellationToken cancellation) => throw new NotSupportedException(database.ToString());

    /// <summary>Makes <paramref name="secret"/> the first administrator key when there is none, and says whether it did.</summary>
    /// <exception cref="ArgumentException">The secret is shorter than 32 characters.</exception>
    public Task<bool> BootstrapAsync(string secret, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>True when an administrator key exists, so that nothing has to be generated.</summary>
    public Task<bool> HasAdministratorAsync(CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>Makes a key; null when the caller is no administrator of all portfolios.</summary>
    public Task<NewKey?> CreateAsync(
        Caller caller, string name, IReadOnlyList<Grant> grants, DateTimeOffset? expiresAt, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>One key with its grants; null when there is none or the caller may not see it (administrators see all, others themselves).</summary>
    public Task<StoredKey?> FindAsync(Caller caller, string id, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>All keys, oldest first; none when the caller is no administrator.</summary>
    public Task<IReadOnlyList<StoredKey>> ListAsync(Caller caller, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>Ends a key at once; false when there is no such living key or the caller is no administrator.</summary>
    public Task<bool> RevokeAsync(Caller caller, string id, CancellationToken cancellation) => throw new NotSupportedException();
}
