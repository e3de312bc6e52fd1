using Portfolio.Store.Access;

namespace Portfolio.Store.Documents;

/// <summary>
/// Documents in parts: settings and each project are stored once per content hash, and a revision lists only the parts it changed.
/// Who may not see a portfolio gets null or nothing, as if it did not exist.
/// </summary>
public sealed partial class DocumentStore(Database database)
{
    /// <summary>The portfolios on which the caller has any grant, by id.</summary>
    /// <param name="after">The last id of the page before; null for the first page.</param>
    public Task<IReadOnlyList<PortfolioEntry>> ListAsync(Caller caller, string? after, int limit, CancellationToken cancellation) =>
        throw new NotSupportedException(database.ToString());

    /// <summary>The document at a revision (null: the newest), with the parts that the caller may read; null when there is no such revision.</summary>
    public Task<StoredDocument?> ReadAsync(Caller caller, string portfolio, long? revision, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>The same without contents: enough for entity tags.</summary>
    public Task<IReadOnlyList<PartHead>?> ReadHeadsAsync(Caller caller, string portfolio, long? revision, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>One part at a revision (null: the newest). A project can also be read with the right to submit to it.</summary>
    /// <param name="project">The project's id, or <see cref="PartNames.Settings"/>.</param>
    public Task<StoredPart?> ReadPartAsync(Caller caller, string portfolio, string project, long? revision, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>Revisions, newest first, with numbers below <paramref name="before"/> (null: from the newest).</summary>
    public Task<IReadOnlyList<StoredRevision>> ListRevisionsAsync(Caller caller, string portfolio, long? before, int limit, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>One revision (null: the newest).</summary>
    public Task<StoredRevision?> FindRevisionAsync(Caller caller, string portfolio, long? number, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>The revision that was current at an instant: the last one recorded at or before it.</summary>
    public Task<StoredRevision?> FindRevisionAtAsync(Caller caller, string portfolio, DateTimeOffset instant, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>What a revision changed, in document order, as far as the caller may read the parts.</summary>
    public Task<IReadOnlyList<PartChange>> ListChangesAsync(Caller caller, string portfolio, long number, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>
    /// The one write path, one transaction: the head is read, <paramref name="decide"/> looks at it (null: the portfolio does not exist yet) and proposes, then
    /// revision, parts, audit entry and outbox row are written. When <paramref name="decide"/> throws, nothing is kept.
    /// </summary>
    public Task<WriteResult> WriteAsync(
        Caller caller, DocumentWrite write, Func<Head?, CancellationToken, Task<Proposal>> decide, CancellationToken cancellation) => throw new NotSupportedException();
}
