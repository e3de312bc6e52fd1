using Portfolio.Server.Problems;

namespace Portfolio.Server.Http;

/// <summary>
/// A browser remembers a key that was typed in as password and sends it along with whatever another site's page makes it ask for. Such a
/// page needs no leave for a write without a body, which asks for a run or a new secret: it is known by what browsers say about where a
/// request comes from (W3C Fetch Metadata; RFC 6454 where that is missing). Programs say nothing of the kind.
/// </summary>
internal static class OtherSites
{
    /// <summary>Refuses writes that another site's page makes a browser send (403).</summary>
    public static RouteGroupBuilder RefusesOtherSites(this RouteGroupBuilder routes) => routes.AddEndpointFilter((context, next) =>
        HttpMethods.IsGet(context.HttpContext.Request.Method) || IsOwn(context.HttpContext.Request)
            ? next(context)
            : ValueTask.FromResult<object?>(new Problem(
                403, "other-site", "The request comes from a page of another site",
                "Send it from a program, or from a page of this server.")));

    private static bool IsOwn(HttpRequest request)
    {
        if (request.Headers["Sec-Fetch-Site"] is { Count: > 0 } site)
            return site.ToString() is "same-origin" or "none";
        return request.Headers.Origin.Count == 0
            || (Uri.TryCreate(request.Headers.Origin, UriKind.Absolute, out var origin) && origin.Authority == request.Host.Value);
    }
}
