using Microsoft.Extensions.Options;
using Portfolio.Server.Access;
using Portfolio.Store;
using Portfolio.Store.Access;

namespace Portfolio.Server.Hosting;

/// <summary>Before the server listens: the database is open and migrated, and an administrator can get in.</summary>
internal sealed partial class StorageStart(
    Database database, KeyStore keys, IOptions<StorageOptions> storage, IOptions<SecurityOptions> security, ILogger<StorageStart> log)
    : IHostedService
{
    public async Task StartAsync(CancellationToken cancellation)
    {
        LogOpened(await database.MigrationLevelAsync(cancellation));
        // Of processes that start together one makes the key.
        await database.AloneAsync(() => LetInAsync(cancellation), cancellation);
    }

    private async Task LetInAsync(CancellationToken cancellation)
    {
        if (await keys.HasAdministratorAsync(cancellation))
            return;
        if (security.Value.BootstrapKey is { } given)
        {
            await keys.BootstrapAsync(given, cancellation);
            return;
        }
        // The file comes first: a key that nobody can read would lock everybody out.
        var path = storage.Value.FirstKeyFile;
        var secret = FirstKey.Write(path);
        await keys.BootstrapAsync(secret, cancellation);
        LogFirstKey(path);
    }

    public Task StopAsync(CancellationToken cancellation) => Task.CompletedTask;

    [LoggerMessage(Level = LogLevel.Information, Message = "Storage is open at migration {Level}.")]
    private partial void LogOpened(int level);

    [LoggerMessage(Level = LogLevel.Information, Message = "The first administrator key was written to {Path}.")]
    private partial void LogFirstKey(string path);
}
