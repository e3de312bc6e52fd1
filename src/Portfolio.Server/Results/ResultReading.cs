using System.Globalization;
using System.Text.Json;
using Portfolio.Engine.Results;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Results;
using Portfolio.Store.Results;

namespace Portfolio.Server.Results;

/// <summary>Reads result rows back: at the configured levels as they are kept, at others by <see cref="RowLevels"/>.</summary>
internal sealed class ResultReading(ResultStore results, RowLevels rowLevels)
{
    /// <summary>One row with its cautions; null when the run has no such scope, or not for this caller.</summary>
    /// <param name="levels">Empty: the configured ones.</param>
    public async Task<ResultJson?> FindAsync(SeenRun run, Scope scope, IReadOnlyList<Level> levels, CancellationToken cancellation)
    {
        if (await results.FindAsync(run.Caller, run.Portfolio, run.Id, scope.ToString(), cancellation) is not { } row) return null;
        var json = Read(row) with { Warnings = KeptWarnings.Read(run).Of(scope) };
        return levels.Count == 0 ? json : await rowLevels.SetAsync(run, json, levels, cancellation);
    }

    /// <summary>Rows in their order, with the cautions that hold for all of them.</summary>
    /// <param name="skip">Rows before the page; the cursor of the next page is how many came before it.</param>
    /// <param name="take">Rows in the page.</param>
    public async Task<ResultListJson> ListAsync(
        SeenRun run, int skip, int take, IReadOnlyList<Level> levels, CancellationToken cancellation)
    {
        // One more tells whether there is a next page.
        var found = await results.ListAsync(run.Caller, run.Portfolio, run.Id, skip, take + 1L, cancellation);
        var rows = found.Take(take).Select(Read).ToArray();
        return new()
        {
            Items = levels.Count == 0 ? rows : await rowLevels.SetAsync(run, rows, levels, cancellation),
            Warnings = KeptWarnings.Read(run).All,
            Next = found.Count > take ? (skip + take).ToString(CultureInfo.InvariantCulture) : null,
        };
    }

    private static ResultJson Read(ResultRow row) => JsonSerializer.Deserialize(row.Json, ResultsContext.Plain.ResultJson)!;
}
