using Hangfire;
using Microsoft.Extensions.Diagnostics.HealthChecks;

namespace Portfolio.Server.Jobs.Waking;

/// <summary>The server that wakes the jobs of this process has announced itself.</summary>
internal sealed class JobHealth(JobStorage storage) : IHealthCheck
{
    // How Hangfire calls a server; what follows differs with each.
    private static readonly string Ours = $"{Environment.MachineName}:{Environment.ProcessId}:";

    public Task<HealthCheckResult> CheckHealthAsync(HealthCheckContext context, CancellationToken cancellation) =>
        Task.FromResult(storage.GetMonitoringApi().Servers().Any(
            server => server.Name.StartsWith(Ours, StringComparison.OrdinalIgnoreCase))
            ? HealthCheckResult.Healthy()
            : HealthCheckResult.Unhealthy("No worker has started yet."));
}
