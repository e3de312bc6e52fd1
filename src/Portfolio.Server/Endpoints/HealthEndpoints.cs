using Microsoft.AspNetCore.Diagnostics.HealthChecks;
using Microsoft.Extensions.Diagnostics.HealthChecks;
using Portfolio.Store;

namespace Portfolio.Server.Endpoints;

/// <summary>Whether the process serves, and whether what it needs works. Each concern adds a check of its own.</summary>
internal static class HealthEndpoints
{
    public static void AddHealth(this IServiceCollection services) => services.AddHealthChecks().AddCheck<StorageHealth>("storage");

    public static void MapHealth(this IEndpointRouteBuilder app)
    {
        var health = app.MapGroup("/health").AllowAnonymous().DisableRateLimiting();
        health.MapHealthChecks("/live", new HealthCheckOptions { Predicate = _ => false, ResponseWriter = Write });
        health.MapHealthChecks("/ready", new HealthCheckOptions { ResponseWriter = Write });
    }

    private static Task Write(HttpContext context, HealthReport report)
    {
        if (report.Status == HealthStatus.Unhealthy)
            context.Response.Headers.RetryAfter = "1";
        context.Response.ContentType = "application/json; charset=utf-8";
        var checks = string.Join(",", report.Entries.Select(entry => $"\"{entry.Key}\":\"{Word(entry.Value.Status)}\""));
        return context.Response.WriteAsync(
            $$$"""{"status":"{{{Word(report.Status)}}}","checks":{ {{{checks}}} }}""", context.RequestAborted);
    }

    private static string Word(HealthStatus status) => status == HealthStatus.Unhealthy ? "failing" : "ok";
}

/// <summary>Storage can be read and, as far as is known, written.</summary>
internal sealed class StorageHealth(Database database) : IHealthCheck
{
    public async Task<HealthCheckResult> CheckHealthAsync(HealthCheckContext context, CancellationToken cancellation)
    {
        await database.PingAsync(cancellation);
        return HealthCheckResult.Healthy();
    }
}
