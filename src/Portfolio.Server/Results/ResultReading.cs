using System.Globalization;
using System.Text.Json;
using Portfolio.Engine.Results;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Results;
using Portfolio.Store.Access;
using Portfolio.Store.Results;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Results;

/// <summary>Reads result rows back: at the configured levels as they are kept, at others from the grids, or from single iterations.</summary>
internal sealed class ResultReading(ResultStore results, ScopeIterations iterations, PortfolioFacts facts)
{
    /// <summary>One row with its cautions; null when the run has no such scope, or not for this caller.</summary>
    /// <param name="levels">Empty: the configured ones.</param>
    public async Task<ResultJson?> FindAsync(Caller caller, StoredRun run, Scope scope, IReadOnlyList<Level> levels, CancellationToken cancellation)
    {
        if (await results.FindAsync(caller, run.Portfolio, run.Id, scope.ToString(), cancellation) is not { } row) return null;
        var json = Read(row) with { Warnings = KeptWarnings.Read(run, caller).Of(scope) };
        if (levels.Count == 0) return json;
        var finish = await results.FindGridAsync(caller, run.Portfolio, run.Id, json.Scope, Metrics.Finish, cancellation);
        var cost = await results.FindGridAsync(caller, run.Portfolio, run.Id, json.Scope, Metrics.Cost, cancellation);
        var digits = (await facts.OfAsync(run.Portfolio, run.Revision, cancellation)).Digits;
        return await AtAsync(caller, run, json, finish, cost, levels, digits, cancellation);
    }

    /// <summary>Rows in their order, with the cautions that hold for all of them.</summary>
    /// <param name="skip">Rows before the page; the cursor of the next page is how many came before it.</param>
    /// <param name="take">Rows in the page.</param>
    public async Task<ResultListJson> ListAsync(Caller caller, StoredRun run, int skip, int take, IReadOnlyList<Level> levels, CancellationToken cancellation)
    {
        var all = await results.ListAsync(caller, run.Portfolio, run.Id, cancellation);
        var rows = all.Skip(skip).Take(take).Select(Read).ToArray();
        if (levels.Count > 0) await SetLevelsAsync(caller, run, rows, levels, cancellation);
        var end = skip + rows.Length;
        return new()
        {
            Items = rows,
            Warnings = KeptWarnings.Read(run, caller).All,
            Next = end < all.Count ? end.ToString(CultureInfo.InvariantCulture) : null,
        };
    }

    private async Task SetLevelsAsync(Caller caller, StoredRun run, ResultJson[] rows, IReadOnlyList<Level> levels, CancellationToken cancellation)
    {
        var digits = (await facts.OfAsync(run.Portfolio, run.Revision, cancellation)).Digits;
        var grids = (await results.ListGridsAsync(caller, run.Portfolio, run.Id, cancellation)).ToDictionary(grid => (grid.Scope, grid.Metric));
        for (var i = 0; i < rows.Length; i++)
        {
            var (finish, cost) = (grids.GetValueOrDefault((rows[i].Scope, Metrics.Finish)), grids.GetValueOrDefault((rows[i].Scope, Metrics.Cost)));
            rows[i] = await AtAsync(caller, run, rows[i], finish, cost, levels, digits, cancellation);
        }
    }

    private static ResultJson Read(ResultRow row) => JsonSerializer.Deserialize(row.Json, ResultsContext.Plain.ResultJson)!;

    private async Task<ResultJson> AtAsync(
        Caller caller, StoredRun run, ResultJson row, GridRow? finish, GridRow? cost, IReadOnlyList<Level> levels, int digits, CancellationToken cancellation)
    {
        var scope = Scope.Parse(row.Scope)!;
        if (finish is not null)
        {
            var grid = await GridAsync(finish, levels, async dates => OfFinish(await iterations.FinishesAsync(caller, run, scope, cancellation), dates, levels));
            row = row with { Finish = row.Finish with { Percentiles = grid.Happening == 0 ? [] : [.. levels.Select(level => DatePercentileJson.From(FinishSummary.At(grid, level)!.Value))] } };
        }
        if (cost is not null && row.Cost is { } amounts)
        {
            var grid = await GridAsync(cost, levels, async _ => OfCost(await iterations.CostsAsync(caller, run, scope, cancellation), levels));
            row = row with { Cost = amounts with { Percentiles = [.. levels.Select(level => MoneyPercentileJson.From(CostSummary.At(grid, level, digits)!.Value))] } };
        }
        return row;
    }

    private static async Task<Grid> GridAsync(GridRow kept, IReadOnlyList<Level> levels, Func<DateRule, Task<Grid>> again)
    {
        var grid = GridBytes.FromBytes(kept.Bytes);
        return grid.Covers(levels) ? grid : await again(grid.Dates);
    }

    private static Grid OfFinish(int[] finishes, DateRule dates, IReadOnlyList<Level> levels) =>
        Grids.OfFinish(finishes, new RankTable([.. levels.Order()]), dates, Instants.Never, null);

    private static Grid OfCost(double[] costs, IReadOnlyList<Level> levels) => Grids.OfCost(costs, new RankTable([.. levels.Order()]), 0, null);
}
