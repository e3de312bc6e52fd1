using Hangfire;
using Hangfire.InMemory;
using Hangfire.PostgreSql;
using Microsoft.Extensions.Options;
using Npgsql;
using Portfolio.Server.Hosting;
using Portfolio.Store;

namespace Portfolio.Server.Jobs.Waking;

/// <summary>
/// Where wake-ups wait: in memory beside the embedded database, which one process owns; in a schema of their own of the PostgreSQL
/// database, so that whichever process is free takes them.
/// </summary>
internal static class WakeUpStorage
{
    // Wake-ups that are done say nothing any more.
    private static readonly TimeSpan Kept = TimeSpan.FromHours(1);

    public static JobStorage Open(IServiceProvider services) =>
        services.GetRequiredService<IOptions<StorageOptions>>().Value.Postgres is { } postgres
            ? InPostgres(postgres, services.GetRequiredService<Database>())
            : new InMemoryStorage(new InMemoryStorageOptions { MaxExpirationTime = TimeSpan.FromMinutes(5) });

    private static PostgreSqlStorage InPostgres(string connectionString, Database database)
    {
        PostgreSqlStorage? storage = null;
        // It makes its schema, at which processes that start together would trip over each other.
        database.AloneAsync(
            () =>
            {
                storage = new PostgreSqlStorage(new Connections(connectionString), Options) { JobExpirationTimeout = Kept };
                return Task.CompletedTask;
            },
            CancellationToken.None).GetAwaiter().GetResult();
        return storage!;
    }

    private static PostgreSqlStorageOptions Options => new()
    {
        SchemaName = "hangfire",
        QueuePollInterval = TimeSpan.FromSeconds(1),
        // Whoever works gives a sign all the time: this is how soon one that vanished is noticed, however long the work takes.
        UseSlidingInvisibilityTimeout = true,
        InvisibilityTimeout = TimeSpan.FromSeconds(30),
        // A process that is killed leaves its locks behind; with the default, those who need them stand still for ten minutes.
        DistributedLockTimeout = TimeSpan.FromSeconds(20),
        // Without its storage a process shall not start as if all were well.
        AllowDegradedModeWithoutStorage = false,
    };

    /// <summary>Not traced: it asks every second.</summary>
    private sealed class Connections : IConnectionFactory
    {
        private readonly NpgsqlDataSource source;

        public Connections(string connectionString)
        {
            var builder = new NpgsqlDataSourceBuilder(connectionString);
            builder.ConnectionStringBuilder.ApplicationName ??= "portfolio wake-ups";
            if (!builder.ConnectionStringBuilder.ShouldSerialize("Timeout"))
                builder.ConnectionStringBuilder.Timeout = 5;
            builder.ConfigureTracing(tracing => tracing.ConfigureCommandFilter(_ => false).ConfigureBatchFilter(_ => false));
            source = builder.Build();
        }

        public NpgsqlConnection GetOrCreateConnection() => source.CreateConnection();
    }
}
