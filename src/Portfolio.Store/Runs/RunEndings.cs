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
    private const string Ended =
        "owner = null, lease_until = null, finished_at = @Now where id = @Id and fence = @Fence and state = 'running'";

    private const string SucceedSql = $"""
        update run set state = 'succeeded', result_digest = @ResultDigest, inputs_digest = @InputsDigest, warnings = @Warnings, {Ended}
        """;

    private const string RowSql = $"select {RunRow.Columns} from run r where r.id = @Id";

    /// <summary>Stores the results and, when the run is recorded and its date is free for it, makes it the point of its date.</summary>
    public Task<bool> SucceedAsync(RunLease held, RunResult result, CancellationToken cancellation) => database.WriteAsync(
        async open =>
        {
            var ending = new { held.Run.Id, held.Fence, open.Now, result.ResultDigest, result.InputsDigest, result.Warnings };
            if (await open.ExecuteAsync(SucceedSql, ending) == 0)
                return false;
            await ResultWriting.KeepAsync(open, held.Run.Id, result);
            var row = (await open.FirstAsync<RunRow>(RowSql, new { held.Run.Id }))!;
            var represents = await SeriesDates.TakeAsync(open, row);
            var detail = new { row.AsOf, row.Revision, row.ResultDigest, represents, replaces = represents ? row.Replaces : null };
            await RunEvents.TellAsync(open, held.Caller, row.Portfolio, row.Id, "succeeded", detail);
            return true;
        },
        cancellation);

    private const string FailSql = $"update run set state = 'failed', error = @Error, {Ended}";

    /// <param name="error">A sentence for people; no stack trace.</param>
    public Task<bool> FailAsync(RunLease held, string error, CancellationToken cancellation) =>
        EndAsync(FailSql, held, "failed", error, cancellation);

    // Also for a worker that stops by itself: the request is then its own.
    private const string CancelSql = $"update run set state = 'cancelled', cancel_requested = 1, {Ended}";

    public Task<bool> CancelAsync(RunLease held, CancellationToken cancellation) =>
        EndAsync(CancelSql, held, "cancelled", null, cancellation);

    private Task<bool> EndAsync(
        string sql, RunLease held, string what, string? error, CancellationToken cancellation) => database.WriteAsync(
        async open =>
        {
            if (await open.ExecuteAsync(sql, new { held.Run.Id, held.Fence, open.Now, Error = error }) == 0)
                return false;
            await RunBlocks.DropSamplesAsync(open, held.Run.Id);
            await RunEvents.TellAsync(
                open, held.Caller, held.Run.Portfolio, held.Run.Id, what, new { held.Run.AsOf, held.Run.Revision, error });
            return true;
        },
        cancellation);
}
