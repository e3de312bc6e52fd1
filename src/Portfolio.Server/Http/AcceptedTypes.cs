using Microsoft.AspNetCore.Http.Metadata;
using Microsoft.Net.Http.Headers;
using Portfolio.Server.Problems;

namespace Portfolio.Server.Http;

/// <summary>What a request accepts (RFC 9110, section 12.5.1).</summary>
internal static class AcceptedTypes
{
    /// <summary>Refuses what accepts nothing of that which the route can answer (406), before it has any effect.</summary>
    public static RouteGroupBuilder HoldsToAccept(this RouteGroupBuilder routes) => routes.AddEndpointFilter((context, next) =>
        Offers(context.HttpContext) is { Count: > 0 } offered && !AcceptsOneOf(context.HttpContext.Request, offered)
            ? ValueTask.FromResult<object?>(Unacceptable(offered))
            : next(context));

    /// <summary>The quality that a type is accepted with: the most specific range that names it decides.</summary>
    public static double Quality(IEnumerable<MediaTypeHeaderValue> accepted, string type)
    {
        var named = MediaTypeHeaderValue.Parse(type);
        return accepted.Where(named.IsSubsetOf)
            .OrderBy(range => (range.MatchesAllTypes, range.MatchesAllSubTypes))
            .Select(range => range.Quality ?? 1).FirstOrDefault();
    }

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
