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
        foreach (var (position, row) in result.Rows.Index())
            await open.ExecuteAsync(
                InsertRowSql, new { Run = run, row.Scope, Position = position, Project = ProjectOf(row.Scope), row.Json });
        foreach (var grid in result.Grids)
        {
            var project = ProjectOf(grid.Scope);
            await open.ExecuteAsync(
                InsertGridSql,
                new { Run = run, grid.Scope, grid.Metric, Project = project, grid.Base, grid.Mean, grid.Sd, grid.Happens, grid.Bytes });
        }
        foreach (var allocation in result.Allocations)
            await open.ExecuteAsync(InsertAllocationSql, new { Run = run, allocation.Level, allocation.Bytes });
    }

    /// <summary>The project whose grant reaches a scope; null for what only a grant on the whole portfolio does.</summary>
    /// <exception cref="ArgumentException">Not the written form of a scope.</exception>
    private static string? ProjectOf(string scope) =>
        (Scope.Parse(scope) ?? throw new ArgumentException($"'{scope}' is no scope.", nameof(scope))).Project;
}
