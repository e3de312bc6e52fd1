using System.ComponentModel.DataAnnotations;
using System.Security.Claims;
using Microsoft.AspNetCore.Http.HttpResults;
using Portfolio.Server.Access;
using Portfolio.Server.Contracts;
using Portfolio.Server.Contracts.Events;
using Portfolio.Server.Events;
using Portfolio.Server.Http;
using Portfolio.Server.Problems;
using Portfolio.Store.Access;
using Portfolio.Store.Outbox;

namespace Portfolio.Server.Endpoints;

/// <summary>What happened, for those who poll.</summary>
internal static class EventEndpoints
{
    public static void MapEvents(this IEndpointRouteBuilder portfolio) =>
        portfolio.MapGet("/events", List).WithName("listEvents").WithTags("Events").Needs(Right.Read).Refuses(410, 422)
            .OfPresentPortfolio();

    /// <summary>Events, oldest first, as CloudEvents 1.0. A key limited to projects reads those about one of them.</summary>
    /// <param name="after">The id of an event: those after it. Left out: from the oldest that is kept.</param>
    /// <param name="limit">Items in a page.</param>
    internal static async Task<Ok<PageJson<EventJson>>> List(
        string portfolio, ClaimsPrincipal user, OutboxStore outbox, EventEnvelope envelope, HttpResponse response,
        CancellationToken cancellation, string? after = null, [Range(1, Paging.Most)] int limit = Paging.Usual)
    {
        var page = await outbox.ReadAfterAsync(user.Caller(), portfolio, after, Paging.WithOneMore(limit), cancellation);
        return page.Cursor switch
        {
            EventCursor.Known =>
                TypedResults.Ok(Paging.Page(response, page.Events, limit, envelope.Item, told => told.Id, cursor: "after")),
            EventCursor.Expired => throw new RequestRefused(new Problem(
                410, "events-expired", "The event is no longer kept",
                "What followed it may be gone too. Read without 'after' from the oldest event that is kept.")),
            _ => throw QueryFaults.Of("after", "'after' must be the id of an event of this portfolio."),
        };
    }
}
