using Microsoft.Net.Http.Headers;
using Portfolio.Server.Access;
using Portfolio.Server.Contracts.Csv;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Portfolios;
using Portfolio.Server.Documents;
using Portfolio.Server.Http;
using Portfolio.Server.Idempotency;
using Portfolio.Server.OpenApi;
using Portfolio.Server.Problems;
using Portfolio.Server.Updates;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Endpoints;

/// <summary>What other systems report, many projects at once, all or nothing.</summary>
internal static class UpdateEndpoints
{
    public static void MapUpdates(this IEndpointRouteBuilder portfolio) =>
        portfolio.MapPost("/updates", Post).WithName("postUpdates").WithTags("Updates").Needs(Right.Submit)
            .Accepts<UpdatesJson>("application/json", CsvTable.MediaType)
            .Produces<UpdatedJson>().ChangesConditionally().Refuses(409, 412, 413, 415, 422);

    /// <summary>Takes what is reported of projects and their activities; one revision for all, or none.</summary>
    /// <remarks>
    /// A member that is sent replaces the stored one whole; only cost and overhead are merged one level deeper; null removes. As CSV: the
    /// columns project, activity and create, and dotted members such as remaining.low; an empty cell is not sent. With the right to submit,
    /// demands and drivers of activities and everything of a project but statusDate and overhead.actual must stay as they are.
    /// </remarks>
    /// <param name="dryRun">True: only says what would change.</param>
    internal static async Task<IResult> Post([AsParameters] PartWrite write, bool dryRun = false)
    {
        try
        {
            using var body = await write.BodyAsync();
            var set = IsTable(write.Http.Request) ? CsvUpdates.Read(body.Bytes) : JsonUpdates.Read(body.Bytes, write.Reader);
            var edit = new UpdatesEdit(set, write.Conditions, write.Submits, write.Manages);
            return dryRun ? await TryAsync(write, edit.DrawAsync) : await WriteAsync(write, edit.DrawAsync);
        }
        catch (Contracts.Json.JsonRefused refused)
        {
            var problem = Problem.Malformed(refused);
            return dryRun ? problem : await WriteAsync(write, _ => Task.FromResult<Draft>(problem));
        }
    }

    private static bool IsTable(HttpRequest request)
    {
        var type = MediaTypeHeaderValue.Parse(request.ContentType);
        if (type.Charset.HasValue && type.Encoding is not (null or { CodePage: 65001 or 20127 }))
            throw new RequestRefused(MediaTypes.Unsupported(["text in UTF-8"]));
        return type.MediaType.Equals(CsvTable.MediaType, StringComparison.OrdinalIgnoreCase);
    }

    private static async Task<IResult> WriteAsync(PartWrite write, Func<DocumentState, Task<Draft>> draw)
    {
        var asked = write.Of("updates.post", Right.Submit);
        return Answer(write.Http, await write.Writing.WriteAsync(
            write.Caller, asked, draw, write.Http.Remembers<PartsWritten>(Answer), write.Cancellation));

        IResult Answer(HttpContext to, PartsWritten done)
        {
            if (done.Result.Outcome is not (WriteOutcome.Accepted or WriteOutcome.Unchanged))
                return Written.Answer(to, write.Portfolio, done.Result, done.Tag);
            to.Response.Headers.ETag = done.Tag;
            return TypedResults.Ok(AnswerOf(write, done.Result, null));
        }
    }

    private static async Task<IResult> TryAsync(PartWrite write, Func<DocumentState, Task<Draft>> draw)
    {
        var asked = write.Of("updates.post", Right.Submit);
        var (result, tag, changes) = await write.Writing.TryAsync(write.Caller, asked, draw, write.Cancellation);
        if (result.Outcome is not (WriteOutcome.Accepted or WriteOutcome.Unchanged))
            return Written.Answer(write.Http, write.Portfolio, result, null);
        write.Http.Response.Headers.ETag = tag;
        return TypedResults.Ok(AnswerOf(write, result, [.. changes.Select(ChangeJson.From)]));
    }

    private static UpdatedJson AnswerOf(PartWrite write, WriteResult result, IReadOnlyList<ChangeJson>? changes) => new()
    {
        Portfolio = write.Portfolio, Revision = result.Revision, Changed = result.Outcome == WriteOutcome.Accepted, Changes = changes,
    };
}
