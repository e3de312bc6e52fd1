using Portfolio.Store.Access;

namespace Portfolio.Store.Results;

/// <summary>Reading what runs left behind. A key limited to projects sees rows of these projects only.</summary>
public sealed class ResultStore(Database database)
{
    /// <summary>All rows of a run in their order, as far as the caller may read them.</summary>
    public Task<IReadOnlyList<ResultRow>> ListAsync(Caller caller, string portfolio, string run, CancellationToken cancellation) =>
        throw new NotSupportedException(database.ToString());

    public Task<ResultRow?> FindAsync(Caller caller, string portfolio, string run, string scope, CancellationToken cancellation) => throw new NotSupportedException();

    public Task<GridRow?> FindGridAsync(Caller caller, string portfolio, string run, string scope, string metric, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>All grids of a run, scopes in the order of the result rows.</summary>
    public Task<IReadOnlyList<GridRow>> ListGridsAsync(Caller caller, string portfolio, string run, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>The allocation at a level; null when none is kept. Needs a grant on the whole portfolio.</summary>
    public Task<AllocationRow?> FindAllocationAsync(Caller caller, string portfolio, string run, double level, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>One scope and metric at every point of the series between two dates (both included; null: open), in date order.</summary>
    public Task<IReadOnlyList<SeriesPoint>> ListSeriesAsync(
        Caller caller, string portfolio, string scope, string metric, DateOnly? from, DateOnly? to, CancellationToken cancellation) => throw new NotSupportedException();
}
