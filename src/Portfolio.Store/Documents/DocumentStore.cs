using Portfolio.Store.Access;

namespace Portfolio.Store.Documents;

/// <summary>
/// Documents in parts: settings and each project are stored once per content hash, and a revision lists only the parts it changed.
/// Who may not see a portfolio gets null or nothing, as if it did not exist.
/// </summary>
public sealed partial class DocumentStore(Database database)
{
    private static readonly string ListSql = $"""
        select p.id, p.created_at, p.archived_at, (select max(r.number) from revision r where r.portfolio = p.id) as number
        from portfolio p
        where (@After is null or p.id > @After) and {Granted.Any("p.id")}
        order by p.id limit @Limit
        """;

    /// <summary>The portfolios on which the caller has any grant, by id.</summary>
    /// <param name="after">The last id of the page before; null for the first page.</param>
    public async Task<IReadOnlyList<PortfolioEntry>> ListAsync(Caller caller, string? after, int limit, CancellationToken cancellation)
    {
        var rows = await database.ReadAsync(
            open => open.ListAsync<PortfolioRow>(
                ListSql, new { Caller = caller.KeyId, open.Now, After = after, Limit = limit }), cancellation);
        return [.. rows.Select(row => row.ToEntry())];
    }

    private static readonly string FindEntrySql = $"""
        select p.id, p.created_at, p.archived_at, (select max(r.number) from revision r where r.portfolio = p.id) as number
        from portfolio p where p.id = @Portfolio and {Granted.Any("p.id")}
        """;

    /// <summary>One portfolio as listed; null without any grant on it.</summary>
    public Task<PortfolioEntry?> FindEntryAsync(Caller caller, string portfolio, CancellationToken cancellation) =>
        database.ReadAsync(open => FindEntryAsync(open, caller, portfolio), cancellation);

    internal static async Task<PortfolioEntry?> FindEntryAsync(StoreTransaction open, Caller caller, string portfolio) =>
        (await open.FirstAsync<PortfolioRow>(
            FindEntrySql, new { Caller = caller.KeyId, open.Now, Portfolio = portfolio }))?.ToEntry();

    private static readonly string PartsSql = $"""
        select v.project, c.hash, c.bytes, c.size from revision_part v join part_content c on c.hash = v.hash
        where v.portfolio = @Portfolio and v.superseded > @Number and v.revision <= @Number
          and {Granted.Part(Right.Read, "@Portfolio", "v.project")}
        order by v.position
        """;

    /// <summary>
    /// The document at a revision (null: the newest), with the parts that the caller may read; null when there is no such revision.
    /// </summary>
    public async Task<StoredDocument?> ReadAsync(Caller caller, string portfolio, long? revision, CancellationToken cancellation)
    {
        var (found, rows) = await database.ReadAsync(
            async open => await FindRevisionAsync(open, caller, portfolio, revision) is { } row
                ? (row, await open.ListAsync<ContentRow>(
                    PartsSql, new { Caller = caller.KeyId, open.Now, Portfolio = portfolio, row.Number }))
                : (null, []),
            cancellation);
        return found is null ? null : new StoredDocument(found.ToRevision(), [.. rows.Select(row => row.ToPart())]);
    }

    private static readonly string HeadsSql = $"""
        select v.project, v.position, v.hash from revision_part v
        where v.portfolio = @Portfolio and v.superseded > @Number and v.revision <= @Number and v.hash is not null
          and {Granted.Part(Right.Read, "@Portfolio", "v.project")}
        order by v.position
        """;

    /// <summary>The same without contents: enough for entity tags.</summary>
    public Task<IReadOnlyList<PartHead>?> ReadHeadsAsync(Caller caller, string portfolio, long? revision, CancellationToken cancellation) =>
        database.ReadAsync<IReadOnlyList<PartHead>?>(
            async open =>
            {
                if (await FindRevisionAsync(open, caller, portfolio, revision) is not { } found)
                    return null;
                var rows = await open.ListAsync<PartRow>(
                    HeadsSql, new { Caller = caller.KeyId, open.Now, Portfolio = portfolio, found.Number });
                return [.. rows.Select(row => new PartHead(row.Project, row.Hash))];
            },
            cancellation);

    // Who submits to a project may read it back; the settings only with the right to read.
    private static readonly string PartSql = $"""
        select v.project, c.hash, c.bytes, c.size from revision_part v join part_content c on c.hash = v.hash
        where v.portfolio = @Portfolio and v.project = @Project
          and v.revision <= coalesce(@Number, (select max(r.number) from revision r where r.portfolio = @Portfolio))
          and v.superseded > coalesce(@Number, (select max(r.number) from revision r where r.portfolio = @Portfolio))
          and (@Number is null or exists (select 1 from revision r where r.portfolio = @Portfolio and r.number = @Number))
          and ({Granted.Part(Right.Read, "@Portfolio", "v.project")}
            or v.project <> '' and {Granted.Part(Right.Submit, "@Portfolio", "v.project")})
        """;

    /// <summary>One part at a revision (null: the newest). A project can also be read with the right to submit to it.</summary>
    /// <param name="project">The project's id, or <see cref="PartNames.Settings"/>.</param>
    public async Task<StoredPart?> ReadPartAsync(
        Caller caller, string portfolio, string project, long? revision, CancellationToken cancellation)
    {
        var row = await database.ReadAsync(
            open => open.FirstAsync<ContentRow>(
                PartSql, new { Caller = caller.KeyId, open.Now, Portfolio = portfolio, Project = project, Number = revision }),
            cancellation);
        return row?.ToPart();
    }

    private sealed record PortfolioRow
    {
        public string Id { get; init; } = "";
        public long Number { get; init; }
        public long CreatedAt { get; init; }
        public long? ArchivedAt { get; init; }

        public PortfolioEntry ToEntry() => new(Id, Number, CreatedAt.ToInstant(), ArchivedAt.ToInstant());
    }
}
