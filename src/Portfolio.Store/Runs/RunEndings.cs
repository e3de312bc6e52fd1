using Portfolio.Store.Results;

namespace Portfolio.Store.Runs;

/// <summary>What a run leaves behind, written in the transaction that ends it.</summary>
public sealed record RunResult
{
    /// <summary>SHA-256 over all result rows, hex.</summary>
    public required string ResultDigest { get; init; }
    public required string InputsDigest { get; init; }
    /// <summary>JSON array.</summary>
    public required string Warnings { get; init; }
    /// <summary>In the order in which results are listed.</summary>
    public required IReadOnlyList<ResultRow> Rows { get; init; }
    public required IReadOnlyList<GridRow> Grids { get; init; }
    public IReadOnlyList<AllocationRow> Allocations { get; init; } = [];
}

/// <summary>The three ways in which a running run ends. Each returns false, and writes nothing, when the lease was lost.</summary>
public sealed class RunEndings(Database database)
{
    /// <summary>Stores the results and, when the run is recorded and its date is free for it, makes it the point of its date.</summary>
    public Task<bool> SucceedAsync(RunLease held, RunResult result, CancellationToken cancellation) => throw new NotSupportedException(database.ToString());

    /// <param name="error">A sentence for people; no stack trace.</param>
    public Task<bool> FailAsync(RunLease held, string error, CancellationToken cancellation) => throw new NotSupportedException();

    public Task<bool> CancelAsync(RunLease held, CancellationToken cancellation) => throw new NotSupportedException();
}
