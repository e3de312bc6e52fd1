using Portfolio.Model.Documents;
using Portfolio.Store.Runs;

namespace Portfolio.Store.Results;

/// <summary>Keeps what a run leaves behind, inside the transaction that ends it.</summary>
internal static class ResultWriting
{
    private const string InsertRowSql =
        "insert into result_row (run, scope, position, project, json) values (@Run, @Scope, @Position, @Project, @Json)";

    private const string InsertGridSql = """
        insert into grid (run, scope, metric, project, base_value, mean, sd, happens, bytes)
        values (@Run, @Scope, @Metric, @Project, @Base, @Mean, @Sd, @Happens, @Bytes)
        """;

    private const string InsertAllocationSql = "insert into allocation (run, level, bytes) values (@Run, @Level, @Bytes)";

    public static async Task KeepAsync(StoreTransaction open, string run, RunResult result)
    {
        await open.ExecuteEachAsync(InsertRowSql, result.Rows.Select((row, position) => new
        {
            Run = run,
            row.Scope,
            Position = position,
            Project = ProjectOf(row.Scope),
            row.Json,
        }));
        await open.ExecuteEachAsync(InsertGridSql, result.Grids.Select(grid => new
        {
            Run = run,
            grid.Scope,
            grid.Metric,
            Project = ProjectOf(grid.Scope),
            grid.Base,
            grid.Mean,
            grid.Sd,
            grid.Happens,
            grid.Bytes,
        }));
        await open.ExecuteEachAsync(
            InsertAllocationSql, result.Allocations.Select(allocation => new { Run = run, allocation.Level, allocation.Bytes }));
    }

    /// <summary>The project whose grant reaches a scope; null for what only a grant on the whole portfolio does.</summary>
    /// <exception cref="ArgumentException">Not the written form of a scope.</exception>
    private static string? ProjectOf(string scope) =>
        (Scope.Parse(scope) ?? throw new ArgumentException($"'{scope}' is no scope.", nameof(scope))).Project;
}
