using Microsoft.Extensions.Options;
using Portfolio.Server.Access;
using Portfolio.Server.Contracts.Csv;
using Portfolio.Server.Contracts.Results;
using Portfolio.Server.Hosting;
using Portfolio.Server.Http;
using Portfolio.Server.Problems;
using Portfolio.Server.Results;
using Portfolio.Store.Access;

namespace Portfolio.Server.Endpoints;

/// <summary>How the single iterations of a run lie.</summary>
internal static class DistributionEndpoints
{
    private const int UsualBins = 50;

    public static void MapDistribution(this IEndpointRouteBuilder portfolio) =>
        portfolio.MapGet("/runs/{run}/distribution", Get).WithName("getDistribution").WithTags("Results")
            .Needs(Right.Read).Refuses(406, 409, 410, 422).Represents<OutcomesJson>();

    /// <summary>Histogram and cumulative table: the chance of being done by each date, or within each amount.</summary>
    /// <param name="scope"><c>portfolio</c>, <c>programme/p</c>, <c>project/p</c> or <c>milestone/p/a</c>; usually the portfolio.</param>
    /// <param name="metric"><c>finish</c> or <c>cost</c>; usually the finish.</param>
    /// <param name="bin"><c>day</c>, <c>week</c> or <c>month</c> of a finish, usually a week; of a cost a number of bins, 50.</param>
    internal static async Task<IResult> Get(
        [AsParameters] RunQuery query, OutcomesReading outcomes, IOptions<LimitOptions> limits,
        string? scope = null, string? metric = null, string? bin = null)
    {
        var (faults, most) = (new QueryFaults(), limits.Value.Bins);
        var about = ScopeParameter.Read(faults, scope);
        var isCost = faults.Word("metric", metric, Metrics.Finish, [Metrics.Finish, Metrics.Cost]) == Metrics.Cost;
        if (isCost) ScopeParameter.MustCost(faults, about);
        var width = isCost ? DateBins.Usual : DateBins.Read(faults, bin);
        var bins = isCost ? faults.Whole("bin", bin, Math.Min(UsualBins, most), 1, most) : 0;
        if (query.IsHidden(about)) return Problem.Forbidden();
        var answer = await query.FindAsync(faults);
        return await answer.OfAsync(
            () => isCost
                ? outcomes.OfCostAsync(answer.Run, about, bins, query.Cancellation)
                : outcomes.OfFinishAsync(answer.Run, about, width, most, query.Cancellation),
            ResultsContext.Plain.OutcomesJson,
            FigureTables.Of);
    }
}
