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
    /// <param name="revision">A revision; left out: the newest.</param>
    /// <param name="asOf">The revision that was current at the end of this local date.</param>
    internal static async Task<IResult> Get(
        string portfolio, ClaimsPrincipal user, DocumentStore documents, RevisionOfDate revisions, HttpContext http,
        CancellationToken cancellation, long? revision = null, string? asOf = null)
    {
        var faults = new QueryFaults();
        if (revision is not null && asOf is not null)
            faults.Add("asOf", "Give 'revision' or 'asOf', not both.");
        var asked = faults.Date("asOf", asOf);
        faults.Refuse();
        if (asked is { } date && (revision = await revisions.FindAsync(user.Caller(), portfolio, date, cancellation)) is null)
            return Problem.NotFound("The portfolio had no revision at that date.");
        if (await documents.ReadHeadsAsync(user.Caller(), portfolio, revision, cancellation) is { } heads
            && EntityTags.OfDocument(heads) is var tag && new Preconditions(http.Request).HasAlready(tag))
            return Read.NotModified(http, tag);
        return await documents.ReadAsync(user.Caller(), portfolio, revision, cancellation) is { } document
            ? Read.Document(http, document)
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
            Portfolio = portfolio, Note = kept, Action = "document.put", Parts = [PartNames.Settings],
            Joining = http.Remembers<WriteResult>((to, done) => Written.Answer(to, portfolio, done, submission.Tag)),
        };
        var result = await documents.WriteAsync(user.Caller(), write, (head, _) => submission.ReplaceAsync(head, conditions), cancellation);
        return Written.Answer(http, portfolio, result, submission.Tag);
    }
}
