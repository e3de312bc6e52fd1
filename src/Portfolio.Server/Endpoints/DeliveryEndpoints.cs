using System.ComponentModel.DataAnnotations;
using System.Globalization;
using System.Security.Claims;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.Extensions.Options;
using Portfolio.Server.Access;
using Portfolio.Server.Contracts;
using Portfolio.Server.Contracts.Subscriptions;
using Portfolio.Server.Http;
using Portfolio.Server.Idempotency;
using Portfolio.Server.Jobs;
using Portfolio.Server.Problems;
using Portfolio.Server.Webhooks;
using Portfolio.Store.Access;
using Portfolio.Store.Deliveries;
using Portfolio.Store.Subscriptions;

namespace Portfolio.Server.Endpoints;

/// <summary>What became of the events of a subscription.</summary>
internal static class DeliveryEndpoints
{
    public static void MapDeliveries(this IEndpointRouteBuilder portfolio)
    {
        var deliveries = portfolio.MapGroup("/subscriptions/{subscription}/deliveries").WithTags("Events").Needs(Right.Manage);
        deliveries.MapGet("", List).WithName("listDeliveries").Produces<PageJson<DeliveryJson>>().Refuses(422);
        deliveries.MapGet("/{delivery}", Get).WithName("getDelivery").Produces<DeliveryJson>();
        deliveries.MapPost("/{delivery}/redeliver", Redeliver).WithName("redeliverDelivery")
            .Produces<DeliveryJson>(StatusCodes.Status202Accepted).Refuses(409, 422);
    }

    /// <summary>Deliveries, the newest event first; those that were given up are <c>dead</c>.</summary>
    /// <param name="state"><c>waiting</c>, <c>sending</c>, <c>delivered</c> or <c>dead</c>; left out: all.</param>
    /// <param name="cursor">Where the page before ended.</param>
    /// <param name="limit">Items in a page.</param>
    internal static async Task<IResult> List(
        string portfolio, string subscription, ClaimsPrincipal user, SubscriptionStore subscriptions, DeliveryStore deliveries,
        HttpResponse response, CancellationToken cancellation, string? state = null, string? cursor = null,
        [Range(1, Paging.Most)] int limit = Paging.Usual)
    {
        var faults = new QueryFaults();
        var word = state is null ? null : faults.Word("state", state, "", DeliveryWords.All);
        DeliveryState? asked = Enum.TryParse<DeliveryState>(word, ignoreCase: true, out var read) ? read : null;
        faults.Refuse();
        var (before, most) = (Paging.Number(cursor), Paging.WithOneMore(limit));
        if (!user.Caller().Holds(Right.Manage, portfolio))
            return Problem.Forbidden();
        if (await subscriptions.FindAsync(user.Caller(), portfolio, subscription, cancellation) is null)
            return Problem.NotFound("There is no such subscription.");
        var found = await deliveries.ListAsync(user.Caller(), portfolio, subscription, asked, before, most, cancellation);
        return TypedResults.Ok(Paging.Page(
            response, found, limit, DeliveryJson.From, delivery => delivery.Event.Sequence.ToString(CultureInfo.InvariantCulture)));
    }

    /// <summary>One delivery.</summary>
    internal static async Task<IResult> Get(
        string portfolio, string subscription, string delivery, ClaimsPrincipal user, DeliveryStore deliveries,
        CancellationToken cancellation)
    {
        if (!user.Caller().Holds(Right.Manage, portfolio))
            return Problem.Forbidden();
        return await deliveries.FindAsync(user.Caller(), portfolio, subscription, delivery, cancellation) is { } found
            ? TypedResults.Ok(DeliveryJson.From(found))
            : Problem.NotFound("There is no such delivery.");
    }

    /// <summary>Has an event sent once more: at once, and with all its time when it had come to an end.</summary>
    internal static async Task<IResult> Redeliver(
        string portfolio, string subscription, string delivery, ClaimsPrincipal user, DeliveryStore deliveries,
        IOptions<WebhookOptions> options, EventSignal signal, HttpContext http, CancellationToken cancellation)
    {
        if (!user.Caller().Holds(Right.Manage, portfolio))
            return Problem.Forbidden();
        var (outcome, again) = await deliveries.RedeliverAsync(
            user.Caller(), portfolio, subscription, delivery, options.Value.TriedFor,
            http.Remembers<StoredDelivery>((to, accepted) => Accepted(to, signal, portfolio, subscription, accepted)), cancellation);
        return outcome switch
        {
            RedeliverOutcome.Accepted => Accepted(http, signal, portfolio, subscription, again!),
            RedeliverOutcome.UnderWay => Problem.Conflict(
                "delivery-under-way", "The delivery is being sent", "Look at it again in a moment."),
            RedeliverOutcome.Archived => Problem.Archived(),
            RedeliverOutcome.Inactive => Problem.Conflict(
                "subscription-inactive", "The subscription is not active", "Make it active first: PUT it with \"active\": true."),
            _ => Problem.NotFound("There is no such delivery."),
        };
    }

    private static Accepted<DeliveryJson> Accepted(
        HttpContext http, EventSignal signal, string portfolio, string subscription, StoredDelivery again)
    {
        signal.Give();
        http.Response.Headers.RetryAfter = "1";
        var address = $"{http.Request.PathBase}/v1/portfolios/{portfolio}/subscriptions/{subscription}/deliveries/{again.Id}";
        return TypedResults.Accepted(address, DeliveryJson.From(again));
    }
}
