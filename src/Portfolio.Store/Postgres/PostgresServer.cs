using System.Data;
using Npgsql;

namespace Portfolio.Store.Postgres;

/// <summary>The connections to one database of a PostgreSQL server, with their settings.</summary>
internal sealed class PostgresServer : IAsyncDisposable
{
    private const int OldestServed = 15;

    // Of the locks that programs agree on (pg_advisory_lock): any numbers that nobody else uses in the same database.
    private const long MigrationLock = 0x706F7274_6D696772;
    private const long WriterLock = 0x706F7274_77726974;

    // Whoever stops in the middle of a transaction, or is cut off, loses it after this time: others wait for the writer.
    private const string Settings = "-c idle_in_transaction_session_timeout=60s -c tcp_keepalives_idle=20 -c tcp_keepalives_interval=5 "
        + "-c tcp_keepalives_count=4";

    private readonly NpgsqlDataSource readers;
    private readonly NpgsqlDataSource writers;

    /// <exception cref="ArgumentException">Not a connection string.</exception>
    public PostgresServer(string connectionString)
    {
        readers = Source(connectionString, "-c default_transaction_read_only=on", 20, reads: true);
        // One writes at a time; the second migrates.
        writers = Source(connectionString, "-c default_transaction_read_only=off", 2, reads: false);
    }

    public ValueTask<NpgsqlConnection> OpenReaderAsync(CancellationToken cancellation) => readers.OpenConnectionAsync(cancellation);

    /// <summary>
    /// Waits for the writer at work, whichever process it is in; the lock goes with the transaction, however that ends. The caller disposes
    /// of it and of its connection. With it comes the server's time at the beginning of the turn, microseconds.
    /// </summary>
    public async Task<(NpgsqlTransaction Transaction, long Now)> TakeTurnAsync(CancellationToken cancellation)
    {
        for (var again = true; ; again = false)
        {
            var connection = await writers.OpenConnectionAsync(cancellation);
            try
            {
                var transaction = await connection.BeginTransactionAsync(IsolationLevel.ReadCommitted, cancellation);
                return (transaction, await WaitAsync(connection, cancellation));
            }
            catch (Exception failure)
            {
                await connection.DisposeAsync();
                if (!again || !PostgresFailures.IsBroken(failure))
                    throw;
            }
        }
    }

    // One round trip; the time is that after the wait.
    private static readonly string TurnSql =
        $"select pg_advisory_xact_lock({WriterLock}); select cast(extract(epoch from clock_timestamp()) * 1000000 as bigint)";

    private static async Task<long> WaitAsync(NpgsqlConnection connection, CancellationToken cancellation)
    {
        await using var command = new NpgsqlCommand(TurnSql, connection);
        await using var reader = await command.ExecuteReaderAsync(cancellation);
        await reader.NextResultAsync(cancellation);
        await reader.ReadAsync(cancellation);
        return reader.GetInt64(0);
    }

    /// <summary>Works on a connection while no other process migrates the same database.</summary>
    public async Task AloneAsync(Func<NpgsqlConnection, Task> work, CancellationToken cancellation)
    {
        await using var connection = await writers.OpenConnectionAsync(cancellation);
        await using (var waiting = new NpgsqlCommand($"select pg_advisory_lock({MigrationLock})", connection) { CommandTimeout = 300 })
            await waiting.ExecuteNonQueryAsync(cancellation);
        try
        {
            await work(connection);
        }
        finally
        {
            // The lock of a connection that broke is gone already.
            if (connection.FullState == ConnectionState.Open)
                await RunAsync(connection, $"select pg_advisory_unlock({MigrationLock})", CancellationToken.None);
        }
    }

    /// <exception cref="StoreSchemaException">Too old, or its text is not Unicode.</exception>
    public static async Task CheckAsync(NpgsqlConnection connection, CancellationToken cancellation)
    {
        if (connection.PostgreSqlVersion.Major < OldestServed)
            throw new StoreSchemaException($"PostgreSQL {connection.PostgreSqlVersion} is too old; {OldestServed} or newer is needed.");
        await using var command = new NpgsqlCommand("show server_encoding", connection);
        if (await command.ExecuteScalarAsync(cancellation) is not "UTF8" and var encoding)
            throw new StoreSchemaException($"The PostgreSQL database keeps its text as {encoding}; it must be made with encoding UTF8.");
    }

    internal static async Task RunAsync(NpgsqlConnection connection, string sql, CancellationToken cancellation)
    {
        await using var command = new NpgsqlCommand(sql, connection);
        await command.ExecuteNonQueryAsync(cancellation);
    }

    public async ValueTask DisposeAsync()
    {
        await readers.DisposeAsync();
        await writers.DisposeAsync();
    }

    private static NpgsqlDataSource Source(string connectionString, string more, int connections, bool reads)
    {
        var builder = new NpgsqlConnectionStringBuilder(connectionString);
        builder.ApplicationName ??= "portfolio";
        builder.Options = $"{builder.Options} {Settings} {more}".Trim();
        if (!builder.ShouldSerialize("Timeout"))
            builder.Timeout = 5;
        // Reading leaves nothing behind that the next one on the connection could meet.
        builder.NoResetOnClose = reads;
        // The conditions on grants take longer to plan than to run.
        if (!builder.ShouldSerialize("Max Auto Prepare"))
            (builder.MaxAutoPrepare, builder.AutoPrepareMinUsages) = (100, 2);
        builder.MaxPoolSize = builder.ShouldSerialize("Maximum Pool Size") ? Math.Max(builder.MaxPoolSize, 2) : connections;
        return NpgsqlDataSource.Create(builder);
    }
}
