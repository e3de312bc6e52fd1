using System.ComponentModel.DataAnnotations;
using System.Security.Claims;
using Microsoft.AspNetCore.Http.HttpResults;
using Portfolio.Server.Access;
using Portfolio.Server.Contracts;
using Portfolio.Server.Contracts.Portfolios;
using Portfolio.Server.Http;
using Portfolio.Server.Problems;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Endpoints;

internal static class PortfolioEndpoints
{
    public static void MapPortfolios(this IEndpointRouteBuilder api)
    {
        var portfolios = api.MapGroup("/portfolios").WithTags("Portfolios");
        portfolios.MapGet("", List).WithName("listPortfolios").Refuses(422);
    }

    /// <summary>Portfolios on which the key has any grant, by id.</summary>
    /// <param name="cursor">Where the page before ended.</param>
    /// <param name="limit">Items in a page.</param>
    internal static async Task<Ok<PageJson<PortfolioEntryJson>>> List(
        ClaimsPrincipal user, DocumentStore documents, HttpResponse response, CancellationToken cancellation,
        string? cursor = null, [Range(1, Paging.Most)] int limit = Paging.Usual)
    {
        var found = await documents.ListAsync(user.Caller(), cursor, Paging.WithOneMore(limit), cancellation);
        return TypedResults.Ok(Paging.Page(response, found, limit, PortfolioEntryJson.From, entry => entry.Id));
    }
}
