using System.Security.Claims;
using Microsoft.Extensions.Options;
using Portfolio.Server.Access;
using Portfolio.Server.Contracts;
using Portfolio.Server.Contracts.Schedules;
using Portfolio.Server.Hosting;
using Portfolio.Server.Http;
using Portfolio.Server.Idempotency;
using Portfolio.Server.Problems;
using Portfolio.Server.Schedules;
using Portfolio.Store.Access;
using Portfolio.Store.Schedules;

namespace Portfolio.Server.Endpoints;

internal static class ScheduleEndpoints
{
    public static void MapSchedule(this IEndpointRouteBuilder portfolio)
    {
        var schedule = portfolio.MapGroup("/schedule").WithTags("Schedule");
        schedule.MapGet("", Get).WithName("getSchedule").Needs(Right.Read).Produces<ScheduleStandingJson>();
        schedule.MapPut("", Put).WithName("putSchedule").Needs(Right.Manage)
            .Accepts<ScheduleJson>("application/json").Produces<ScheduleStandingJson>().Refuses(409, 413, 415, 422);
    }

    /// <summary>When the portfolio is run by itself, and what became of the last due dates.</summary>
    internal static async Task<IResult> Get(
        string portfolio, ClaimsPrincipal user, ScheduleStanding standing, CancellationToken cancellation) =>
        await standing.ReadAsync(user.Caller(), portfolio, cancellation) is { } schedule
            ? TypedResults.Ok(schedule)
            : Problem.NotFound("No schedule is set.");

    /// <summary>Sets when the portfolio is run by itself.</summary>
    internal static async Task<IResult> Put(
        string portfolio, ClaimsPrincipal user, ScheduleStore schedules, ScheduleStanding standing, IOptions<LimitOptions> limits,
        HttpContext http, CancellationToken cancellation)
    {
        var sent = await JsonBody.ReadAsync(http.Request, ApiContext.Default.ScheduleJson, limits.Value.Body) ?? new ScheduleJson();
        var asked = ScheduleRequest.Of(sent, limits.Value.Iterations);
        if (asked.Faults.Count > 0)
            return Problem.Refused(asked.Faults);
        var result = await schedules.PutAsync(
            user.Caller(), portfolio, asked.Cron, asked.Iterations, asked.Enabled,
            http.Remembers<StoredSchedule>(async (_, set) => TypedResults.Ok(await standing.OfAsync(user.Caller(), set, cancellation))),
            cancellation);
        return result.Outcome switch
        {
            SchedulePutOutcome.Stored or SchedulePutOutcome.Unchanged =>
                TypedResults.Ok(await standing.OfAsync(user.Caller(), result.Schedule!, cancellation)),
            SchedulePutOutcome.Forbidden => Problem.Forbidden(),
            SchedulePutOutcome.Archived => Problem.Archived(),
            _ => Problem.NotFound(),
        };
    }
}
