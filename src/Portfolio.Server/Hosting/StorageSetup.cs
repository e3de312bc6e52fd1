using Microsoft.Extensions.Options;
using Portfolio.Store;
using Portfolio.Store.Access;
using Portfolio.Store.Audit;
using Portfolio.Store.Deliveries;
using Portfolio.Store.Documents;
using Portfolio.Store.Outbox;
using Portfolio.Store.Postgres;
using Portfolio.Store.Results;
using Portfolio.Store.Runs;
using Portfolio.Store.Samples;
using Portfolio.Store.Schedules;
using Portfolio.Store.Sqlite;
using Portfolio.Store.Subscriptions;

namespace Portfolio.Server.Hosting;

/// <summary>
/// The store and its concerns. The database is opened by whoever asks first, which is <see cref="StorageStart"/>, before anything is
/// served.
/// </summary>
internal static class StorageSetup
{
    public static void AddStorage(this IServiceCollection services)
    {
        services.AddSingleton(Open);
        services.AddSingleton<KeyStore>();
        services.AddSingleton<PersonStore>();
        services.AddSingleton<AuditStore>();
        services.AddSingleton<DocumentStore>();
        services.AddSingleton<PortfolioArchive>();
        services.AddSingleton<RunStore>();
        services.AddSingleton<RunRequests>();
        services.AddSingleton<RunClaims>();
        services.AddSingleton<RunEndings>();
        services.AddSingleton<SampleStore>();
        services.AddSingleton<ResultStore>();
        services.AddSingleton<ScheduleStore>();
        services.AddSingleton<OutboxStore>();
        services.AddSingleton<EventDistribution>();
        services.AddSingleton<SubscriptionStore>();
        services.AddSingleton<DeliveryStore>();
        services.AddSingleton<DeliveryClaims>();
        services.AddSingleton<DeliveryEndings>();
        services.AddHostedService<StorageStart>();
    }

    // At the start nothing else runs on this thread, so waiting here blocks nobody.
    private static Database Open(IServiceProvider services) => OpenAsync(
        services.GetRequiredService<IOptions<StorageOptions>>().Value,
        services.GetRequiredService<TimeProvider>()).GetAwaiter().GetResult();

    private static async Task<Database> OpenAsync(StorageOptions storage, TimeProvider clock) => storage.Postgres is { } server
        ? await PostgresDatabase.OpenAsync(server, clock, CancellationToken.None)
        : await SqliteDatabase.OpenAsync(storage.Directory, clock, CancellationToken.None);
}
