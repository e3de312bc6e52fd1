namespace Portfolio.Store.Documents;

internal sealed record RevisionRow
{
    public const string Columns = "r.portfolio, r.number, r.recorded_at, r.actor, r.note";

    public string Portfolio { get; init; } = "";
    public long Number { get; init; }
    public long RecordedAt { get; init; }
    public string Actor { get; init; } = "";
    public string? Note { get; init; }

    public StoredRevision ToRevision() =>
        new() { Portfolio = Portfolio, Number = Number, RecordedAt = RecordedAt.ToInstant(), Actor = Actor, Note = Note };
}
