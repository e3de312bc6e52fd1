using System.Data;
using Npgsql;
using Portfolio.Store.Migrations;

namespace Portfolio.Store.Postgres;

/// <summary>
/// A PostgreSQL database, which several processes may share. Their writers take turns: each write begins by taking a lock that ends with
/// its transaction. READ COMMITTED then shows every statement after it all that earlier writers have committed, since PostgreSQL makes a
/// commit visible before it releases the locks (docs/decisions/0004-one-writer-on-postgresql.md). All write by the server's clock, so that
/// leases hold whatever theirs say.
/// </summary>
public sealed class PostgresDatabase : Database
{
    private readonly PostgresServer server;
    // Those of this process queue here, not each on a connection of its own.
    private readonly SemaphoreSlim writing = new(1, 1);
    private readonly bool byServersClock;
    private int disposed;

    private PostgresDatabase(PostgresServer server, TimeProvider clock) : base(clock)
    {
        this.server = server;
#pragma warning disable RS0030 // It is not read: where another was given, a test has set it.
        byServersClock = clock == TimeProvider.System;
#pragma warning restore RS0030
    }

    public override bool IsShared => true;

    /// <summary>Whether the text can be read as a connection string; says nothing about what is there.</summary>
    public static bool IsConnectionString(string text)
    {
        try
        {
            return new NpgsqlConnectionStringBuilder(text).Host is not null;
        }
        catch (Exception unreadable) when (unreadable is ArgumentException or FormatException or InvalidCastException)
        {
            return false;
        }
    }

    /// <summary>Connects to a database, which must exist, and brings it to the newest migration.</summary>
    /// <exception cref="StoreUnavailableException">The server cannot be reached or does not let us in.</exception>
    /// <exception cref="StoreSchemaException">The stored steps are not this program's, or the server cannot take them.</exception>
    public static Task<PostgresDatabase> OpenAsync(string connectionString, TimeProvider clock, CancellationToken cancellation) =>
        OpenAsync(connectionString, clock, PostgresMigrations.All, cancellation);

    internal static async Task<PostgresDatabase> OpenAsync(
        string connectionString, TimeProvider clock, IReadOnlyList<Migration> migrations, CancellationToken cancellation)
    {
        var database = new PostgresDatabase(new PostgresServer(connectionString), clock);
        try
        {
            await database.server.AloneAsync(
                async connection =>
                {
                    await PostgresServer.CheckAsync(connection, cancellation);
                    await PostgresMigrations.ApplyAsync(connection, migrations, clock.GetUtcNow().ToMicroseconds(), cancellation);
                },
                cancellation);
            return database;
        }
        catch (Exception failure)
        {
            await database.DisposeAsync();
            if (PostgresFailures.IsUnavailable(failure))
                throw new StoreUnavailableException(failure);
            if (failure is PostgresException refused)
                throw new StoreSchemaException($"The storage cannot be prepared: {refused.MessageText}");
            throw;
        }
    }

    public override async Task AloneAsync(Func<Task> work, CancellationToken cancellation)
    {
        try
        {
            await server.AloneAsync(_ => work(), cancellation);
        }
        catch (Exception failure) when (PostgresFailures.IsUnavailable(failure))
        {
            throw new StoreUnavailableException(failure);
        }
    }

    /// <summary>Nothing: the server cleans up by itself (autovacuum).</summary>
    public override Task MaintainAsync(CancellationToken cancellation) => Task.CompletedTask;

    internal override async Task<T> ReadAsync<T>(Func<StoreTransaction, Task<T>> work, CancellationToken cancellation)
    {
        for (var again = true; ; again = false)
        {
            try
            {
                return await ReadOnceAsync(work, cancellation);
            }
            catch (Exception failure) when (PostgresFailures.IsUnavailable(failure))
            {
                if (!again || !PostgresFailures.IsBroken(failure))
                    throw new StoreUnavailableException(failure);
            }
        }
    }

    private async Task<T> ReadOnceAsync<T>(Func<StoreTransaction, Task<T>> work, CancellationToken cancellation)
    {
        await using var connection = await server.OpenReaderAsync(cancellation);
        // Read-only by the connection's settings: asking for it here would be one more round trip.
        await using var transaction = await connection.BeginTransactionAsync(IsolationLevel.RepeatableRead, cancellation);
        return await work(Opened(transaction, writes: false, cancellation));
    }

    internal override async Task<T> WriteAsync<T>(Func<StoreTransaction, Task<T>> work, CancellationToken cancellation)
    {
        await writing.WaitAsync(cancellation);
        var committing = false;
        try
        {
            var (transaction, now) = await server.TakeTurnAsync(cancellation);
            await using var _ = transaction;
            await using var connection = transaction.Connection;
            var result = await work(Opened(transaction, writes: true, cancellation, byServersClock ? now : null));
            BeforeStatement?.Invoke("commit");
            committing = true;
            // Not to be called off half way: nobody would know how it ended.
            await transaction.CommitAsync(CancellationToken.None);
            Written(refused: false);
            return result;
        }
        catch (Exception failure) when (PostgresFailures.IsUnavailable(failure))
        {
            Written(refused: true);
            throw new StoreUnavailableException(failure) { IsInDoubt = committing };
        }
        finally
        {
            writing.Release();
        }
    }

    public override async ValueTask DisposeAsync()
    {
        if (Interlocked.Exchange(ref disposed, 1) == 1)
            return;
        await writing.WaitAsync();
        await server.DisposeAsync();
        writing.Dispose();
    }
}
