using Portfolio.Server.Access;
using Portfolio.Server.Problems;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Endpoints;

/// <summary>For lists, which would be empty where there is no portfolio: a grant may name one that is still to come.</summary>
internal static class PresentPortfolio
{
    /// <summary>404 where the portfolio in the address is not there.</summary>
    public static RouteHandlerBuilder OfPresentPortfolio(this RouteHandlerBuilder list) => list.AddEndpointFilter(async (context, next) =>
    {
        var http = context.HttpContext;
        var entry = await http.RequestServices.GetRequiredService<DocumentStore>()
            .FindEntryAsync(http.User.Caller(), (string)http.GetRouteValue("portfolio")!, http.RequestAborted);
        return entry is null ? Problem.NotFound() : await next(context);
    });
}
