using Microsoft.AspNetCore.Http.Timeouts;
using Microsoft.Extensions.Options;
using Portfolio.Server.Problems;

namespace Portfolio.Server.Hosting;

/// <summary>No request keeps the server busy for longer than the limits say (503).</summary>
internal static class TimeLimits
{
    /// <summary>The policy of requests that carry whole documents.</summary>
    public const string Documents = "documents";

    public static void AddTimeLimits(this IServiceCollection services)
    {
        services.AddRequestTimeouts();
        services.AddOptions<RequestTimeoutOptions>().Configure<IOptions<LimitOptions>>((timeouts, limits) =>
        {
            timeouts.DefaultPolicy = Within(limits.Value.RequestTime);
            timeouts.AddPolicy(Documents, Within(limits.Value.DocumentTime));
        });
    }

    private static RequestTimeoutPolicy Within(TimeSpan time) => new()
    {
        Timeout = time,
        TimeoutStatusCode = StatusCodes.Status503ServiceUnavailable,
        WriteTimeoutResponse = http =>
        {
            http.Response.Headers.RetryAfter = "5";
            // What has run out must not stop the answer that says so.
            http.RequestAborted = CancellationToken.None;
            return new Problem(
                503, "timeout", "The request took too long",
                "A write may have been kept all the same: read what is there, or send it again with the same Idempotency-Key.")
                .ExecuteAsync(http);
        },
    };
}
