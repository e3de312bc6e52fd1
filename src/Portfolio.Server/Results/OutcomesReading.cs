using Portfolio.Engine.Results;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Results;
using Portfolio.Server.Http;
using Portfolio.Server.Problems;
using Portfolio.Store.Results;

namespace Portfolio.Server.Results;

/// <summary>Histograms of single iterations.</summary>
internal sealed class OutcomesReading(ResultStore results, ScopeIterations iterations, PortfolioFacts facts)
{
    /// <summary>The finish by day, week or month.</summary>
    /// <returns>Null when the run has no such scope, or not for this caller.</returns>
    /// <exception cref="RequestRefused">There would be more than <paramref name="most"/> bins.</exception>
    public async Task<OutcomesJson?> OfFinishAsync(SeenRun run, Scope scope, DateBin bin, int most, CancellationToken cancellation)
    {
        if (await FindAsync(run, scope, Metrics.Finish, cancellation) is not { } grid) return null;
        var finishes = await iterations.FinishesAsync(run, scope, cancellation);
        var weekEnds = (await facts.OfAsync(run.Portfolio, run.Run.Revision, cancellation)).WeekEnds;
        var bins = DistributionTable.OfFinish(finishes, grid.Dates, bin, weekEnds, most) ?? throw TooMany(most);
        return Json(run, scope, Metrics.Finish, grid.Happening, bins.Select(entry => Bin(entry, date => new(date))));
    }

    /// <summary>The cost in so many bins.</summary>
    /// <returns>Null when the run has no such scope with a cost, or not for this caller.</returns>
    public async Task<OutcomesJson?> OfCostAsync(SeenRun run, Scope scope, int bins, CancellationToken cancellation)
    {
        if (await FindAsync(run, scope, Metrics.Cost, cancellation) is null) return null;
        var costs = await iterations.CostsAsync(run, scope, cancellation);
        var digits = (await facts.OfAsync(run.Portfolio, run.Run.Revision, cancellation)).Digits;
        var table = DistributionTable.OfCost(costs, bins);
        return Json(
            run, scope, Metrics.Cost, costs.Length, table.Select(entry => Bin(entry, minor => new(MinorUnits.ToMoney(minor, digits)))));
    }

    private async Task<Grid?> FindAsync(SeenRun run, Scope scope, string metric, CancellationToken cancellation) =>
        await results.FindGridAsync(run.Caller, run.Portfolio, run.Id, scope.ToString(), metric, cancellation) is { } row
            ? GridBytes.FromBytes(row.Bytes)
            : null;

    private static RequestRefused TooMany(int most) =>
        QueryFaults.Of("bin", $"The finishes spread over more than {most} bins: ask for wider ones.");

    private static BinJson Bin<T>(Bin<T> bin, Func<T, DateOrMoney> end) =>
        new(end(bin.From), end(bin.To), bin.Count, bin.Share, bin.Cumulative);

    private static OutcomesJson Json(SeenRun run, Scope scope, string metric, int iterations, IEnumerable<BinJson> bins) => new()
    {
        Scope = scope.ToString(),
        Run = run.Id,
        AsOf = run.Run.AsOf,
        Revision = run.Run.Revision,
        Metric = metric,
        Iterations = iterations,
        Bins = [.. bins],
    };
}
