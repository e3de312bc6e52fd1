using Portfolio.Store.Access;

namespace Portfolio.Store.Results;

/// <summary>Reading what runs left behind. A key limited to projects sees rows of these projects only.</summary>
public sealed class ResultStore(Database database)
{
    private static readonly string RowsSql = $"""
        select x.scope, x.json from result_row x join run r on r.id = x.run
        where x.run = @Run and r.portfolio = @Portfolio and {Granted.Part(Right.Read, "@Portfolio", "x.project")}
        """;

    private static readonly string ListSql = $"{RowsSql} order by x.position limit @Take offset @Skip";

    /// <summary>Rows of a run in their order, as far as the caller may read them.</summary>
    /// <param name="skip">So many of them are left out at the beginning.</param>
    /// <param name="take">At most so many.</param>
    public async Task<IReadOnlyList<ResultRow>> ListAsync(
        Caller caller, string portfolio, string run, long skip, long take, CancellationToken cancellation)
    {
        var rows = await database.ReadAsync(
            open => open.ListAsync<JsonRow>(
                ListSql, new { Caller = caller.KeyId, open.Now, Portfolio = portfolio, Run = run, Skip = skip, Take = take }),
            cancellation);
        return [.. rows.Select(row => row.ToRow())];
    }

    private static readonly string FindSql = $"{RowsSql} and x.scope = @Scope";

    public async Task<ResultRow?> FindAsync(Caller caller, string portfolio, string run, string scope, CancellationToken cancellation) =>
        (await database.ReadAsync(
            open => open.FirstAsync<JsonRow>(
                FindSql, new { Caller = caller.KeyId, open.Now, Portfolio = portfolio, Run = run, Scope = scope }),
            cancellation))?.ToRow();

    private const string GridColumns = "x.scope, x.metric, x.base_value, x.mean, x.sd, x.happens, x.bytes";

    private static readonly string GridsSql = $"""
        select {GridColumns} from grid x join run r on r.id = x.run left join result_row o on o.run = x.run and o.scope = x.scope
        where x.run = @Run and (@Scope is null or x.scope = @Scope) and (@Metric is null or x.metric = @Metric)
          and r.portfolio = @Portfolio and {Granted.Part(Right.Read, "@Portfolio", "x.project")}
        order by o.position, x.metric desc
        """;

    public async Task<GridRow?> FindGridAsync(
        Caller caller, string portfolio, string run, string scope, string metric, CancellationToken cancellation) =>
        (await GridsAsync(caller, portfolio, run, scope, metric, cancellation)).FirstOrDefault();

    /// <summary>All grids of a run, scopes in the order of the result rows, finish before cost.</summary>
    public Task<IReadOnlyList<GridRow>> ListGridsAsync(Caller caller, string portfolio, string run, CancellationToken cancellation) =>
        GridsAsync(caller, portfolio, run, null, null, cancellation);

    private async Task<IReadOnlyList<GridRow>> GridsAsync(
        Caller caller, string portfolio, string run, string? scope, string? metric, CancellationToken cancellation)
    {
        var rows = await database.ReadAsync(
            open => open.ListAsync<StoredGrid>(
                GridsSql, new { Caller = caller.KeyId, open.Now, Portfolio = portfolio, Run = run, Scope = scope, Metric = metric }),
            cancellation);
        return [.. rows.Select(row => row.ToGrid())];
    }

    private static readonly string AllocationSql = $"""
        select x.level, x.bytes from allocation x join run r on r.id = x.run
        where x.run = @Run and x.level = @Level and r.portfolio = @Portfolio and {Granted.Whole(Right.Read, "r.portfolio")}
        """;

    /// <summary>The allocation at a level; null when none is kept. Needs a grant on the whole portfolio.</summary>
    public async Task<AllocationRow?> FindAllocationAsync(
        Caller caller, string portfolio, string run, double level, CancellationToken cancellation)
    {
        var row = await database.ReadAsync(
            open => open.FirstAsync<LevelRow>(
                AllocationSql, new { Caller = caller.KeyId, open.Now, Portfolio = portfolio, Run = run, Level = level }),
            cancellation);
        return row is null ? null : new AllocationRow(row.Level, row.Bytes);
    }

    private static readonly string SeriesSql = $"""
        select s.as_of, r.id, r.revision, {GridColumns}
        from series_point s join run r on r.id = s.run join grid x on x.run = s.run and x.scope = @Scope and x.metric = @Metric
        where s.portfolio = @Portfolio and (@From is null or s.as_of >= @From) and (@To is null or s.as_of <= @To)
          and {Granted.Part(Right.Read, "@Portfolio", "x.project")}
        order by s.as_of
        """;

    /// <summary>One scope and metric at every point of the series between two dates (both included; null: open), in date order.</summary>
    public async Task<IReadOnlyList<SeriesPoint>> ListSeriesAsync(
        Caller caller, string portfolio, string scope, string metric, DateOnly? from, DateOnly? to, CancellationToken cancellation)
    {
        var rows = await database.ReadAsync(
            open => open.ListAsync<StoredGrid>(SeriesSql, new
            {
                Caller = caller.KeyId,
                open.Now,
                Portfolio = portfolio,
                Scope = scope,
                Metric = metric,
                From = from?.ToText(),
                To = to?.ToText(),
            }),
            cancellation);
        return [.. rows.Select(row => new SeriesPoint(row.AsOf.ToDate(), row.Id, row.Revision, row.ToGrid()))];
    }

    private sealed record JsonRow
    {
        public string Scope { get; init; } = "";
        public byte[] Json { get; init; } = [];

        public ResultRow ToRow() => new(Scope, Json);
    }

    private sealed record LevelRow
    {
        public double Level { get; init; }
        public byte[] Bytes { get; init; } = [];
    }

    private sealed record StoredGrid
    {
        public string AsOf { get; init; } = "";
        public string Id { get; init; } = "";
        public long Revision { get; init; }
        public string Scope { get; init; } = "";
        public string Metric { get; init; } = "";
        public double? BaseValue { get; init; }
        public double? Mean { get; init; }
        public double? Sd { get; init; }
        public double Happens { get; init; }
        public byte[] Bytes { get; init; } = [];

        public GridRow ToGrid() => new(Scope, Metric, BaseValue, Mean, Sd, Happens, Bytes);
    }
}
