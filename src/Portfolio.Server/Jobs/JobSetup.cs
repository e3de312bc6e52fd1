using Portfolio.Server.Audit;
using Portfolio.Server.Hosting;
using Portfolio.Server.Jobs.Waking;

namespace Portfolio.Server.Jobs;

/// <summary>The jobs, and what wakes them.</summary>
internal static class JobSetup
{
    /// <summary>A process that is told to stop has ended within this time: runs go back to the queue, streams close.</summary>
    private static readonly TimeSpan StopsWithin = TimeSpan.FromSeconds(4.5);

    public static void AddJobs(this IServiceCollection services, IConfiguration configuration)
    {
        services.AddOptions<EngineOptions>().BindConfiguration(EngineOptions.Section).ValidateDataAnnotations().ValidateOnStart();
        services.Configure<HostOptions>(host => host.ShutdownTimeout = StopsWithin);
        services.AddSingleton<RunSignal>();
        services.AddSingleton<EventSignal>();
        services.AddSingleton<RunProgress>();
        services.AddSingleton<RunWorker>();
        services.AddSingleton<Nightly>();
        services.AddSingleton<Sweep>();
        var engine = configuration.GetSection(EngineOptions.Section).Get<EngineOptions>() ?? new EngineOptions();
        var works = (configuration.Get<RoleOptions>() ?? new RoleOptions()).Works;
        // In memory nobody else could hear it.
        if (works || !string.IsNullOrEmpty(configuration[$"{StorageOptions.Section}:{nameof(StorageOptions.Postgres)}"]))
            services.AddWaking();
        if (!works)
            return;
        services.AddWoken(engine.Runs);
        services.AddHostedService<HeadInLog>();
    }
}
