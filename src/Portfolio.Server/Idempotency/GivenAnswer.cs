using System.Text;
using Portfolio.Store.Idempotency;

namespace Portfolio.Server.Idempotency;

/// <summary>An answer as it is kept, and given: status, headers and body are the same each time.</summary>
/// <param name="again">True when it was given before.</param>
internal sealed class GivenAnswer(KeptAnswer kept, bool again) : IResult
{
    public const string AgainHeader = "Idempotent-Replay";

    /// <summary>Works out an answer beside the request that it is for, so that it can be kept before it is given.</summary>
    /// <param name="answer">Makes the answer for a context with the same address.</param>
    public static async Task<KeptAnswer> MakeAsync(HttpContext http, string digest, Func<HttpContext, Task<IResult>> answer)
    {
        using var body = new MemoryStream();
        var beside = new DefaultHttpContext { RequestServices = http.RequestServices, User = http.User };
        (beside.Request.Method, beside.Request.PathBase, beside.Request.Path, beside.Request.QueryString) =
            (http.Request.Method, http.Request.PathBase, http.Request.Path, http.Request.QueryString);
        beside.Response.Body = body;
        await (await answer(beside)).ExecuteAsync(beside);
        await beside.Response.BodyWriter.FlushAsync(http.RequestAborted);
        var headers = new StringBuilder();
        foreach (var (name, value) in beside.Response.Headers)
            headers.Append(name).Append(": ").Append(value).Append('\n');
        return new KeptAnswer(digest, beside.Response.StatusCode, headers.ToString(), body.ToArray());
    }

    public async Task ExecuteAsync(HttpContext http)
    {
        http.Response.StatusCode = kept.Status;
        foreach (var line in kept.Headers.Split('\n', StringSplitOptions.RemoveEmptyEntries))
        {
            var colon = line.IndexOf(':', StringComparison.Ordinal);
            http.Response.Headers[line[..colon]] = line[(colon + 2)..];
        }
        if (again)
            http.Response.Headers[AgainHeader] = "true";
        await http.Response.Body.WriteAsync(kept.Body, http.RequestAborted);
    }
}
