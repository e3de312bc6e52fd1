using System.Text.Json;
using System.Text.RegularExpressions;
using Microsoft.AspNetCore.Diagnostics;
using Portfolio.Server.Contracts.Json;
using Portfolio.Server.Http;
using Portfolio.Store;

namespace Portfolio.Server.Problems;

/// <summary>Says in our own words what an exception means to the client; never its message, which names types of the program.</summary>
internal sealed partial class ExceptionProblems(ILogger<ExceptionProblems> log) : IExceptionHandler
{
    public async ValueTask<bool> TryHandleAsync(HttpContext context, Exception exception, CancellationToken cancellation)
    {
        if (context.RequestAborted.IsCancellationRequested)
            return true;
        var problem = exception switch
        {
            RequestRefused refused => refused.Problem,
            JsonRefused refused => Problem.Malformed(refused),
            BadHttpRequestException { StatusCode: 408 } => new Problem(408, "too-slow", "The body came too slowly"),
            BadHttpRequestException { StatusCode: 413 } => new Problem(413, "too-large", "The body is too large"),
            BadHttpRequestException unread when Unread().Match(unread.Message) is { Success: true } match =>
                UnreadParameter(JsonNamingPolicy.CamelCase.ConvertName(match.Groups["name"].Value)),
            BadHttpRequestException => Problem.BadRequest("A parameter of the address or a header cannot be read."),
            StoreUnavailableException unavailable => Unavailable(unavailable),
            _ => Unforeseen(exception),
        };
        if (problem.Status is StatusCodes.Status503ServiceUnavailable or StatusCodes.Status429TooManyRequests)
            context.Response.Headers.RetryAfter = "5";
        await problem.ExecuteAsync(context);
        return true;
    }

    // The only place where the framework tells which parameter of the query it could not read.
    [GeneratedRegex("^Failed to bind parameter \"\\S+ (?<name>\\w+)\" from ")]
    private static partial Regex Unread();

    private static Problem UnreadParameter(string name) => QueryFaults.Of(name, $"'{name}' cannot be read.").Problem;

    private Problem Unavailable(StoreUnavailableException exception)
    {
        LogUnavailable(exception);
        var kept = exception.IsInDoubt ? "The connection broke while the write was being kept: it may have been." : "Nothing was kept.";
        return new Problem(
            503, "storage-unavailable", "The storage cannot be used", $"{kept} Try again after the time in Retry-After.");
    }

    private Problem Unforeseen(Exception exception)
    {
        LogUnforeseen(exception);
        return new Problem(500, "internal", "The server failed", "The failure is logged under the trace id.");
    }

    [LoggerMessage(Level = LogLevel.Error, Message = "The storage cannot be used.")]
    private partial void LogUnavailable(Exception exception);

    [LoggerMessage(Level = LogLevel.Error, Message = "A request failed.")]
    private partial void LogUnforeseen(Exception exception);
}

/// <summary>Stops a handler with a problem.</summary>
internal sealed class RequestRefused(Problem problem) : Exception(problem.Slug)
{
    public Problem Problem { get; } = problem;
}
