namespace Portfolio.Store;

/// <summary>
/// The embedded database in one folder. One process owns the folder; inside it one writer works at a time and readers are never blocked.
/// Thread safe; create once, dispose last.
/// </summary>
public sealed class Database : IAsyncDisposable
{
    private Database(TimeProvider clock) => Clock = clock;

    internal TimeProvider Clock { get; }

    /// <summary>Opens <c>portfolio.db</c> in the folder (made when missing), taking the folder for this process, and brings it to the newest migration.</summary>
    /// <exception cref="StoreInUseException">Another process has the folder.</exception>
    /// <exception cref="StoreSchemaException">The stored migrations are not this program's: a newer one wrote here, or one was changed.</exception>
    public static Task<Database> OpenAsync(string directory, TimeProvider clock, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>Reads one row: throws when the storage cannot be read.</summary>
    public Task PingAsync(CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>The number of the last migration applied.</summary>
    public Task<int> MigrationLevelAsync(CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>A chore for quiet hours: folds the write-ahead log into the file and refreshes the planner's statistics.</summary>
    public Task MaintainAsync(CancellationToken cancellation) => throw new NotSupportedException();

    public ValueTask DisposeAsync() => ValueTask.CompletedTask;
}
