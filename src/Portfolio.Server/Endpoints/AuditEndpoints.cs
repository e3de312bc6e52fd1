using System.ComponentModel.DataAnnotations;
using System.Globalization;
using System.Security.Claims;
using Microsoft.AspNetCore.Http.HttpResults;
using Portfolio.Server.Access;
using Portfolio.Server.Contracts;
using Portfolio.Server.Contracts.Keys;
using Portfolio.Server.Http;
using Portfolio.Server.Problems;
using Portfolio.Store.Access;
using Portfolio.Store.Audit;

namespace Portfolio.Server.Endpoints;

internal static class AuditEndpoints
{
    public static void MapAudit(this IEndpointRouteBuilder api) =>
        api.MapGet("/audit", List).WithName("listAudit").WithTags("Audit").Needs(Right.Admin).Refuses(403, 422);

    /// <summary>Who did what, newest first; refused writes included, with the reason but without what was sent.</summary>
    /// <param name="actor">Only what this key did: its id.</param>
    /// <param name="action">Only actions that begin so: key for all of key.create, key.rotate …</param>
    /// <param name="portfolio">Only what was done to this portfolio.</param>
    /// <param name="from">First date, UTC.</param>
    /// <param name="to">Last date, UTC.</param>
    /// <param name="cursor">Where the page before ended.</param>
    /// <param name="limit">Items in a page.</param>
    internal static async Task<Ok<PageJson<AuditEntryJson>>> List(
        ClaimsPrincipal user, AuditStore audit, HttpResponse response, CancellationToken cancellation,
        string? actor = null, string? action = null, string? portfolio = null, string? from = null, string? to = null,
        string? cursor = null, [Range(1, Paging.Most)] int limit = Paging.Usual)
    {
        var faults = new QueryFaults();
        var (first, last) = (faults.Date("from", from), faults.Date("to", to));
        faults.Refuse();
        var asked = new AuditQuestion
        {
            Before = Paging.Number(cursor), Actor = actor, Action = action, Portfolio = portfolio,
            From = StartOf(first), Until = StartOf(last)?.AddDays(1),
        };
        var found = await audit.ListAsync(user.Caller(), asked, Paging.WithOneMore(limit), cancellation);
        return TypedResults.Ok(Paging.Page(
            response, found, limit, AuditEntryJson.From, entry => entry.Sequence.ToString(CultureInfo.InvariantCulture)));
    }

    private static DateTimeOffset? StartOf(DateOnly? date) =>
        date is { } day ? new DateTimeOffset(day, TimeOnly.MinValue, TimeSpan.Zero) : null;
}
