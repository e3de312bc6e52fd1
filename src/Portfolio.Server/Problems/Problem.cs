using System.Diagnostics;
using Portfolio.Model.Faults;
using Portfolio.Server.Audit;
using Portfolio.Server.Contracts;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Problems;

/// <summary>A refusal on its way to the client: <c>application/problem+json</c>, whatever the request accepts (RFC 9457).</summary>
/// <param name="slug">Last part of the problem's type; stable.</param>
internal sealed class Problem(int status, string slug, string title, string? detail = null) : IResult
{
    public const string MediaType = "application/problem+json";

    private const int MostFaults = 1_000;

    public int Status { get; } = status;

    public string Slug { get; } = slug;

    public IReadOnlyList<FaultJson>? Faults { get; init; }

    public async Task ExecuteAsync(HttpContext context)
    {
        // Every refusal passes here, whoever found it, so this is where refused writes are told.
        await RefusedWrites.TellAsync(context, this);
        context.Response.StatusCode = Status;
        await context.Response.WriteAsJsonAsync(
            new ProblemJson
            {
                Type = "/problems/" + Slug,
                Title = title,
                Status = Status,
                Detail = detail,
                TraceId = Activity.Current?.TraceId.ToString() ?? context.TraceIdentifier,
                Errors = Faults?.Count > MostFaults ? [.. Faults.Take(MostFaults)] : Faults,
                ErrorsOmitted = Faults?.Count > MostFaults ? Faults.Count - MostFaults : null,
            },
            options: null, MediaType, context.RequestAborted);
    }

    /// <summary>Text that is not JSON of the right shape (400).</summary>
    public static Problem Malformed(JsonRefused refused) => new(400, "malformed", "The body cannot be read", refused.Fault.Message)
    {
        Faults =
        [
            FaultJson.From(refused.Fault) with
            {
                Path = refused.IsTable ? null : refused.Fault.Path, Line = refused.Line, Column = refused.Column,
            },
        ],
    };

    /// <summary>Readable, but wrong (422).</summary>
    public static Problem Refused(IReadOnlyList<Fault> faults) => Refused([.. faults.Select(FaultJson.From)]);

    /// <summary>With faults that say themselves where they are.</summary>
    public static Problem Refused(IReadOnlyList<FaultJson> faults) => new(
        422, "refused", "The content is refused",
        faults.Count == 1 ? faults[0].Message : $"{faults.Count} faults were found; 'errors' names them.")
    {
        Faults = faults,
    };

    public static Problem BadRequest(string detail) => new(400, "bad-request", "The request cannot be understood", detail);

    public static Problem Unauthorized() => new(401, "unauthorized", "A valid key is needed",
        "Present a key as 'Authorization: Bearer', or as the password of Basic.");

    public static Problem Forbidden() => new(403, "forbidden", "The key lacks the right",
        "The key has a grant on this portfolio, but not the right for this.");

    /// <summary>With the members that the key's right does not reach.</summary>
    public static Problem Forbidden(IReadOnlyList<Fault> members, IReadOnlyList<FaultJson>? placed = null) => new(
        403, "forbidden", "The key lacks the right",
        members.Count == 1 ? members[0].Message : $"The key's right does not reach {members.Count} places; 'errors' names them.")
    {
        Faults = placed ?? [.. members.Select(FaultJson.From)],
    };

    public static Problem NotFound(string? detail = null) => new(404, "not-found", "There is no such thing here", detail);

    public static Problem Conflict(string slug, string title, string? detail = null) => new(409, slug, title, detail);

    public static Problem Archived() =>
        Conflict("archived", "The portfolio is archived", "It can be read, but no longer written or run, and its id is not used again.");

    public static Problem PreconditionFailed() => new(412, "precondition-failed", "What is there has changed",
        "The ETag in If-Match is not that of what is there now. Read it again first.");

    public static Problem TooLarge(int limit) => new(413, "too-large", "The body is too large", $"At most {limit} bytes are taken here.");

    public static Problem PreconditionRequired() => new(428, "precondition-required", "Say what is replaced",
        "Send If-Match with the ETag of what is there, or * to replace whatever is there.");

    public static Problem TooManyRequests() => new(429, "too-many-requests", "Too many requests",
        "This key asks faster than allowed; try again after the time in Retry-After.");
}
