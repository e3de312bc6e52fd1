using Microsoft.Net.Http.Headers;
using Portfolio.Server.Contracts.Portfolios;
using Portfolio.Server.Problems;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Endpoints;

/// <summary>The answer to a write of the document or a part of it.</summary>
internal static class Written
{
    /// <param name="tag">Entity tag of the part as it now stands.</param>
    /// <param name="creates">True when the thing at the address is new; a new portfolio is in any case.</param>
    public static IResult Answer(
        HttpContext http, string portfolio, WriteResult result, string? tag, bool creates = false) => result.Outcome switch
    {
        WriteOutcome.Accepted or WriteOutcome.Unchanged => Done(http, portfolio, result, tag, creates || result.Created),
        WriteOutcome.Refused => (Problem)result.Refusal!,
        WriteOutcome.Forbidden => Problem.Forbidden(),
        WriteOutcome.Archived => Problem.Archived(),
        _ => Problem.NotFound(),
    };

    private static IResult Done(HttpContext http, string portfolio, WriteResult result, string? tag, bool created)
    {
        http.Response.Headers[HeaderNames.ETag] = tag;
        var written =
            new WrittenJson { Portfolio = portfolio, Revision = result.Revision, Changed = result.Outcome == WriteOutcome.Accepted };
        return created ? TypedResults.Created(http.Request.Path, written) : TypedResults.Ok(written);
    }
}
