using Portfolio.Store.Access;

namespace Portfolio.Store.Documents;

/// <content>The history of a document.</content>
public sealed partial class DocumentStore
{
    private static readonly string RevisionsSql = $"""
        select {RevisionRow.Columns} from revision r
        where r.portfolio = @Portfolio and (@Before is null or r.number < @Before) and {Granted.Some(Right.Read, "r.portfolio")}
        order by r.number desc limit @Limit
        """;

    /// <summary>Revisions, newest first, with numbers below <paramref name="before"/> (null: from the newest).</summary>
    public async Task<IReadOnlyList<StoredRevision>> ListRevisionsAsync(
        Caller caller, string portfolio, long? before, int limit, CancellationToken cancellation)
    {
        var rows = await database.ReadAsync(
            open => open.ListAsync<RevisionRow>(
                RevisionsSql, new { Caller = caller.KeyId, open.Now, Portfolio = portfolio, Before = before, Limit = limit }),
            cancellation);
        return [.. rows.Select(row => row.ToRevision())];
    }

    private static readonly string RevisionSql = $"""
        select {RevisionRow.Columns} from revision r
        where r.portfolio = @Portfolio and (@Number is null or r.number = @Number) and {Granted.Some(Right.Read, "r.portfolio")}
        order by r.number desc limit 1
        """;

    /// <summary>One revision (null: the newest).</summary>
    public async Task<StoredRevision?> FindRevisionAsync(Caller caller, string portfolio, long? number, CancellationToken cancellation) =>
        (await database.ReadAsync(open => FindRevisionAsync(open, caller, portfolio, number), cancellation))?.ToRevision();

    private static Task<RevisionRow?> FindRevisionAsync(StoreTransaction open, Caller caller, string portfolio, long? number) =>
        open.FirstAsync<RevisionRow>(RevisionSql, new { Caller = caller.KeyId, open.Now, Portfolio = portfolio, Number = number });

    private static readonly string RevisionAtSql = $"""
        select {RevisionRow.Columns} from revision r
        where r.portfolio = @Portfolio and r.recorded_at <= @At and {Granted.Some(Right.Read, "r.portfolio")}
        order by r.number desc limit 1
        """;

    /// <summary>The revision that was current at an instant: the last one recorded at or before it.</summary>
    public async Task<StoredRevision?> FindRevisionAtAsync(
        Caller caller, string portfolio, DateTimeOffset instant, CancellationToken cancellation)
    {
        var row = await database.ReadAsync(
            open => open.FirstAsync<RevisionRow>(
                RevisionAtSql, new { Caller = caller.KeyId, open.Now, Portfolio = portfolio, At = instant.ToMicroseconds() }),
            cancellation);
        return row?.ToRevision();
    }

    private static readonly string ChangesSql = $"""
        select v.project, o.hash as old_hash, v.hash as new_hash
        from revision_part v left join revision_part o on o.portfolio = v.portfolio and o.project = v.project and o.superseded = v.revision
        where v.portfolio = @Portfolio and v.revision = @Number and {Granted.Part(Right.Read, "@Portfolio", "v.project")}
        order by v.position, v.project
        """;

    /// <summary>What a revision changed, in document order, as far as the caller may read the parts.</summary>
    public async Task<IReadOnlyList<PartChange>> ListChangesAsync(
        Caller caller, string portfolio, long number, CancellationToken cancellation)
    {
        var rows = await database.ReadAsync(
            open => open.ListAsync<ChangeRow>(
                ChangesSql, new { Caller = caller.KeyId, open.Now, Portfolio = portfolio, Number = number }), cancellation);
        return [.. rows.Select(row => new PartChange(row.Project, row.OldHash, row.NewHash))];
    }

    private sealed record ChangeRow
    {
        public string Project { get; init; } = "";
        public string? OldHash { get; init; }
        public string? NewHash { get; init; }
    }
}
