using System.Security.Claims;
using Portfolio.Server.Access;
using Portfolio.Server.Contracts.Csv;
using Portfolio.Server.Contracts.Results;
using Portfolio.Server.Http;
using Portfolio.Server.Problems;
using Portfolio.Server.Results;
using Portfolio.Store.Access;

namespace Portfolio.Server.Endpoints;

/// <summary>How a figure has moved from run to run.</summary>
internal static class SeriesEndpoints
{
    public static void MapSeries(this IEndpointRouteBuilder portfolio) =>
        portfolio.MapGet("/series", Get).WithName("getSeries").WithTags("Results").Needs(Right.Read).Refuses(406, 422)
            .Produces<SeriesJson>(StatusCodes.Status200OK, "application/json", CsvTable.MediaType);

    /// <summary>One level of a scope at every date that a run stands for, with bounds, base and change since the point before.</summary>
    /// <param name="scope"><c>portfolio</c>, <c>programme/p</c>, <c>project/p</c> or <c>milestone/p/a</c>; usually the portfolio.</param>
    /// <param name="metric"><c>finish</c>, <c>cost</c> or <c>contingency</c> (a part's: what is allocated); usually the finish.</param>
    /// <param name="level">Confidence level, usually 80; it must be kept: 0.5, 1 to 99, 99.5 and the configured ones.</param>
    /// <param name="every"><c>run</c>, <c>day</c>, <c>week</c> or <c>month</c>: the last point of each; usually every run.</param>
    /// <param name="from">First date.</param>
    /// <param name="to">Last date.</param>
    /// <param name="format"><c>json</c> or <c>csv</c>; left out, <c>Accept</c> decides.</param>
    internal static async Task<IResult> Get(
        string portfolio, ClaimsPrincipal user, SeriesReading series, HttpRequest request, CancellationToken cancellation,
        string? scope = null, string? metric = null, string? level = null, string? every = null, string? from = null, string? to = null,
        string? format = null)
    {
        var faults = new QueryFaults();
        var asked = new SeriesQuestion(
            user.Caller(), portfolio, ScopeParameter.Read(faults, scope), faults.Word("metric", metric, Metrics.Finish, Metrics.All),
            LevelParameter.One(faults, "level", level), faults.Word("every", every, Intervals.Run, Intervals.All),
            faults.Date("from", from), faults.Date("to", to));
        if (asked.Metric != Metrics.Finish) ScopeParameter.MustCost(faults, asked.Scope);
        var representation = Representation.Of(request, format, faults);
        faults.Refuse();
        if (asked.IsHidden) return Problem.Forbidden();
        return await series.ReadAsync(asked, cancellation) is { } found
            ? representation.Answer(found, ResultsContext.Plain.SeriesJson, FigureTables.Of)
            : Problem.NotFound("No run has this scope.");
    }
}
