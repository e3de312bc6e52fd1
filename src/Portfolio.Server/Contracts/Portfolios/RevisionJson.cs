using Portfolio.Store.Documents;

namespace Portfolio.Server.Contracts.Portfolios;

/// <summary>One accepted write; never changed afterwards.</summary>
public sealed record RevisionJson
{
    public required long Revision { get; init; }

    public required DateTimeOffset RecordedAt { get; init; }

    /// <summary>Id of the key that wrote it.</summary>
    public required string RecordedBy { get; init; }

    /// <summary>Absent when there is none, or the key may read nothing of what the write changed.</summary>
    public string? Note { get; init; }

    internal static RevisionJson From(StoredRevision revision) => new()
    {
        Revision = revision.Number, RecordedAt = revision.RecordedAt, RecordedBy = revision.Actor, Note = revision.Note,
    };
}
