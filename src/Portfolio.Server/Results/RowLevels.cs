using Portfolio.Engine.Results;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Results;
using Portfolio.Store.Results;

namespace Portfolio.Server.Results;

/// <summary>Result rows at other levels than the configured: from the grid that is kept for ever, else again from iterations.</summary>
internal sealed class RowLevels(ResultStore results, ScopeIterations iterations, PortfolioFacts facts)
{
    /// <summary>One row with the levels put in.</summary>
    public async Task<ResultJson> SetAsync(SeenRun run, ResultJson row, IReadOnlyList<Level> levels, CancellationToken cancellation)
    {
        var finish = await results.FindGridAsync(run.Caller, run.Portfolio, run.Id, row.Scope, Metrics.Finish, cancellation);
        var cost = await results.FindGridAsync(run.Caller, run.Portfolio, run.Id, row.Scope, Metrics.Cost, cancellation);
        var digits = (await facts.OfAsync(run.Portfolio, run.Run.Revision, cancellation)).Digits;
        return await SetCostAsync(run, await SetFinishAsync(run, row, finish, levels, cancellation), cost, levels, digits, cancellation);
    }

    /// <summary>Many rows with the levels put in.</summary>
    public async Task<IReadOnlyList<ResultJson>> SetAsync(
        SeenRun run, IReadOnlyList<ResultJson> rows, IReadOnlyList<Level> levels, CancellationToken cancellation)
    {
        var digits = (await facts.OfAsync(run.Portfolio, run.Run.Revision, cancellation)).Digits;
        var kept = await results.ListGridsAsync(run.Caller, run.Portfolio, run.Id, cancellation);
        var grids = kept.ToDictionary(grid => (grid.Scope, grid.Metric));
        var set = new List<ResultJson>(rows.Count);
        foreach (var row in rows)
        {
            var finished = await SetFinishAsync(run, row, grids.GetValueOrDefault((row.Scope, Metrics.Finish)), levels, cancellation);
            set.Add(await SetCostAsync(run, finished, grids.GetValueOrDefault((row.Scope, Metrics.Cost)), levels, digits, cancellation));
        }
        return set;
    }

    private async Task<ResultJson> SetFinishAsync(
        SeenRun run, ResultJson row, GridRow? kept, IReadOnlyList<Level> levels, CancellationToken cancellation)
    {
        if (kept is null) return row;
        var grid = GridBytes.FromBytes(kept.Bytes);
        if (!grid.Covers(levels))
        {
            var finishes = await iterations.FinishesAsync(run, Scope.Parse(row.Scope)!, cancellation);
            grid = Grids.OfFinish(finishes, Ranks(levels), grid.Dates, Instants.Never, commitment: null);
        }
        var percentiles = grid.Happening == 0 ? [] : levels.Select(level => DatePercentileJson.From(FinishSummary.At(grid, level)!.Value));
        return row with { Finish = row.Finish with { Percentiles = [.. percentiles] } };
    }

    private async Task<ResultJson> SetCostAsync(
        SeenRun run, ResultJson row, GridRow? kept, IReadOnlyList<Level> levels, int digits, CancellationToken cancellation)
    {
        if (kept is null || row.Cost is not { } cost) return row;
        var grid = GridBytes.FromBytes(kept.Bytes);
        if (!grid.Covers(levels))
        {
            var costs = await iterations.CostsAsync(run, Scope.Parse(row.Scope)!, cancellation);
            grid = Grids.OfCost(costs, Ranks(levels), baseCost: 0, commitment: null);
        }
        var percentiles = levels.Select(level => MoneyPercentileJson.From(CostSummary.At(grid, level, digits)!.Value));
        return row with { Cost = cost with { Percentiles = [.. percentiles] } };
    }

    // Grids hold their levels in rising order, whatever order was asked for.
    private static RankTable Ranks(IReadOnlyList<Level> levels) => new([.. levels.Order()]);
}
