using System.ComponentModel.DataAnnotations;
using System.Globalization;
using System.Net.ServerSentEvents;
using System.Security.Claims;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.Extensions.Options;
using Portfolio.Server.Access;
using Portfolio.Server.Contracts;
using Portfolio.Server.Contracts.Runs;
using Portfolio.Server.Hosting;
using Portfolio.Server.Http;
using Portfolio.Server.Idempotency;
using Portfolio.Server.Jobs;
using Portfolio.Server.Problems;
using Portfolio.Server.Results;
using Portfolio.Server.Runs;
using Portfolio.Store.Access;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Endpoints;

internal static class RunEndpoints
{
    public static void MapRuns(this IEndpointRouteBuilder portfolio)
    {
        var runs = portfolio.MapGroup("/runs").WithTags("Runs");
        runs.MapPost("", Post).WithName("postRun").Needs(Right.Manage)
            .Accepts<RunRequestJson>(isOptional: true, "application/json")
            .Produces<RunJson>(StatusCodes.Status202Accepted).Refuses(409, 413, 415, 422);
        runs.MapGet("", List).WithName("listRuns").Needs(Right.Read).Refuses(422).OfPresentPortfolio();
        runs.MapGet("/{run}", Get).WithName("getRun").Needs(Right.Read).Refuses(422);
        runs.MapGet("/{run}/progress", Follow).WithName("followRun").Needs(Right.Read).DisableRequestTimeout();
        runs.MapDelete("/{run}", Cancel).WithName("cancelRun").Needs(Right.Manage)
            .Produces<RunJson>(StatusCodes.Status202Accepted).Refuses(409, 422);
    }

    /// <summary>Asks for a run. Its revision is fixed now; it is worked as soon as a worker is free.</summary>
    internal static async Task<IResult> Post(
        string portfolio, ClaimsPrincipal user, RunIntake intake, RunView view, IOptions<LimitOptions> limits, HttpContext http,
        CancellationToken cancellation)
    {
        var asked = await JsonBody.ReadAsync(http.Request, ApiContext.Default.RunRequestJson, limits.Value.Body) ?? new RunRequestJson();
        var run = await intake.TakeAsync(
            user.Caller(), portfolio, asked,
            http.Remembers<StoredRun>((to, made) => Accepted(to, view.Of(made, user.Caller()), portfolio)), cancellation);
        return Accepted(http, view.Of(run, user.Caller()), portfolio);
    }

    /// <summary>Runs, newest first.</summary>
    /// <param name="cursor">Where the page before ended.</param>
    /// <param name="limit">Items in a page.</param>
    internal static async Task<Ok<PageJson<RunJson>>> List(
        string portfolio, ClaimsPrincipal user, RunStore runs, RunView view, HttpResponse response, CancellationToken cancellation,
        string? cursor = null, [Range(1, Paging.Most)] int limit = Paging.Usual)
    {
        var found = await runs.ListAsync(user.Caller(), portfolio, Paging.Number(cursor), Paging.WithOneMore(limit), cancellation);
        return TypedResults.Ok(Paging.Page(
            response, found, limit, run => view.Of(run, user.Caller()), run => run.Sequence.ToString(CultureInfo.InvariantCulture)));
    }

    /// <summary>One run; Content-Location names it where the address does not.</summary>
    /// <param name="run">An id, or latest: the point of the series with the greatest date.</param>
    /// <param name="asOf">With latest: the point of this date or of the nearest earlier one.</param>
    internal static async Task<Ok<RunJson>> Get(
        string portfolio, string run, ClaimsPrincipal user, RunChoice runs, RunView view, HttpContext http, CancellationToken cancellation,
        string? asOf = null)
    {
        var faults = new QueryFaults();
        var date = RunChoice.AsOf(faults, run, asOf);
        faults.Refuse();
        var found = await runs.FindAsync(user.Caller(), portfolio, run, date, cancellation);
        http.Response.Headers.ContentLocation = AddressOf(http, portfolio, found.Id);
        return TypedResults.Ok(view.Of(found, user.Caller()));
    }

    /// <summary>Progress as server-sent events: progress while it goes on, ended at last.</summary>
    /// <param name="run">An id, or latest.</param>
    internal static async Task<ServerSentEventsResult<RunProgressJson>> Follow(
        string portfolio, string run, ClaimsPrincipal user, RunChoice runs, RunStream stream, HttpContext http,
        CancellationToken cancellation)
    {
        var found = await runs.FindAsync(user.Caller(), portfolio, run, null, cancellation);
        return TypedResults.ServerSentEvents(http.AsksForHead()
            ? AsyncEnumerable.Empty<SseItem<RunProgressJson>>()
            : stream.FollowAsync(user.Caller(), found, cancellation));
    }

    /// <summary>Asks a run that has not ended to stop. Results are never deleted.</summary>
    internal static async Task<IResult> Cancel(
        string portfolio, string run, ClaimsPrincipal user, RunRequests requests, RunView view, RunSignal signal, HttpContext http,
        CancellationToken cancellation)
    {
        var result = await requests.RequestCancelAsync(
            user.Caller(), portfolio, run,
            http.Remembers<StoredRun>((to, asked) => Accepted(to, view.Of(asked, user.Caller()), portfolio)), cancellation);
        switch (result)
        {
            case { Outcome: RunCancelOutcome.Accepted, Run: { } stopping }:
                signal.Give();
                return Accepted(http, view.Of(stopping, user.Caller()), portfolio);
            case { Outcome: RunCancelOutcome.AlreadyEnded }:
                return Problem.Conflict("run-ended", "The run has ended", "It can no longer be stopped; its results stay.");
            case { Outcome: RunCancelOutcome.Forbidden }:
                return Problem.Forbidden();
            default:
                return Problem.NotFound();
        }
    }

    private static Accepted<RunJson> Accepted(HttpContext http, RunJson run, string portfolio)
    {
        http.Response.Headers.RetryAfter = "1";
        return TypedResults.Accepted(AddressOf(http, portfolio, run.Id), run);
    }

    private static string AddressOf(HttpContext http, string portfolio, string run) =>
        $"{http.Request.PathBase}/v1/portfolios/{portfolio}/runs/{run}";
}
