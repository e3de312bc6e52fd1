using Portfolio.Store.Access;

namespace Portfolio.Store.Audit;

/// <summary>The append-only trail, each entry chained to the one before by SHA-256.</summary>
public sealed class AuditStore(Database database)
{
    /// <summary>Appends within a transaction that somebody else commits.</summary>
    /// <param name="detail">An object that serialises to JSON.</param>
    public Task AppendAsync(StoreTransaction transaction, Caller caller, string action, string @object, object detail) =>
        AuditChain.AppendAsync(transaction, caller.KeyId, action, @object, detail);

    /// <summary>Appends in a transaction of its own.</summary>
    public Task AppendAsync(Caller caller, string action, string @object, object detail, CancellationToken cancellation) =>
        database.WriteAsync(
            async open =>
            {
                await AuditChain.AppendAsync(open, caller.KeyId, action, @object, detail);
                return true;
            },
            cancellation);

    private static readonly string ListSql = $"""
        select sequence, at, actor, action, object, detail, prev_hash, hash from audit
        where (@Before is null or sequence < @Before) and {Granted.Everywhere(Right.Admin)}
        order by sequence desc limit @Limit
        """;

    /// <summary>
    /// Entries, newest first, with numbers below <paramref name="before"/>; none unless the caller administers all portfolios.
    /// </summary>
    public async Task<IReadOnlyList<AuditEntry>> ListAsync(Caller caller, long? before, int limit, CancellationToken cancellation)
    {
        var rows = await database.ReadAsync(
            open => open.ListAsync<AuditRow>(
                ListSql, new { Caller = caller.KeyId, open.Now, Before = before, Limit = limit }), cancellation);
        return [.. rows.Select(ToEntry)];
    }

    private const string ChainSql = "select sequence, at, actor, action, object, detail, prev_hash, hash from audit order by sequence";

    /// <summary>Recomputes the whole chain from entry 1.</summary>
    public Task<AuditVerification> VerifyAsync(CancellationToken cancellation) => database.ReadAsync(
        async open =>
        {
            var (sequence, head) = (0L, AuditChain.Genesis);
            await foreach (var entry in open.StreamAsync<AuditRow>(ChainSql).WithCancellation(cancellation))
            {
                if (entry.Sequence != sequence + 1 || entry.PrevHash != head || entry.Hash != AuditChain.HashOf(entry))
                    return new AuditVerification(sequence, sequence + 1, head);
                (sequence, head) = (entry.Sequence, entry.Hash);
            }
            return new AuditVerification(sequence, null, head);
        },
        cancellation);

    private static AuditEntry ToEntry(AuditRow row) => new()
    {
        Sequence = row.Sequence,
        At = row.At.ToInstant(),
        Actor = row.Actor,
        Action = row.Action,
        Object = row.Object,
        Detail = row.Detail,
        PreviousHash = row.PrevHash,
        Hash = row.Hash,
    };
}
