using System.ComponentModel.DataAnnotations;
using System.Security.Claims;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.Extensions.Options;
using Portfolio.Server.Access;
using Portfolio.Server.Contracts;
using Portfolio.Server.Contracts.Keys;
using Portfolio.Server.Hosting;
using Portfolio.Server.Http;
using Portfolio.Server.Idempotency;
using Portfolio.Server.Problems;
using Portfolio.Store.Access;

namespace Portfolio.Server.Endpoints;

internal static class KeyEndpoints
{
    public static void MapKeys(this IEndpointRouteBuilder api)
    {
        var keys = api.MapGroup("/keys").WithTags("Keys");
        keys.MapGet("/self", Self).WithName("getOwnKey");
        var all = keys.MapGroup("").Needs(Right.Admin).Refuses(403);
        all.MapGet("", List).WithName("listKeys").Refuses(422);
        all.MapPost("", Post).WithName("createKey").Accepts<KeyRequestJson>("application/json")
            .Produces<KeyJson>(StatusCodes.Status201Created).Refuses(413, 415, 422);
        all.MapGet("/{key}", Get).WithName("getKey").Produces<KeyJson>().Refuses(404);
        all.MapPatch("/{key}", Patch).WithName("patchKey").Accepts<KeyRequestJson>(JsonBody.MergePatch, "application/json")
            .Produces<KeyJson>().Refuses(404, 409, 413, 415, 422);
        all.MapPost("/{key}/rotate", Rotate).WithName("rotateKey").Accepts<RotationJson>(isOptional: true, "application/json")
            .Produces<KeyJson>().Refuses(404, 409, 413, 415, 422);
        all.MapDelete("/{key}", Revoke).WithName("revokeKey").Produces<KeyJson>().Refuses(404, 409, 422);
    }

    /// <summary>The key that asks: its name, grants and end.</summary>
    internal static async Task<Ok<KeyJson>> Self(ClaimsPrincipal user, KeyStore keys, CancellationToken cancellation) =>
        TypedResults.Ok(KeyJson.From(
            await keys.FindAsync(user.Caller(), user.Caller().KeyId, cancellation) ?? throw new RequestRefused(Problem.NotFound())));

    /// <summary>Keys, oldest first, and people who came with tokens.</summary>
    /// <param name="cursor">Where the page before ended.</param>
    /// <param name="limit">Items in a page.</param>
    internal static async Task<Ok<PageJson<KeyJson>>> List(
        ClaimsPrincipal user, KeyStore keys, HttpResponse response, CancellationToken cancellation,
        string? cursor = null, [Range(1, Paging.Most)] int limit = Paging.Usual)
    {
        var found = await keys.ListAsync(user.Caller(), cursor, Paging.WithOneMore(limit), cancellation);
        return TypedResults.Ok(Paging.Page(response, found, limit, KeyJson.From, key => key.Id));
    }

    /// <summary>Makes a key. Its text stands in this answer alone.</summary>
    internal static async Task<IResult> Post(
        ClaimsPrincipal user, KeyStore keys, TimeProvider clock, IOptions<LimitOptions> limits, HttpContext http,
        CancellationToken cancellation)
    {
        var asked = await ReadAsync(http, whole: true, clock, limits.Value);
        var made = await keys.CreateAsync(
            user.Caller(), asked.Name!, asked.Grants!, asked.ExpiresAt,
            http.RemembersWithoutSecret<StoredKey>((to, key) => Created(to, key, secret: null)), cancellation);
        return made is null ? Problem.Forbidden() : Created(http, made.Key, made.Secret);
    }

    private static Created<KeyJson> Created(HttpContext http, StoredKey key, string? secret)
    {
        http.Response.Headers.CacheControl = "no-store";
        return TypedResults.Created($"{http.Request.PathBase}/v1/keys/{key.Id}", KeyJson.From(key, secret));
    }

    /// <summary>One key.</summary>
    internal static async Task<IResult> Get(string key, ClaimsPrincipal user, KeyStore keys, CancellationToken cancellation) =>
        await keys.FindAsync(user.Caller(), IdOf(key), cancellation) is { } found
            ? TypedResults.Ok(KeyJson.From(found))
            : Problem.NotFound();

    /// <summary>Changes a key's name, end or grants.</summary>
    internal static async Task<IResult> Patch(
        string key, ClaimsPrincipal user, KeyStore keys, TimeProvider clock, IOptions<LimitOptions> limits, HttpContext http,
        CancellationToken cancellation) =>
        Answer(http, await keys.ChangeAsync(
            user.Caller(), IdOf(key), await ReadAsync(http, whole: false, clock, limits.Value), http.Remembers<StoredKey>(Done), cancellation));

    /// <summary>Gives a key a new text, which stands in this answer alone; the one before still opens for a while.</summary>
    internal static async Task<IResult> Rotate(
        string key, ClaimsPrincipal user, KeyStore keys, IOptions<LimitOptions> limits, HttpContext http, CancellationToken cancellation)
    {
        var sent = await JsonBody.ReadAsync(http.Request, ApiContext.Default.RotationJson, limits.Value.Body);
        return Answer(http, await keys.RotateAsync(
            user.Caller(), IdOf(key), KeyRequest.OverlapOf(sent), http.RemembersWithoutSecret<StoredKey>(Rotated), cancellation));
    }

    /// <summary>Ends a key at once and for good.</summary>
    internal static async Task<IResult> Revoke(
        string key, ClaimsPrincipal user, KeyStore keys, HttpContext http, CancellationToken cancellation) =>
        Answer(http, await keys.RevokeAsync(user.Caller(), IdOf(key), http.Remembers<StoredKey>(Done), cancellation));

    private static IResult Done(HttpContext http, StoredKey key) => TypedResults.Ok(KeyJson.From(key));

    private static IResult Rotated(HttpContext http, StoredKey key)
    {
        http.Response.Headers.CacheControl = "no-store";
        return Done(http, key);
    }

    private static async Task<KeyChange> ReadAsync(HttpContext http, bool whole, TimeProvider clock, LimitOptions limits)
    {
        var sent = await JsonBody.ReadAsync(http.Request, ApiContext.Default.KeyRequestJson, limits.Body) ?? new KeyRequestJson();
        var asked = KeyRequest.Of(sent, whole, clock.GetUtcNow());
        return asked.Faults.Count == 0 ? asked.Change : throw new RequestRefused(Problem.Refused(asked.Faults));
    }

    // Routing leaves an encoded slash as it is; the ids of people may hold one.
    private static string IdOf(string key) => key.Replace("%2F", "/", StringComparison.OrdinalIgnoreCase);

    private static IResult Answer(HttpContext http, KeyResult result)
    {
        if (result.Secret is not null)
            http.Response.Headers.CacheControl = "no-store";
        return result.Outcome switch
        {
            KeyOutcome.Done => TypedResults.Ok(KeyJson.From(result.Key!, result.Secret)),
            KeyOutcome.Forbidden => Problem.Forbidden(),
            KeyOutcome.LastAdministrator => Problem.Conflict(
                "last-administrator", "This is the last administrator key",
                "Nobody could make keys afterwards. Make another key with 'admin' on '*' that does not expire first."),
            KeyOutcome.Ended => Problem.Conflict("key-ended", "The key has ended", "It is revoked or expired; make a new one."),
            KeyOutcome.Person => Problem.Conflict(
                "key-of-person", "This is a person, not a key",
                "What they may do and how long stands in the tokens of the issuer. DELETE shuts them out."),
            _ => Problem.NotFound(),
        };
    }
}
