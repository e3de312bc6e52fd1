using Portfolio.Engine.Results;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Results;
using Portfolio.Server.Http;
using Portfolio.Server.Problems;
using Portfolio.Store.Access;
using Portfolio.Store.Results;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Results;

/// <summary>Histograms of single iterations.</summary>
internal sealed class OutcomesReading(ResultStore results, ScopeIterations iterations, PortfolioFacts facts)
{
    /// <summary>The finish by day, week or month.</summary>
    /// <returns>Null when the run has no such scope, or not for this caller.</returns>
    /// <exception cref="RequestRefused">There would be more than <paramref name="most"/> bins.</exception>
    public async Task<OutcomesJson?> OfFinishAsync(Caller caller, StoredRun run, Scope scope, DateBin bin, int most, CancellationToken cancellation)
    {
        if (await results.FindGridAsync(caller, run.Portfolio, run.Id, scope.ToString(), Metrics.Finish, cancellation) is not { } row) return null;
        var finishes = await iterations.FinishesAsync(caller, run, scope, cancellation);
        var weekEnds = (await facts.OfAsync(run.Portfolio, run.Revision, cancellation)).WeekEnds;
        var grid = GridBytes.FromBytes(row.Bytes);
        var bins = DistributionTable.OfFinish(finishes, grid.Dates, bin, weekEnds, most) ?? throw TooMany(most);
        return Json(run, scope, Metrics.Finish, grid.Happening, bins.Select(entry => new BinJson(new(entry.From), new(entry.To), entry.Count, entry.Share, entry.Cumulative)));
    }

    /// <summary>The cost in so many bins.</summary>
    /// <returns>Null when the run has no such scope with a cost, or not for this caller.</returns>
    public async Task<OutcomesJson?> OfCostAsync(Caller caller, StoredRun run, Scope scope, int bins, CancellationToken cancellation)
    {
        if (await results.FindGridAsync(caller, run.Portfolio, run.Id, scope.ToString(), Metrics.Cost, cancellation) is null) return null;
        var costs = await iterations.CostsAsync(caller, run, scope, cancellation);
        var digits = (await facts.OfAsync(run.Portfolio, run.Revision, cancellation)).Digits;
        return Json(run, scope, Metrics.Cost, costs.Length, DistributionTable.OfCost(costs, bins).Select(entry =>
            new BinJson(new(MinorUnits.ToMoney(entry.From, digits)), new(MinorUnits.ToMoney(entry.To, digits)), entry.Count, entry.Share, entry.Cumulative)));
    }

    private static RequestRefused TooMany(int most)
    {
        var faults = new QueryFaults();
        faults.Add("bin", $"The finishes spread over more than {most} bins: ask for wider ones.");
        return faults.ToException();
    }

    private static OutcomesJson Json(StoredRun run, Scope scope, string metric, int iterations, IEnumerable<BinJson> bins) => new()
    {
        Scope = scope.ToString(),
        Run = run.Id,
        AsOf = run.AsOf,
        Revision = run.Revision,
        Metric = metric,
        Iterations = iterations,
        Bins = [.. bins],
    };
}
