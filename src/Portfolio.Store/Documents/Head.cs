namespace Portfolio.Store.Documents;

/// <summary>
/// The newest revision, seen from inside a transaction: the one that may replace it, or one before it that only looks. Valid only until the
/// decision has been returned.
/// </summary>
public sealed class Head
{
    private readonly StoreTransaction open;
    private readonly string portfolio;

    private Head(StoreTransaction open, string portfolio, RevisionRow revision, IReadOnlyList<PartRow> rows)
    {
        (this.open, this.portfolio, Rows) = (open, portfolio, rows);
        Revision = revision.Number;
        RecordedAt = revision.RecordedAt;
        Parts = [.. rows.Select(row => new PartHead(row.Project, row.Hash))];
    }

    public long Revision { get; }

    /// <summary>Settings first, then the projects in document order.</summary>
    public IReadOnlyList<PartHead> Parts { get; }

    internal IReadOnlyList<PartRow> Rows { get; }

    internal long RecordedAt { get; }

    /// <summary>True once something was asked that may change without a new revision.</summary>
    internal bool LookedBeyond { get; private set; }

    private const string NewestSql = "select number, recorded_at from revision where portfolio = @Portfolio order by number desc limit 1";

    private const string PartsSql = """
        select project, position, hash from revision_part
        where portfolio = @Portfolio and superseded > @Number and revision <= @Number and hash is not null
        order by position
        """;

    /// <summary>Null when there is no such portfolio.</summary>
    /// <param name="before">What was seen shortly before; if it is still the newest, its parts are not read again.</param>
    internal static async Task<Head?> FindAsync(StoreTransaction open, string portfolio, Head? before = null)
    {
        if (await open.FirstAsync<RevisionRow>(NewestSql, new { Portfolio = portfolio }) is not { } newest)
            return null;
        if (before?.Revision == newest.Number)
            return new Head(open, portfolio, newest, before.Rows);
        return new Head(open, portfolio, newest, await open.ListAsync<PartRow>(PartsSql, new { Portfolio = portfolio, newest.Number }));
    }

    /// <summary>The bytes of one part; null when the document has no such part.</summary>
    public async Task<byte[]?> ReadAsync(string project) =>
        Rows.FirstOrDefault(row => row.Project == project) is { } part ? await PartContents.ReadAsync(open, part.Hash) : null;

    /// <summary>All parts with their bytes, in document order.</summary>
    public async Task<IReadOnlyList<StoredPart>> ReadAllAsync()
    {
        var parts = new List<StoredPart>(Rows.Count);
        foreach (var row in Rows)
            parts.Add(new StoredPart(row.Project, row.Hash, await PartContents.ReadAsync(open, row.Hash)));
        return parts;
    }

    // Up to so many are looked up one by one; more are read together with all others of the head.
    private const int OutlinesOneByOne = 8;

    private const string OutlinesSql = """
        select o.hash, o.bytes from revision_part v join part_outline o on o.hash = v.hash
        where v.portfolio = @Portfolio and v.superseded > @Revision and v.revision <= @Revision
        """;

    /// <summary>Outlines that were kept with contents of this head, by content hash; contents without one are left out.</summary>
    public async Task<IReadOnlyDictionary<string, byte[]>> ReadOutlinesAsync(IReadOnlyCollection<string> hashes)
    {
        var found = new Dictionary<string, byte[]>(StringComparer.Ordinal);
        if (hashes.Count > OutlinesOneByOne)
        {
            foreach (var row in await open.ListAsync<ContentRow>(OutlinesSql, new { Portfolio = portfolio, Revision }))
                found[row.Hash] = row.Bytes;
            return found;
        }
        foreach (var hash in hashes)
            if (await PartContents.ReadOutlineAsync(open, hash) is { } outline)
                found[hash] = outline;
        return found;
    }

    private const string HasRunsSql = "select count(*) from (select 1 from run where portfolio = @Portfolio limit 1) found";

    /// <summary>True once a run was asked for: from then on the currency is fixed.</summary>
    public async Task<bool> HasRunsAsync()
    {
        LookedBeyond = true;
        return await open.FirstAsync<long>(HasRunsSql, new { Portfolio = portfolio }) > 0;
    }
}

internal sealed record PartRow
{
    public string Project { get; init; } = "";
    public long Position { get; init; }
    public string Hash { get; init; } = "";
}
