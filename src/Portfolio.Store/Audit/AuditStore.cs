using Portfolio.Store.Access;

namespace Portfolio.Store.Audit;

/// <summary>One line of the audit trail.</summary>
public sealed record AuditEntry
{
    /// <summary>1, 2, 3 … without gaps.</summary>
    public required long Sequence { get; init; }
    public required DateTimeOffset At { get; init; }
    /// <summary>The id of the key that acted.</summary>
    public required string Actor { get; init; }
    public required string Action { get; init; }
    public required string Object { get; init; }
    /// <summary>JSON; its members depend on the action.</summary>
    public required string Detail { get; init; }
    public required string PreviousHash { get; init; }
    public required string Hash { get; init; }
}

/// <summary>What a check of the chain found.</summary>
/// <param name="Entries">Entries that are whole, counted from the first.</param>
/// <param name="FirstBroken">The sequence number of the first entry that is missing or altered; null when the chain is whole.</param>
/// <param name="HeadHash">The hash of the last whole entry: kept elsewhere, it shows a trail cut short.</param>
public sealed record AuditVerification(long Entries, long? FirstBroken, string HeadHash);

/// <summary>The append-only trail, each entry chained to the one before by SHA-256.</summary>
public sealed class AuditStore(Database database)
{
    /// <summary>Appends within a transaction that somebody else commits.</summary>
    /// <param name="detail">An object that serialises to JSON.</param>
    public Task AppendAsync(StoreTransaction transaction, Caller caller, string action, string @object, object detail) => throw new NotSupportedException(database.ToString());

    /// <summary>Appends in a transaction of its own.</summary>
    public Task AppendAsync(Caller caller, string action, string @object, object detail, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>Entries, newest first, with numbers below <paramref name="before"/>; none unless the caller administers all portfolios.</summary>
    public Task<IReadOnlyList<AuditEntry>> ListAsync(Caller caller, long? before, int limit, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>Recomputes the whole chain from entry 1.</summary>
    public Task<AuditVerification> VerifyAsync(CancellationToken cancellation) => throw new NotSupportedException();
}
