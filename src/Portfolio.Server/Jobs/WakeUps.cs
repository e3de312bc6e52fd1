using Hangfire;
using Hangfire.InMemory;
using Hangfire.Logging;
using Microsoft.Extensions.Diagnostics.HealthChecks;
using Microsoft.Extensions.Logging.Abstractions;
using Portfolio.Store.Access;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Jobs;

/// <summary>
/// Hangfire wakes the jobs: every minute, and when a signal is given. It decides nothing and remembers nothing: what there is to do stands
/// in our tables. No other file knows it.
/// </summary>
internal static class WakeUps
{
    private static readonly TimeSpan StopsWithin = TimeSpan.FromSeconds(4);

    public static void AddWakeUps(this IServiceCollection services, int runs)
    {
        services.AddSingleton<JobStorage>(
            _ => new InMemoryStorage(new InMemoryStorageOptions { MaxExpirationTime = TimeSpan.FromMinutes(5) }));
        services.AddHangfire(
            (provider, hangfire) => hangfire.UseLogProvider(new WakeUpLogs(provider.GetRequiredService<ILoggerFactory>())));
        // Leases of the process before are ended first.
        services.AddHostedService<JobStart>();
        services.AddHostedService<SecondLook>();
        services.AddHangfireServer(server =>
        {
            // One more than may work: the sweep comes through while they do.
            server.WorkerCount = runs + 1;
            server.ShutdownTimeout = StopsWithin;
            server.StopTimeout = TimeSpan.Zero;
        });
        services.AddHealthChecks().AddCheck<JobHealth>("jobs");
    }
}

/// <summary>The two jobs as Hangfire sees them. Not retried: the next sweep is the retry.</summary>
[AutomaticRetry(Attempts = 0, LogEvents = false)]
internal sealed class WokenJobs(Sweep sweep, RunWorker worker, IHostApplicationLifetime process)
{
    // Beside the host's own sign, because Hangfire's comes only when its turn to stop has come.
    public async Task Work(CancellationToken cancellation)
    {
        using var stopping = CancellationTokenSource.CreateLinkedTokenSource(cancellation, process.ApplicationStopping);
        await worker.WorkAsync(stopping.Token).ConfigureAwait(ConfigureAwaitOptions.None);
    }

    public async Task Sweep(CancellationToken cancellation)
    {
        await sweep.RunAsync(cancellation);
        await Work(cancellation);
    }
}

/// <summary>
/// At the start: one process owns the folder, so whoever held a lease is gone and its runs go on at once; then a first sweep, which also
/// catches up what became due meanwhile.
/// </summary>
internal sealed class JobStart(
    RunClaims claims, RunSignal signal, IBackgroundJobClient client, IRecurringJobManager recurring, ILogger<JobStart> log) : IHostedService
{
    public async Task StartAsync(CancellationToken cancellation)
    {
        if (await claims.ExpireAllAsync(Caller.System, cancellation) is > 0 and var count)
            RunLog.Resumed(log, count);
        recurring.AddOrUpdate<WokenJobs>("sweep", jobs => jobs.Sweep(CancellationToken.None), Cron.Minutely);
        client.Enqueue<WokenJobs>(jobs => jobs.Sweep(CancellationToken.None));
        signal.Given += Wake;
    }

    public Task StopAsync(CancellationToken cancellation)
    {
        signal.Given -= Wake;
        return Task.CompletedTask;
    }

    private void Wake() => client.Enqueue<WokenJobs>(jobs => jobs.Work(CancellationToken.None));
}

/// <summary>The server that wakes the jobs has announced itself.</summary>
internal sealed class JobHealth(JobStorage storage) : IHealthCheck
{
    public Task<HealthCheckResult> CheckHealthAsync(HealthCheckContext context, CancellationToken cancellation) =>
        Task.FromResult(storage.GetMonitoringApi().Servers().Count > 0
            ? HealthCheckResult.Healthy()
            : HealthCheckResult.Unhealthy("No worker has started yet."));
}

/// <summary>
/// Hangfire keeps one log for the whole program, for ever; a host's own ends with the host. What is said after that is nobody's to hear.
/// </summary>
internal sealed class WakeUpLogs(ILoggerFactory logs) : ILogProvider
{
    public ILog GetLogger(string name)
    {
        try
        {
            return new Log(logs.CreateLogger(name));
        }
        catch (ObjectDisposedException)
        {
            return new Log(NullLogger.Instance);
        }
    }

    private sealed class Log(ILogger log) : ILog
    {
        bool ILog.Log(Hangfire.Logging.LogLevel level, Func<string>? message, Exception? exception)
        {
            // Both count the same six levels from trace upwards.
            var asked = (Microsoft.Extensions.Logging.LogLevel)(int)level;
            try
            {
                if (message is not null && log.IsEnabled(asked))
                    WakeUpLog.Said(log, asked, message(), exception);
                return log.IsEnabled(asked);
            }
            catch (Exception)
            {
                // A log that cannot be written, such as that of a host that has ended, must not keep another host's jobs from starting.
                return false;
            }
        }
    }
}

internal static partial class WakeUpLog
{
    [LoggerMessage(EventId = 2020, Message = "{Text}")]
    public static partial void Said(ILogger log, Microsoft.Extensions.Logging.LogLevel level, string text, Exception? exception);
}
