using Portfolio.Store.Access;

namespace Portfolio.Store.Documents;

internal sealed record RevisionRow
{
    /// <summary>The note only for who may read something that the revision changed: it may speak of what others must not see.</summary>
    public static readonly string Columns = $"""
        r.portfolio, r.number, r.recorded_at, r.actor,
          case when r.note is not null and exists (select 1 from revision_part n where n.portfolio = r.portfolio and n.revision = r.number
            and {Granted.Part(Right.Read, "n.portfolio", "n.project")}) then r.note end as note
        """;

    public string Portfolio { get; init; } = "";
    public long Number { get; init; }
    public long RecordedAt { get; init; }
    public string Actor { get; init; } = "";
    public string? Note { get; init; }

    public StoredRevision ToRevision() =>
        new() { Portfolio = Portfolio, Number = Number, RecordedAt = RecordedAt.ToInstant(), Actor = Actor, Note = Note };
}
