using System.Security.Claims;
using Portfolio.Server.Access;
using Portfolio.Server.Contracts.Csv;
using Portfolio.Server.Contracts.Results;
using Portfolio.Server.Http;
using Portfolio.Server.Problems;
using Portfolio.Server.Results;
using Portfolio.Store.Access;

namespace Portfolio.Server.Endpoints;

/// <summary>How much money to hold above the base, and for whom.</summary>
internal static class ContingencyEndpoints
{
    public static void MapContingency(this IEndpointRouteBuilder portfolio) =>
        portfolio.MapGet("/contingency", Get).WithName("getContingency").WithTags("Results").Needs(Right.Read).Refuses(406, 409, 410, 422)
            .Represents<ContingencyJson>();

    /// <summary>The portfolio's contingency at a level, shared out to its projects so that the parts make the total to the cent.</summary>
    /// <param name="level">Confidence level, usually 80.</param>
    /// <param name="run">A run's id; left out: the run that stands for <c>asOf</c>, or the latest.</param>
    /// <param name="asOf">A date; the run that stands for it or the nearest earlier one.</param>
    /// <param name="format"><c>json</c> or <c>csv</c>; left out, <c>Accept</c> decides.</param>
    internal static async Task<IResult> Get(
        string portfolio, ClaimsPrincipal user, ContingencyReading contingencies, RunChoice runs, HttpContext http,
        CancellationToken cancellation,
        string? level = null, string? run = null, string? asOf = null, string? format = null)
    {
        if (!user.Caller().Holds(Right.Read, portfolio)) return Problem.Forbidden();
        var faults = new QueryFaults();
        var asked = LevelParameter.One(faults, "level", level);
        var query = new RunQuery(portfolio, run ?? RunChoice.Latest, asOf, format, user, http, runs, cancellation);
        var answer = await query.FindAsync(faults);
        return await answer.OfAsync<ContingencyJson>(
            async () => await contingencies.ReadAsync(answer.Run, asked, cancellation),
            ResultsContext.Plain.ContingencyJson,
            FigureTables.Of);
    }
}
