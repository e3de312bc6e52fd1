using System.Collections.Concurrent;
using Microsoft.Data.Sqlite;
using Portfolio.Store.Sqlite;

namespace Portfolio.Store;

/// <summary>
/// The embedded database in one folder. One process owns the folder; inside it one writer works at a time and readers are never blocked.
/// Thread safe; create once, dispose last.
/// </summary>
public sealed class Database : IAsyncDisposable
{
    private const int IdleReaders = 8;

    private readonly SqliteFolder folder;
    private readonly SemaphoreSlim writing = new(1, 1);
    private readonly ConcurrentBag<SqliteConnection> idle = [];
    private SqliteConnection? writer;
    private volatile bool unwritable;
    private int disposed;

    private Database(SqliteFolder folder, TimeProvider clock) => (this.folder, Clock) = (folder, clock);

    internal TimeProvider Clock { get; }

    /// <summary>Told of each statement of a write, and of <c>commit</c>, before it is run: where tests let storage fail.</summary>
    internal Action<string>? BeforeStatement { get; set; }

    /// <summary>
    /// Opens <c>portfolio.db</c> in the folder (made when missing), taking the folder for this process, and brings it to the newest
    /// migration.
    /// </summary>
    /// <exception cref="StoreInUseException">Another process has the folder.</exception>
    /// <exception cref="StoreSchemaException">The stored steps are not this program's: a newer one wrote here, or one changed.</exception>
    public static Task<Database> OpenAsync(string directory, TimeProvider clock, CancellationToken cancellation) =>
        OpenAsync(directory, clock, SqliteMigrations.All, cancellation);

    internal static async Task<Database> OpenAsync(
        string directory, TimeProvider clock, IReadOnlyList<Migration> migrations, CancellationToken cancellation)
    {
        cancellation.ThrowIfCancellationRequested();
        var database = new Database(SqliteFolder.Take(directory), clock);
        try
        {
            database.writer = database.folder.OpenWriter();
            SqliteMigrations.Apply(database.writer, migrations, clock.GetUtcNow().ToMicroseconds());
            return database;
        }
        catch
        {
            await database.DisposeAsync();
            throw;
        }
    }

    /// <summary>Throws when the storage cannot be read or, after a write that the storage refused, still cannot be written.</summary>
    public async Task PingAsync(CancellationToken cancellation)
    {
        await MigrationLevelAsync(cancellation);
        // Not used otherwise; setting it writes a page whatever it was.
        if (unwritable)
            await WriteAsync(open => open.ExecuteAsync("pragma user_version = 0"), cancellation);
    }

    /// <summary>The number of the last migration applied.</summary>
    public Task<int> MigrationLevelAsync(CancellationToken cancellation) =>
        ReadAsync(open => open.FirstAsync<int>("select max(number) from schema_migration"), cancellation);

    /// <summary>A chore for quiet hours: folds the write-ahead log into the file and refreshes the planner's statistics.</summary>
    public async Task MaintainAsync(CancellationToken cancellation)
    {
        await writing.WaitAsync(cancellation);
        try
        {
            SqliteFolder.Run(writer ??= folder.OpenWriter(), "pragma optimize; pragma wal_checkpoint(truncate);");
        }
        finally
        {
            writing.Release();
        }
    }

    /// <summary>Reads within one snapshot: every statement of <paramref name="work"/> sees the same commits.</summary>
    internal async Task<T> ReadAsync<T>(Func<StoreTransaction, Task<T>> work, CancellationToken cancellation)
    {
        cancellation.ThrowIfCancellationRequested();
        if (!idle.TryTake(out var connection))
            connection = folder.OpenReader();
        try
        {
            T result;
            using (var transaction = connection.BeginTransaction(deferred: true))
                result = await work(new StoreTransaction(transaction, Now(), null, cancellation));
            if (idle.Count < IdleReaders)
                idle.Add(connection);
            else
                connection.Dispose();
            return result;
        }
        catch
        {
            connection.Dispose();
            throw;
        }
    }

    /// <summary>
    /// Writes in one transaction that holds the write lock from its beginning; it is committed when <paramref name="work"/> returns and
    /// rolled back when it throws. Not to be nested: the inner one would wait for the outer one for ever.
    /// </summary>
    internal async Task<T> WriteAsync<T>(Func<StoreTransaction, Task<T>> work, CancellationToken cancellation)
    {
        await writing.WaitAsync(cancellation);
        try
        {
            writer ??= folder.OpenWriter();
            using var transaction = writer.BeginTransaction();
            var result = await work(new StoreTransaction(transaction, Now(), BeforeStatement, cancellation));
            BeforeStatement?.Invoke("commit");
            transaction.Commit();
            unwritable = false;
            return result;
        }
        catch (Exception failure)
        {
            // A connection that has failed is not used again: whatever state it is in ends with it.
            writer?.Dispose();
            writer = null;
            if (!SqliteFolder.IsUnavailable(failure))
                throw;
            unwritable = true;
            throw new StoreUnavailableException(failure);
        }
        finally
        {
            writing.Release();
        }
    }

    /// <summary>Waits for the writer at work, then gives the folder back. A second time does nothing.</summary>
    public async ValueTask DisposeAsync()
    {
        if (Interlocked.Exchange(ref disposed, 1) == 1)
            return;
        await writing.WaitAsync();
        foreach (var connection in idle)
            connection.Dispose();
        writer?.Dispose();
        folder.Dispose();
        writing.Dispose();
    }

    private long Now() => Clock.GetUtcNow().ToMicroseconds();
}
