using System.Security.Cryptography;
using System.Text;
using Portfolio.Store.Audit;

namespace Portfolio.Store.Access;

/// <summary>What a token says whose signature, issuer, audience and time have been found good.</summary>
/// <param name="Subject">Who the issuer says it is.</param>
/// <param name="Name">What people call them.</param>
public sealed record PresentedToken(
    string Issuer, string Subject, string Name, IReadOnlyList<Grant> Grants, DateTimeOffset IssuedAt, DateTimeOffset ExpiresAt);

/// <summary>
/// People known by tokens of an issuer. Each has a key row, so that grants hold in the same SQL conditions as those of keys; its rights
/// and its end are those of the newest token.
/// </summary>
public sealed class PersonStore(Database database)
{
    public const string Prefix = "oidc:";

    private const string FindSql = """
        select p.key, p.claimed, p.issued_at, k.expires_at, k.revoked_at
        from person p join api_key k on k.id = p.key where p.issuer = @Issuer and p.subject = @Subject
        """;

    /// <summary>
    /// The caller behind a token; null when an administrator has shut the person out, or when a newer token has claimed other rights: one
    /// person has one set of rights at a time.
    /// </summary>
    public async Task<Caller?> EnterAsync(PresentedToken token, CancellationToken cancellation)
    {
        var claimed = DigestOf(token.Grants);
        var known = await database.ReadAsync(open => FindAsync(open, token), cancellation);
        if (known is null || known.IsBehind(token, claimed))
            known = await database.WriteAsync(open => KeepAsync(open, token, claimed), cancellation);
        return known.RevokedAt is null && known.Claimed == claimed ? new Caller(known.Key, token.Name, token.Grants) : null;
    }

    private static Task<Row?> FindAsync(StoreTransaction open, PresentedToken token) =>
        open.FirstAsync<Row>(FindSql, new { token.Issuer, token.Subject });

    private const string RenewSql = "update api_key set name = @Name, expires_at = @ExpiresAt where id = @Key";

    private const string ClaimSql = """
        insert into person (issuer, subject, key, claimed, issued_at) values (@Issuer, @Subject, @Key, @Claimed, @IssuedAt)
        on conflict (issuer, subject) do update set claimed = excluded.claimed, issued_at = excluded.issued_at
        """;

    private static async Task<Row> KeepAsync(StoreTransaction open, PresentedToken token, string claimed)
    {
        var known = await FindAsync(open, token);
        if (known is not null && !known.IsBehind(token, claimed))
            return known;
        var expires = token.ExpiresAt.ToMicroseconds();
        var row = new Row
        {
            Key = known?.Key ?? await MakeKeyAsync(open, token),
            Claimed = claimed,
            IssuedAt = Math.Max(token.IssuedAt.ToMicroseconds(), known?.IssuedAt ?? 0),
            // Other rights end with the token that claims them, whatever was promised before.
            ExpiresAt = known?.Claimed == claimed ? Math.Max(expires, known.ExpiresAt) : expires,
        };
        await open.ExecuteAsync(RenewSql, new { token.Name, row.ExpiresAt, row.Key });
        await open.ExecuteAsync(ClaimSql, new { token.Issuer, token.Subject, row.Key, row.Claimed, row.IssuedAt });
        if (known?.Claimed != claimed)
        {
            await GrantRow.ReplaceAsync(open, row.Key, token.Grants);
            await AuditChain.AppendAsync(
                open, row.Key, "person.claim", $"keys/{row.Key}", new { token.Issuer, token.Subject, rights = WordsOf(token.Grants) });
        }
        return row;
    }

    private const string TakenSql = "select count(*) from api_key where id = @Id";

    private const string InsertSql = """
        insert into api_key (id, name, secret_hash, plain, created_at) values (@Id, @Name, @Hash, 0, @Now)
        """;

    /// <summary>A key row that nobody can present: it holds the hash of random bits which are kept nowhere.</summary>
    private static async Task<string> MakeKeyAsync(StoreTransaction open, PresentedToken token)
    {
        // Two issuers may use the same name for two people.
        var id = Prefix + token.Subject;
        for (var i = 2; await open.FirstAsync<long>(TakenSql, new { Id = id }) > 0; i++)
            id = $"{Prefix}{token.Subject}#{i}";
        await open.ExecuteAsync(InsertSql, new { Id = id, token.Name, Hash = KeySecret.HashOf(KeySecret.New(id)), open.Now });
        return id;
    }

    private static string DigestOf(IReadOnlyList<Grant> grants) =>
        Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(string.Join('\n', WordsOf(grants)))));

    private static IEnumerable<string> WordsOf(IReadOnlyList<Grant> grants) => grants
        .SelectMany(grant => (grant.Projects ?? [""]).Select(
            project => $"{RightsTable.Word(grant.Right)}:{grant.Portfolio}{(project == "" ? "" : "/" + project)}"))
        .Distinct().Order(StringComparer.Ordinal);

    private sealed record Row
    {
        public string Key { get; init; } = "";
        public string Claimed { get; init; } = "";
        public long IssuedAt { get; init; }
        public long ExpiresAt { get; init; }
        public long? RevokedAt { get; init; }

        /// <summary>Whether the token says something newer than what is kept.</summary>
        public bool IsBehind(PresentedToken token, string claimed)
        {
            var (issued, expires) = (token.IssuedAt.ToMicroseconds(), token.ExpiresAt.ToMicroseconds());
            if (RevokedAt is not null)
                return false;
            return claimed == Claimed ? issued > IssuedAt || expires > ExpiresAt : issued > IssuedAt;
        }
    }
}
