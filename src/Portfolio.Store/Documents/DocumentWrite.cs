using Portfolio.Store.Access;

namespace Portfolio.Store.Documents;

/// <summary>A write of the document, before it is decided.</summary>
public sealed record DocumentWrite
{
    public required string Portfolio { get; init; }

    /// <summary>
    /// <see cref="Right.Manage"/>, or <see cref="Right.Submit"/> for updates. Making a portfolio needs <see cref="Right.Admin"/> whatever
    /// is said here.
    /// </summary>
    public Right Right { get; init; } = Right.Manage;

    /// <summary>
    /// The parts that the write speaks of: without the right on each of them nothing is decided, so that no answer tells of their content.
    /// </summary>
    public IReadOnlyList<string> Parts { get; init; } = [];

    /// <summary>False for a write that never makes a portfolio: where there is none it finds nothing.</summary>
    public bool MayCreate { get; init; } = true;

    /// <summary>Kept with the revision.</summary>
    public string? Note { get; init; }

    /// <summary>What the audit entry calls it: <c>document.put</c>, <c>project.patch</c>, <c>updates.post</c> …</summary>
    public required string Action { get; init; }

    /// <summary>What the audit entry says it was done to; default the portfolio.</summary>
    public string? Object { get; init; }

    /// <summary>
    /// Called last inside the transaction, for rows that stand or fall with the write. It sees the result that will be returned.
    /// </summary>
    public Func<StoreTransaction, WriteResult, CancellationToken, Task>? Joining { get; init; }
}

/// <summary>How a write ended.</summary>
public enum WriteOutcome
{
    /// <summary>A new revision was made.</summary>
    Accepted,
    /// <summary>Nothing differed: no revision.</summary>
    Unchanged,
    /// <summary>The decision was a <see cref="Refusal"/>.</summary>
    Refused,
    /// <summary>No such portfolio for this caller.</summary>
    NotFound,
    /// <summary>The caller knows the portfolio, but may not change one of these parts, or may not make portfolios.</summary>
    Forbidden,
    /// <summary>The portfolio is archived.</summary>
    Archived,
}

/// <summary>The answer to a write.</summary>
public sealed record WriteResult(WriteOutcome Outcome)
{
    /// <summary>The revision made, or the one that stays; 0 when there is none.</summary>
    public long Revision { get; init; }

    /// <summary>True when the write made the portfolio.</summary>
    public bool Created { get; init; }

    /// <summary>What changed, part by part; empty unless accepted.</summary>
    public IReadOnlyList<PartChange> Changes { get; init; } = [];

    /// <summary>The <see cref="Documents.Refusal.Reason"/> of a refused write.</summary>
    public object? Refusal { get; init; }
}
