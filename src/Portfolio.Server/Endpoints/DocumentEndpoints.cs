using System.Security.Claims;
using Microsoft.Extensions.Options;
using Portfolio.Server.Access;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Portfolios;
using Portfolio.Server.Documents;
using Portfolio.Server.Hosting;
using Portfolio.Server.Http;
using Portfolio.Server.Idempotency;
using Portfolio.Server.OpenApi;
using Portfolio.Server.Problems;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Endpoints;

internal static class DocumentEndpoints
{
    public static void MapDocument(this IEndpointRouteBuilder portfolio)
    {
        var document = portfolio.MapGroup("/document").WithTags("Document");
        document.MapGet("", Get).WithName("getDocument").Needs(Right.Read)
            .Produces<SeenDocumentJson>().ReadsConditionally().Refuses(422);
        document.MapPut("", Put).WithName("putDocument").Needs(Right.Manage)
            .Accepts<DocumentJson>("application/json")
            .Produces<WrittenJson>().Produces<WrittenJson>(StatusCodes.Status201Created)
            .WritesConditionally().Refuses(409, 412, 413, 415, 422, 428).WithRequestTimeout(TimeLimits.Documents);
    }

    /// <summary>The document as it was sent, defaults not filled in.</summary>
    internal static async Task<IResult> Get([AsParameters] PartRead read)
    {
        var revision = await read.NumberAsync();
        if (await read.Documents.ReadHeadsAsync(read.Caller, read.Portfolio, revision, read.Cancellation) is { } heads
            && EntityTags.OfDocument(heads) is var tag && new Preconditions(read.Http.Request).HasAlready(tag))
            return Read.NotModified(read.Http, tag);
        return await read.Documents.ReadAsync(read.Caller, read.Portfolio, revision, read.Cancellation) is { } document
            ? Read.Document(read.Http, document)
            : Problem.NotFound();
    }

    /// <summary>Creates the portfolio or replaces everything at once.</summary>
    /// <param name="note">Kept with the revision.</param>
    internal static async Task<IResult> Put(
        string portfolio, ClaimsPrincipal user, DocumentStore documents, DocumentReader reader, DocumentCheck check,
        IOptions<LimitOptions> limits, HttpContext http, CancellationToken cancellation, string? note = null)
    {
        var kept = Notes.Checked(note);
        var conditions = new Preconditions(http.Request);
        DocumentSubmission submission;
        using (var body = await RequestBody.ReadAsync(http.Request, limits.Value.DocumentBody))
            submission = DocumentSubmission.Of(portfolio, body.Bytes, reader, check);
        var write = new DocumentWrite
        {
            Portfolio = portfolio, Note = kept, Action = "document.put",
            // Only who reaches the whole portfolio reaches these.
            Parts = [PartNames.Settings],
            Joining = http.Remembers<WriteResult>((to, done) => Written.Answer(to, portfolio, done, submission.Tag)),
        };
        var result = await documents.WriteAsync(user.Caller(), write, (head, _) => submission.ReplaceAsync(head, conditions), cancellation);
        return Written.Answer(http, portfolio, result, submission.Tag);
    }
}
