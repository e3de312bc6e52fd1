using System.ComponentModel.DataAnnotations;
using System.Security.Claims;
using Microsoft.Extensions.Options;
using Portfolio.Server.Access;
using Portfolio.Server.Contracts;
using Portfolio.Server.Contracts.Subscriptions;
using Portfolio.Server.Hosting;
using Portfolio.Server.Http;
using Portfolio.Server.Idempotency;
using Portfolio.Server.OpenApi;
using Portfolio.Server.Problems;
using Portfolio.Server.Subscriptions;
using Portfolio.Store.Access;
using Portfolio.Store.Subscriptions;

namespace Portfolio.Server.Endpoints;

/// <summary>Who wants to be told of what.</summary>
internal static class SubscriptionEndpoints
{
    public static void MapSubscriptions(this IEndpointRouteBuilder portfolio)
    {
        var subscriptions = portfolio.MapGroup("/subscriptions").WithTags("Events").Needs(Right.Manage);
        subscriptions.MapGet("", List).WithName("listSubscriptions").Produces<PageJson<SubscriptionJson>>()
            .Refuses(422).OfPresentPortfolio();
        subscriptions.MapPost("", Post).WithName("postSubscription").Accepts<SubscriptionRequestJson>("application/json")
            .Produces<SubscriptionJson>(StatusCodes.Status201Created).Refuses(409, 413, 415, 422);
        var one = subscriptions.MapGroup("/{subscription}");
        one.MapGet("", Get).WithName("getSubscription").Produces<SubscriptionJson>().ReadsConditionally();
        one.MapPut("", Put).WithName("putSubscription").Accepts<SubscriptionRequestJson>("application/json")
            .Produces<SubscriptionJson>().WritesConditionally().Refuses(409, 412, 413, 415, 422, 428);
        one.MapDelete("", Delete).WithName("deleteSubscription").Produces(StatusCodes.Status204NoContent)
            .RemovesConditionally().Refuses(409, 412, 422, 428);
        one.MapPost("/secret", PostSecret).WithName("postSubscriptionSecret").Accepts<SecretRequestJson>(true, "application/json")
            .Produces<SubscriptionJson>().ChangesConditionally().Refuses(409, 412, 413, 415, 422);
    }

    /// <summary>Subscriptions by id, without their secrets.</summary>
    /// <param name="cursor">Where the page before ended.</param>
    /// <param name="limit">Items in a page.</param>
    internal static async Task<IResult> List(
        string portfolio, ClaimsPrincipal user, SubscriptionStore subscriptions, HttpResponse response, CancellationToken cancellation,
        string? cursor = null, [Range(1, Paging.Most)] int limit = Paging.Usual)
    {
        var most = Paging.WithOneMore(limit);
        if (!user.Caller().Holds(Right.Manage, portfolio))
            return Problem.Forbidden();
        var found = await subscriptions.ListAsync(user.Caller(), portfolio, cursor, most, cancellation);
        return TypedResults.Ok(Paging.Page(response, found, limit, SubscriptionJson.From, subscription => subscription.Id));
    }

    /// <summary>Makes a subscription. The answer is the only one that shows its secret.</summary>
    internal static async Task<IResult> Post(
        string portfolio, ClaimsPrincipal user, SubscriptionIntake intake, IOptions<LimitOptions> limits, HttpContext http,
        CancellationToken cancellation)
    {
        var sent = await JsonBody.ReadAsync(http.Request, ApiContext.Default.SubscriptionRequestJson, limits.Value.Body);
        var (result, secret) = await intake.CreateAsync(
            user.Caller(), portfolio, sent ?? new(), Joining(http, (to, done) => Created(to, done, null)), cancellation);
        return Created(http, result, secret);
    }

    /// <summary>One subscription, without its secret.</summary>
    internal static async Task<IResult> Get(
        string portfolio, string subscription, ClaimsPrincipal user, SubscriptionStore subscriptions, HttpContext http,
        CancellationToken cancellation)
    {
        if (!user.Caller().Holds(Right.Manage, portfolio))
            return Problem.Forbidden();
        if (await subscriptions.FindAsync(user.Caller(), portfolio, subscription, cancellation) is not { } found)
            return Problem.NotFound("There is no such subscription.");
        var tag = SubscriptionIntake.TagOf(found);
        if (new Preconditions(http.Request).HasAlready(tag))
            return Read.NotModified(http, tag);
        http.Response.GetTypedHeaders().ETag = tag;
        return TypedResults.Ok(SubscriptionJson.From(found));
    }

    /// <summary>Replaces what a subscription says. Its secret stays; made active again it begins anew.</summary>
    internal static async Task<IResult> Put(
        string portfolio, string subscription, ClaimsPrincipal user, SubscriptionIntake intake, IOptions<LimitOptions> limits,
        HttpContext http, CancellationToken cancellation)
    {
        var sent = await JsonBody.ReadAsync(http.Request, ApiContext.Default.SubscriptionRequestJson, limits.Value.Body);
        var conditions = new Preconditions(http.Request);
        var result = await intake.ReplaceAsync(
            user.Caller(), portfolio, subscription, sent ?? new(), conditions, Joining(http, (to, done) => Answer(to, done, null)),
            cancellation);
        return Answer(http, result, null);
    }

    /// <summary>Removes a subscription with the record of its deliveries.</summary>
    internal static async Task<IResult> Delete(
        string portfolio, string subscription, ClaimsPrincipal user, SubscriptionStore subscriptions, HttpContext http,
        CancellationToken cancellation)
    {
        var conditions = new Preconditions(http.Request);
        var result = await subscriptions.DeleteAsync(
            user.Caller(), portfolio, subscription, found => conditions.OfReplacing(SubscriptionIntake.TagOf(found)),
            Joining(http, (_, _) => TypedResults.NoContent()), cancellation);
        return result.Outcome == SubscriptionOutcome.Done ? TypedResults.NoContent() : SubscriptionIntake.Refusal(result);
    }

    /// <summary>Gives it a new secret, shown in this answer alone; for a while the one before signs too.</summary>
    internal static async Task<IResult> PostSecret(
        string portfolio, string subscription, ClaimsPrincipal user, SubscriptionIntake intake, IOptions<LimitOptions> limits,
        HttpContext http, CancellationToken cancellation)
    {
        var sent = await JsonBody.ReadAsync(http.Request, ApiContext.Default.SecretRequestJson, limits.Value.Body);
        var conditions = new Preconditions(http.Request);
        var (result, secret) = await intake.RotateAsync(
            user.Caller(), portfolio, subscription, sent, conditions, Joining(http, (to, done) => Answer(to, done, null)),
            cancellation);
        return Answer(http, result, secret);
    }

    private static SubscriptionJoining? Joining(HttpContext http, Func<HttpContext, SubscriptionResult, IResult> answer) =>
        http.RemembersWithoutSecret(answer) is { } joining ? (open, result, cancellation) => joining(open, result, cancellation) : null;

    private static IResult Created(HttpContext http, SubscriptionResult result, string? secret)
    {
        if (result is not { Outcome: SubscriptionOutcome.Done, Subscription: { } made })
            return SubscriptionIntake.Refusal(result);
        http.Response.GetTypedHeaders().ETag = SubscriptionIntake.TagOf(made);
        return TypedResults.Created(
            $"{http.Request.PathBase}{http.Request.Path}/{made.Id}", SubscriptionJson.From(made) with { Secret = secret });
    }

    private static IResult Answer(HttpContext http, SubscriptionResult result, string? secret)
    {
        if (result is not { Outcome: SubscriptionOutcome.Done, Subscription: { } stands })
            return SubscriptionIntake.Refusal(result);
        http.Response.GetTypedHeaders().ETag = SubscriptionIntake.TagOf(stands);
        return TypedResults.Ok(SubscriptionJson.From(stands) with { Secret = secret });
    }
}
