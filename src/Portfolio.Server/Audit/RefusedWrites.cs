using Microsoft.AspNetCore.Diagnostics;
using Portfolio.Server.Access;
using Portfolio.Server.Problems;
using Portfolio.Store;
using Portfolio.Store.Access;
using Portfolio.Store.Audit;

namespace Portfolio.Server.Audit;

/// <summary>
/// Leaves a line in the audit trail for every write that was refused: who, what, why; never what was sent. Not of strangers and of keys
/// that ask too fast, who could fill the disk, nor of failures of the server's own.
/// </summary>
internal sealed partial class RefusedWrites(AuditStore audit, ILogger<RefusedWrites> log)
{
    private const int LongestObject = 300;

    private static readonly HashSet<string> Contents = new(["document", "settings", "project", "activity", "updates"], StringComparer.Ordinal);

    public static Task TellAsync(HttpContext context, Problem problem) =>
        IsWrite(context.Request.Method) && IsRefusal(problem.Status) && context.User.Identity is CallerIdentity { Caller: var caller }
            ? context.RequestServices.GetRequiredService<RefusedWrites>()
                .AppendAsync(caller, ActionOf(context), ObjectOf(context.Request.Path), problem)
            : Task.CompletedTask;

    private async Task AppendAsync(Caller caller, string action, string @object, Problem problem)
    {
        object detail = problem.Faults is { } faults
            ? new
            {
                outcome = "refused",
                problem.Status,
                problem = problem.Slug,
                faults = faults.Count,
                codes = faults.CountBy(fault => fault.Code).ToDictionary(),
            }
            : new { outcome = "refused", problem.Status, problem = problem.Slug };
        try
        {
            // Whoever hangs up is told of all the same.
            if (PortfolioOf(action, @object, problem) is { } portfolio)
                await audit.AppendRefusedPostAsync(caller, portfolio, action, @object, detail, CancellationToken.None);
            else
                await audit.AppendAsync(caller, action, @object, detail, CancellationToken.None);
        }
        catch (StoreUnavailableException unavailable)
        {
            LogUntold(action, unavailable);
        }
    }

    /// <summary>The portfolio whose content was refused, of which those who listen are told too; null of everything else.</summary>
    private static string? PortfolioOf(string action, string @object, Problem problem) =>
        problem.Faults is { Count: > 0 } && Contents.Contains(action.Split('.')[0]) && @object.Split('/') is ["portfolios", var id, ..] ? id : null;

    private static bool IsWrite(string method) =>
        HttpMethods.IsPost(method) || HttpMethods.IsPut(method) || HttpMethods.IsPatch(method) || HttpMethods.IsDelete(method);

    private static bool IsRefusal(int status) =>
        status is >= 400 and < 500 and not (StatusCodes.Status401Unauthorized or StatusCodes.Status429TooManyRequests);

    /// <summary>A route's name, verb and noun, as an action: <c>putDocument</c> is <c>document.put</c>.</summary>
    private static string ActionOf(HttpContext context)
    {
        // The handler of exceptions works on a request whose endpoint was taken away.
        var endpoint = context.GetEndpoint() ?? context.Features.Get<IExceptionHandlerFeature>()?.Endpoint;
        // What no route takes, such as a media type, has no name either.
        if (endpoint?.Metadata.GetMetadata<IEndpointNameMetadata>()?.EndpointName is not { } name)
            return $"request.{context.Request.Method.ToLowerInvariant()}";
        var noun = name.AsSpan().IndexOfAnyInRange('A', 'Z');
        return noun < 0 ? name : $"{char.ToLowerInvariant(name[noun])}{name[(noun + 1)..]}.{name[..noun]}";
    }

    private static string ObjectOf(PathString path)
    {
        var text = path.Value!.StartsWith("/v1/", StringComparison.Ordinal) ? path.Value[4..] : path.Value;
        return text.Length > LongestObject ? text[..LongestObject] : text;
    }

    [LoggerMessage(Level = LogLevel.Error, Message = "A refused {Action} could not be told to the audit trail.")]
    private partial void LogUntold(string action, Exception exception);
}
