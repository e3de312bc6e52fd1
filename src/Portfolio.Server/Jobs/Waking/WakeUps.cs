using Hangfire;

namespace Portfolio.Server.Jobs.Waking;

/// <summary>
/// Hangfire wakes the jobs: every minute, and when a signal is given. It decides nothing and remembers nothing: what there is to do stands
/// in our tables. Nothing outside this folder knows it.
/// </summary>
internal static class WakeUps
{
    private static readonly TimeSpan StopsWithin = TimeSpan.FromSeconds(4);

    /// <summary>A signal of this process wakes a process that works, which may be this one.</summary>
    public static void AddWaking(this IServiceCollection services)
    {
        services.AddSingleton<JobStorage>(WakeUpStorage.Open);
        services.AddHangfire(
            (provider, hangfire) => hangfire.UseLogProvider(new WakeUpLogs(provider.GetRequiredService<ILoggerFactory>())));
        services.AddHostedService<Waker>();
    }

    /// <summary>This process is woken and works.</summary>
    public static void AddWoken(this IServiceCollection services, int runs)
    {
        // Leases of the process before are ended first.
        services.AddHostedService<JobStart>();
        services.AddHostedService<SecondLook>();
        services.AddHangfireServer(server =>
        {
            // One more than may work: the sweep comes through while they do.
            server.WorkerCount = runs + 1;
            server.ShutdownTimeout = StopsWithin;
            server.StopTimeout = TimeSpan.Zero;
            // Who vanished is forgotten soon, for what it was woken for is then given to others.
            server.HeartbeatInterval = TimeSpan.FromSeconds(10);
            server.ServerTimeout = TimeSpan.FromSeconds(60);
            server.ServerCheckInterval = TimeSpan.FromSeconds(30);
            server.SchedulePollingInterval = TimeSpan.FromSeconds(5);
        });
        services.AddHealthChecks().AddCheck<JobHealth>("jobs");
    }
}
