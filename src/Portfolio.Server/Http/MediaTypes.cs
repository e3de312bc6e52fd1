using Microsoft.AspNetCore.Http.Features;
using Microsoft.AspNetCore.Http.Metadata;
using Microsoft.Net.Http.Headers;
using Portfolio.Server.Problems;

namespace Portfolio.Server.Http;

/// <summary>In which forms a request brings its body and takes its answer (RFC 9110, sections 8.3 and 12.5.1).</summary>
internal static class MediaTypes
{
    /// <summary>
    /// Refuses what accepts nothing of that which the route can answer (406) and bodies that do not say what they are (415), before there
    /// is any effect.
    /// </summary>
    public static RouteGroupBuilder HoldsToMediaTypes(this RouteGroupBuilder routes) => routes.AddEndpointFilter((context, next) =>
        Refused(context.HttpContext) is { } problem ? ValueTask.FromResult<object?>(problem) : next(context));

    private static Problem? Refused(HttpContext http)
    {
        if (Offers(http) is { Count: > 0 } offered && !AcceptsOneOf(http.Request, offered))
        {
            http.Response.Headers.Vary = HeaderNames.Accept;
            return Unacceptable(offered);
        }
        return http.Request.ContentType is null && HasBody(http)
            && http.GetEndpoint()?.Metadata.GetMetadata<IAcceptsMetadata>() is { } taken
            ? Unsupported(taken.ContentTypes)
            : null;
    }

    private static bool HasBody(HttpContext http) => http.Features.Get<IHttpRequestBodyDetectionFeature>()?.CanHaveBody == true;

    /// <summary>The quality that a type is accepted with: the most specific range that names it decides.</summary>
    public static double Quality(IEnumerable<MediaTypeHeaderValue> accepted, string type)
    {
        // Every text is in UTF-8, so a range that says so names it too.
        var named = new MediaTypeHeaderValue(type) { Charset = "utf-8" };
        return accepted.Where(named.IsSubsetOf)
            .OrderBy(range => (range.MatchesAllTypes, range.MatchesAllSubTypes, !range.Charset.HasValue))
            .Select(range => range.Quality ?? 1).FirstOrDefault();
    }

    public static Problem Unsupported(IEnumerable<string> taken) => new(
        415, "unsupported-media-type", "The body's media type is not taken here", $"Send {string.Join(" or ", taken)}.");

    public static Problem Unacceptable(IEnumerable<string> offered) =>
        new(406, "not-acceptable", "No such representation", $"There is {string.Join(" and ", offered)}.");

    private static bool AcceptsOneOf(HttpRequest request, List<string> offered)
    {
        var accepted = request.GetTypedHeaders().Accept;
        return accepted.Count == 0 || offered.Exists(type => Quality(accepted, type) > 0);
    }

    /// <summary>Empty when the request leaves the choice to the server.</summary>
    private static List<string> Offers(HttpContext http) =>
        http.Request.Headers.Accept.Count == 0 || http.Request.Query.ContainsKey("format")
            ? []
            : [.. (http.GetEndpoint()?.Metadata.GetOrderedMetadata<IProducesResponseTypeMetadata>() ?? [])
                .Where(answer => answer.StatusCode is >= 200 and < 300).SelectMany(answer => answer.ContentTypes).Distinct()];
}
