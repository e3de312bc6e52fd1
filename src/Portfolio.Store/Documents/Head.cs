namespace Portfolio.Store.Documents;

/// <summary>The newest revision, seen from inside the transaction that may replace it. Valid only until the decision has been returned.</summary>
public sealed class Head
{
    internal Head(long revision, IReadOnlyList<PartHead> parts) => (Revision, Parts) = (revision, parts);

    public long Revision { get; }

    /// <summary>Settings first, then the projects in document order.</summary>
    public IReadOnlyList<PartHead> Parts { get; }

    /// <summary>The bytes of one part; null when the document has no such part.</summary>
    public Task<byte[]?> ReadAsync(string project) => throw new NotSupportedException();

    /// <summary>All parts with their bytes, in document order.</summary>
    public Task<IReadOnlyList<StoredPart>> ReadAllAsync() => throw new NotSupportedException();

    /// <summary>True once a run was asked for: from then on the currency is fixed.</summary>
    public Task<bool> HasRunsAsync() => throw new NotSupportedException();
}
