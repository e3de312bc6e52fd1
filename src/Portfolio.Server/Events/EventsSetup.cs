using System.Net;
using Portfolio.Server.Feeds;
using Portfolio.Server.Hosting;
using Portfolio.Server.Jobs;
using Portfolio.Server.Subscriptions;
using Portfolio.Server.Webhooks;

namespace Portfolio.Server.Events;

/// <summary>Events for those who poll and those who are called. Only processes that work hand them on and send them.</summary>
internal static class EventsSetup
{
    public static void AddEvents(this IServiceCollection services, IConfiguration configuration)
    {
        services.AddOptions<EventOptions>().BindConfiguration(EventOptions.Section).ValidateDataAnnotations().ValidateOnStart();
        services.AddOptions<WebhookOptions>().BindConfiguration(WebhookOptions.Section).ValidateDataAnnotations().ValidateOnStart();
        services.AddSingleton<EventEnvelope>();
        services.AddSingleton<CalendarReading>();
        services.AddSingleton<TargetRule>();
        services.AddSingleton<SubscriptionIntake>();
        if ((configuration.Get<RoleOptions>() ?? new RoleOptions()).Works)
            services.AddTelling();
    }

    private static void AddTelling(this IServiceCollection services)
    {
        services.AddSingleton<HostLookup>(Dns.GetHostAddressesAsync);
        services.AddSingleton<GuardedConnections>();
        services.AddSingleton<WebhookSender>();
        services.AddSingleton<LevelWatch>();
        services.AddSingleton<CommitmentWatch>();
        services.AddSingleton<PointWatch>();
        services.AddSingleton<EstimateAges>();
        services.AddSingleton<EventWorker>();
        services.AddSingleton<DeliveryWorker>();
        services.AddHostedService<EventLoop>();
    }
}
