namespace Portfolio.Store.Documents;

/// <summary>The names of the parts of a document.</summary>
public static class PartNames
{
    /// <summary>Stands where a project id would: the part that holds the settings. It is always first.</summary>
    public const string Settings = "";
}

/// <summary>
/// A part of the document without its content. <paramref name="Hash"/> is the lower-case hex SHA-256 of the canonical bytes.
/// </summary>
/// <param name="Project">The project's id, or <see cref="PartNames.Settings"/>.</param>
public sealed record PartHead(string Project, string Hash);

/// <summary>A part of the document with its canonical bytes.</summary>
public sealed record StoredPart(string Project, string Hash, byte[] Bytes);

/// <summary>The document at one revision, settings first, then projects in document order, as far as the caller may see them.</summary>
public sealed record StoredDocument(StoredRevision Revision, IReadOnlyList<StoredPart> Parts);

/// <summary>One accepted write.</summary>
public sealed record StoredRevision
{
    public required string Portfolio { get; init; }
    public required long Number { get; init; }
    public required DateTimeOffset RecordedAt { get; init; }
    /// <summary>The id of the key that wrote it.</summary>
    public required string Actor { get; init; }
    public string? Note { get; init; }
}

/// <summary>
/// What one revision did to one part; a null hash before is an addition, after a removal, the same hash twice a change of place.
/// </summary>
public sealed record PartChange(string Project, string? Before, string? After);

/// <summary>A portfolio as listed.</summary>
public sealed record PortfolioEntry(string Id, long Revision, DateTimeOffset CreatedAt, DateTimeOffset? ArchivedAt);
