using Microsoft.Net.Http.Headers;
using Portfolio.Server.Contracts.Portfolios;
using Portfolio.Server.Problems;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Endpoints;

/// <summary>The answer to a write of the document or a part of it.</summary>
internal static class Written
{
    /// <param name="tag">Entity tag of the part as it now stands.</param>
    public static IResult Answer(HttpContext http, string portfolio, WriteResult result, string? tag) => result.Outcome switch
    {
        WriteOutcome.Accepted or WriteOutcome.Unchanged => Done(http, portfolio, result, tag),
        WriteOutcome.Refused => (Problem)result.Refusal!,
        WriteOutcome.Forbidden => Problem.Forbidden(),
        WriteOutcome.Archived => Problem.Conflict("archived", "The portfolio is archived", "It can be read, but no longer written."),
        _ => Problem.NotFound(),
    };

    private static IResult Done(HttpContext http, string portfolio, WriteResult result, string? tag)
    {
        http.Response.Headers[HeaderNames.ETag] = tag;
        var written =
            new WrittenJson { Portfolio = portfolio, Revision = result.Revision, Changed = result.Outcome == WriteOutcome.Accepted };
        return result.Created ? TypedResults.Created(http.Request.Path, written) : TypedResults.Ok(written);
    }
}
