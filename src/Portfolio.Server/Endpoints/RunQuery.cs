using System.Security.Claims;
using Microsoft.AspNetCore.Mvc;
using Portfolio.Model.Documents;
using Portfolio.Server.Access;
using Portfolio.Server.Http;
using Portfolio.Server.Results;
using Portfolio.Store.Access;

namespace Portfolio.Server.Endpoints;

/// <summary>What a request for figures of one run brings along.</summary>
/// <param name="Portfolio">The portfolio's id.</param>
/// <param name="Run">A run's id, or <c>latest</c>: the point of the series with the greatest date.</param>
/// <param name="AsOf">With <c>latest</c>: the run that stands for this date or the nearest earlier one.</param>
/// <param name="Format"><c>json</c> or <c>csv</c>; left out, <c>Accept</c> decides.</param>
internal sealed record RunQuery(
    [FromRoute(Name = "portfolio")] string Portfolio,
    [FromRoute(Name = "run")] string Run,
    [FromQuery(Name = "asOf")] string? AsOf,
    [FromQuery(Name = "format")] string? Format,
    ClaimsPrincipal User,
    HttpContext Http,
    RunChoice Runs,
    CancellationToken Cancellation)
{
    public Caller Caller => User.Caller();

    /// <summary>True for a total that a key limited to projects may not see.</summary>
    public bool IsHidden(Scope scope) => scope.IsTotal && !Caller.Holds(Right.Read, Portfolio);

    /// <summary>The run and the representation that are asked for. Faults in the query are refused first.</summary>
    public Task<RunAnswer> FindAsync(QueryFaults faults) => RunAnswer.FindAsync(this, faults);
}
