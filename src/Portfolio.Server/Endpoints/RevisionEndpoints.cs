using System.ComponentModel.DataAnnotations;
using System.Globalization;
using System.Security.Claims;
using Microsoft.AspNetCore.Http.HttpResults;
using Portfolio.Server.Access;
using Portfolio.Server.Contracts;
using Portfolio.Server.Contracts.Portfolios;
using Portfolio.Server.Documents;
using Portfolio.Server.Http;
using Portfolio.Server.OpenApi;
using Portfolio.Server.Problems;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Endpoints;

internal static class RevisionEndpoints
{
    public static void MapRevisions(this IEndpointRouteBuilder portfolio)
    {
        var revisions = portfolio.MapGroup("/revisions").WithTags("Revisions").Needs(Right.Read);
        revisions.MapGet("", List).WithName("listRevisions").Refuses(422).OfPresentPortfolio();
        revisions.MapGet("/{number:long}", Get).WithName("getRevision").Produces<RevisionJson>();
        revisions.MapGet("/{number:long}/changes", Changes).WithName("listChanges")
            .Produces<PageJson<ChangeJson>>().ReadsConditionally().Refuses(422);
    }

    /// <summary>Accepted writes, newest first. A note is shown to who may read something that the write changed.</summary>
    /// <param name="cursor">Where the page before ended.</param>
    /// <param name="limit">Items in a page.</param>
    internal static async Task<Ok<PageJson<RevisionJson>>> List(
        string portfolio, ClaimsPrincipal user, DocumentStore documents, HttpResponse response, CancellationToken cancellation,
        string? cursor = null, [Range(1, Paging.Most)] int limit = Paging.Usual)
    {
        var found = await documents.ListRevisionsAsync(
            user.Caller(), portfolio, Paging.Number(cursor), Paging.WithOneMore(limit), cancellation);
        return TypedResults.Ok(Paging.Page(
            response, found, limit, RevisionJson.From, revision => revision.Number.ToString(CultureInfo.InvariantCulture)));
    }

    /// <summary>One accepted write: when, by whom, with what note.</summary>
    internal static async Task<IResult> Get(
        string portfolio, long number, ClaimsPrincipal user, DocumentStore documents, CancellationToken cancellation) =>
        await documents.FindRevisionAsync(user.Caller(), portfolio, number, cancellation) is { } revision
            ? TypedResults.Ok(RevisionJson.From(revision))
            : Problem.NotFound();

    /// <summary>What a revision changed, place by place: settings, then projects in document order. Only parts that the key may read.</summary>
    /// <param name="cursor">Where the page before ended.</param>
    /// <param name="limit">Items in a page.</param>
    internal static async Task<IResult> Changes(
        string portfolio, long number, ClaimsPrincipal user, RevisionChanges changes, HttpContext http, CancellationToken cancellation,
        string? cursor = null, [Range(1, Paging.Most)] int limit = Paging.Usual)
    {
        var (skip, take) = (Paging.Count(cursor), Paging.WithOneMore(limit));
        if (await changes.PartsAsync(user.Caller(), portfolio, number, cancellation) is not { } parts)
            return Problem.NotFound();
        var tag = EntityTags.OfText($"{number}\n{skip}\n{take}\n{string.Join('\n', parts)}");
        if (new Preconditions(http.Request).HasAlready(tag))
            return Read.NotModified(http, tag);
        var found = await changes.ReadAsync(user.Caller(), portfolio, number, parts, skip, take, cancellation);
        http.Response.GetTypedHeaders().ETag = tag;
        var next = (skip + limit).ToString(CultureInfo.InvariantCulture);
        return TypedResults.Ok(Paging.Page(http.Response, found, limit, ChangeJson.From, _ => next));
    }
}
