using System.Collections.Concurrent;
using Microsoft.Data.Sqlite;
using Portfolio.Store.Migrations;

namespace Portfolio.Store.Sqlite;

/// <summary>The embedded database in one folder, which one process owns.</summary>
public sealed class SqliteDatabase : Database
{
    private const int IdleReaders = 8;

    private readonly SqliteFolder folder;
    private readonly SemaphoreSlim writing = new(1, 1);
    private readonly ConcurrentBag<SqliteConnection> idle = [];
    private SqliteConnection? writer;
    private int disposed;

    private SqliteDatabase(SqliteFolder folder, TimeProvider clock) : base(clock) => this.folder = folder;

    public override bool IsShared => false;

    /// <summary>
    /// Opens <c>portfolio.db</c> in the folder (made when missing), taking the folder for this process, and brings it to the newest
    /// migration.
    /// </summary>
    /// <exception cref="StoreInUseException">Another process has the folder.</exception>
    /// <exception cref="StoreSchemaException">The stored steps are not this program's: a newer one wrote here, or one changed.</exception>
    public static Task<SqliteDatabase> OpenAsync(string directory, TimeProvider clock, CancellationToken cancellation) =>
        OpenAsync(directory, clock, SqliteMigrations.All, cancellation);

    internal static async Task<SqliteDatabase> OpenAsync(
        string directory, TimeProvider clock, IReadOnlyList<Migration> migrations, CancellationToken cancellation)
    {
        cancellation.ThrowIfCancellationRequested();
        var database = new SqliteDatabase(SqliteFolder.Take(directory), clock);
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

    /// <summary>Folds the write-ahead log into the file and refreshes the planner's statistics.</summary>
    public override async Task MaintainAsync(CancellationToken cancellation)
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

    internal override async Task<T> ReadAsync<T>(Func<StoreTransaction, Task<T>> work, CancellationToken cancellation)
    {
        cancellation.ThrowIfCancellationRequested();
        if (!idle.TryTake(out var connection))
            connection = folder.OpenReader();
        try
        {
            T result;
            using (var transaction = connection.BeginTransaction(deferred: true))
                result = await work(Opened(transaction, writes: false, cancellation));
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

    internal override async Task<T> WriteAsync<T>(Func<StoreTransaction, Task<T>> work, CancellationToken cancellation)
    {
        await writing.WaitAsync(cancellation);
        try
        {
            writer ??= folder.OpenWriter();
            using var transaction = writer.BeginTransaction();
            var result = await work(Opened(transaction, writes: true, cancellation));
            BeforeStatement?.Invoke("commit");
            transaction.Commit();
            Written(refused: false);
            return result;
        }
        catch (Exception failure)
        {
            // A connection that has failed is not used again: whatever state it is in ends with it.
            writer?.Dispose();
            writer = null;
            if (!SqliteFolder.IsUnavailable(failure))
                throw;
            Written(refused: true);
            throw new StoreUnavailableException(failure);
        }
        finally
        {
            writing.Release();
        }
    }

    /// <summary>One process has the folder.</summary>
    public override Task AloneAsync(Func<Task> work, CancellationToken cancellation) => work();

    public override async ValueTask DisposeAsync()
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
}
