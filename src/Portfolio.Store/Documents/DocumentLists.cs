using Portfolio.Store.Access;

namespace Portfolio.Store.Documents;

/// <summary>A project as listed.</summary>
/// <param name="Position">Grows along the document; where a page ended.</param>
/// <param name="Outline">What was kept with its content; null: nothing.</param>
public sealed record ListedProject(string Project, long Position, string Hash, byte[]? Outline);

/// <content>Projects as a list, and contents of the past.</content>
public sealed partial class DocumentStore
{
    private static readonly string ProjectsSql = $"""
        select v.project, v.position, v.hash, o.bytes from revision_part v left join part_outline o on o.hash = v.hash
        where v.portfolio = @Portfolio and v.project <> '' and v.position > @After and v.hash is not null
          and v.revision <= coalesce(@Number, (select max(r.number) from revision r where r.portfolio = @Portfolio))
          and v.superseded > coalesce(@Number, (select max(r.number) from revision r where r.portfolio = @Portfolio))
          and {Granted.Part([Right.Read, Right.Submit], "@Portfolio", "v.project")}
        order by v.position limit @Limit
        """;

    private const string NumberedSql = """
        select count(*) from (select 1 from revision where portfolio = @Portfolio and (@Number is null or number = @Number) limit 1) found
        """;

    /// <summary>
    /// Projects at a revision (null: the newest) that the caller may read or submit to, in document order from behind a position; null when
    /// there is no such revision, or no such portfolio.
    /// </summary>
    public Task<IReadOnlyList<ListedProject>?> ListProjectsAsync(
        Caller caller, string portfolio, long? revision, long after, int limit, CancellationToken cancellation) =>
        database.ReadAsync<IReadOnlyList<ListedProject>?>(
            async open =>
            {
                var asked = new { Caller = caller.KeyId, open.Now, Portfolio = portfolio, Number = revision, After = after, Limit = limit };
                if (await open.FirstAsync<long>(NumberedSql, asked) == 0)
                    return null;
                var rows = await open.ListAsync<ListedRow>(ProjectsSql, asked);
                return [.. rows.Select(row => new ListedProject(row.Project, row.Position, row.Hash, row.Bytes))];
            },
            cancellation);

    /// <summary>
    /// Contents by hash. Who may see them was decided where the hashes came from: a hash alone tells nothing of who may.
    /// </summary>
    public Task<IReadOnlyDictionary<string, byte[]>> ReadContentsAsync(
        IReadOnlyCollection<string> hashes, CancellationToken cancellation) =>
        database.ReadAsync<IReadOnlyDictionary<string, byte[]>>(
            async open =>
            {
                var contents = new Dictionary<string, byte[]>(StringComparer.Ordinal);
                foreach (var hash in hashes)
                    contents[hash] = await PartContents.ReadAsync(open, hash);
                return contents;
            },
            cancellation);

    private sealed record ListedRow
    {
        public string Project { get; init; } = "";
        public long Position { get; init; }
        public string Hash { get; init; } = "";
        public byte[]? Bytes { get; init; }
    }
}
