using System.ComponentModel.DataAnnotations;
using System.Security.Claims;
using Microsoft.AspNetCore.Http.HttpResults;
using Portfolio.Server.Access;
using Portfolio.Server.Contracts;
using Portfolio.Server.Contracts.Portfolios;
using Portfolio.Server.Http;
using Portfolio.Server.Idempotency;
using Portfolio.Server.Jobs;
using Portfolio.Server.Problems;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Endpoints;

internal static class PortfolioEndpoints
{
    public static void MapPortfolios(this IEndpointRouteBuilder api)
    {
        var portfolios = api.MapGroup("/portfolios").WithTags("Portfolios");
        portfolios.MapGet("", List).WithName("listPortfolios").Refuses(422);
    }

    public static void MapPortfolio(this IEndpointRouteBuilder portfolio)
    {
        var entry = portfolio.MapGroup("").WithTags("Portfolios");
        entry.MapGet("", Get).WithName("getPortfolio").Needs(Right.Read).Produces<PortfolioEntryJson>();
        entry.MapDelete("", Archive).WithName("archivePortfolio").Needs(Right.Admin).Produces<PortfolioEntryJson>().Refuses(409, 412, 422);
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

    /// <summary>One portfolio as listed.</summary>
    internal static async Task<IResult> Get(
        string portfolio, ClaimsPrincipal user, DocumentStore documents, CancellationToken cancellation) =>
        await documents.FindEntryAsync(user.Caller(), portfolio, cancellation) is { } entry
            ? TypedResults.Ok(PortfolioEntryJson.From(entry))
            : Problem.NotFound();

    /// <summary>
    /// Archives the portfolio for good: it stays readable, but takes no more writes or runs; its schedule is switched off, runs that have
    /// not ended are stopped, and its id is not used again. A second time changes nothing.
    /// </summary>
    internal static async Task<IResult> Archive(
        string portfolio, ClaimsPrincipal user, PortfolioArchive archive, RunSignal signal, HttpContext http, CancellationToken cancellation)
    {
        var conditions = new Preconditions(http.Request);
        var result = await archive.ArchiveAsync(
            user.Caller(), portfolio, head => conditions.OfChanging(EntityTags.OfDocument(head.Parts)),
            http.Remembers<PortfolioEntry>((_, entry) => TypedResults.Ok(PortfolioEntryJson.From(entry))), cancellation);
        if (result is not { Entry: { } entry })
            return result.Refusal as Problem ?? (result.Outcome == WriteOutcome.Forbidden ? Problem.Forbidden() : Problem.NotFound());
        signal.Give();
        return TypedResults.Ok(PortfolioEntryJson.From(entry));
    }
}
