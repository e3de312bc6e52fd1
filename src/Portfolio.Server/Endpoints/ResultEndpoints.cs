using Microsoft.Extensions.Options;
using Portfolio.Model.Documents;
using Portfolio.Server.Access;
using Portfolio.Server.Contracts.Csv;
using Portfolio.Server.Contracts.Results;
using Portfolio.Server.Hosting;
using Portfolio.Server.Http;
using Portfolio.Server.OpenApi;
using Portfolio.Server.Problems;
using Portfolio.Server.Results;
using Portfolio.Store.Access;

namespace Portfolio.Server.Endpoints;

/// <summary>The results of one run: a row for each scope, in a list or one by one.</summary>
internal static class ResultEndpoints
{
    public static void MapResults(this IEndpointRouteBuilder portfolio)
    {
        var results = portfolio.MapGroup("/runs/{run}/results").WithTags("Results").Needs(Right.Read).Refuses(406, 409, 410, 422);
        results.MapGet("", List).WithName("listResults").Represents<ResultListJson>();
        results.MapGet("/portfolio", OfPortfolio).WithName("getPortfolioResult").Represents<ResultJson>();
        results.MapGet("/programme/{programme}", OfProgramme).WithName("getProgrammeResult").Represents<ResultJson>();
        results.MapGet("/project/{project}", OfProject).WithName("getProjectResult").Represents<ResultJson>();
        results.MapGet("/milestone/{project}/{activity}", OfMilestone).WithName("getMilestoneResult").Represents<ResultJson>();
    }

    /// <summary>Tells the API's description that a route answers in JSON and in CSV, and 304 to a client that has it already.</summary>
    internal static void Represents<T>(this RouteHandlerBuilder route) =>
        route.Produces<T>(StatusCodes.Status200OK, "application/json", CsvTable.MediaType).ReadsConditionally();

    /// <summary>All results: portfolio, programmes, projects, milestones. As CSV one line for each scope and level, and no pages.</summary>
    /// <param name="levels">Confidence levels, parted by commas; left out: the configured ones.</param>
    /// <param name="cursor">Where the page before ended.</param>
    /// <param name="limit">Rows in a page, 1 to 1000; usually 100.</param>
    internal static async Task<IResult> List(
        [AsParameters] RunQuery query, ResultReading reading, IOptions<LimitOptions> limits,
        string? levels = null, string? cursor = null, string? limit = null)
    {
        var faults = new QueryFaults();
        var asked = LevelParameter.Several(faults, "levels", levels, limits.Value.Levels);
        var (skip, take) = (faults.Whole("cursor", cursor, 0, 0, int.MaxValue), faults.Whole("limit", limit, Paging.Usual, 1, Paging.Most));
        var answer = await query.FindAsync(faults);
        if (answer.Representation.IsCsv) (skip, take) = (0, int.MaxValue);
        return await answer.OfAsync<ResultListJson>(
            async () =>
            {
                var list = await reading.ListAsync(answer.Run, skip, take, asked, query.Cancellation);
                if (list.Next is { } next) Paging.LinkNext(query.Http.Response, next);
                return list;
            },
            ResultsContext.Plain.ResultListJson,
            list => ResultsCsv.Of($"results-{answer.Run.Run.AsOf:yyyy-MM-dd}", list.Items));
    }

    /// <summary>The portfolio as a whole.</summary>
    /// <param name="levels">Confidence levels, parted by commas; left out: the configured ones.</param>
    internal static Task<IResult> OfPortfolio(
        [AsParameters] RunQuery query, ResultReading reading, IOptions<LimitOptions> limits, string? levels = null) =>
        OneAsync(query, reading, limits, levels, Scope.Portfolio);

    /// <summary>The projects of one programme together.</summary>
    /// <param name="levels">Confidence levels, parted by commas; left out: the configured ones.</param>
    internal static Task<IResult> OfProgramme(
        string programme, [AsParameters] RunQuery query, ResultReading reading, IOptions<LimitOptions> limits, string? levels = null) =>
        OneAsync(query, reading, limits, levels, Scope.OfProgramme(programme));

    /// <summary>One project.</summary>
    /// <param name="levels">Confidence levels, parted by commas; left out: the configured ones.</param>
    internal static Task<IResult> OfProject(
        string project, [AsParameters] RunQuery query, ResultReading reading, IOptions<LimitOptions> limits, string? levels = null) =>
        OneAsync(query, reading, limits, levels, Scope.OfProject(project));

    /// <summary>One milestone.</summary>
    /// <param name="levels">Confidence levels, parted by commas; left out: the configured ones.</param>
    internal static Task<IResult> OfMilestone(
        string project, string activity, [AsParameters] RunQuery query, ResultReading reading, IOptions<LimitOptions> limits,
        string? levels = null) =>
        OneAsync(query, reading, limits, levels, Scope.OfMilestone(project, activity));

    private static async Task<IResult> OneAsync(
        RunQuery query, ResultReading reading, IOptions<LimitOptions> limits, string? levels, Scope scope)
    {
        var faults = new QueryFaults();
        var asked = LevelParameter.Several(faults, "levels", levels, limits.Value.Levels);
        if (query.IsHidden(scope)) return Problem.Forbidden();
        var answer = await query.FindAsync(faults);
        return await answer.OfAsync(
            () => reading.FindAsync(answer.Run, scope, asked, query.Cancellation),
            ResultsContext.Plain.ResultJson,
            row => ResultsCsv.Of($"result-{answer.Run.Run.AsOf:yyyy-MM-dd}", [row]));
    }
}
