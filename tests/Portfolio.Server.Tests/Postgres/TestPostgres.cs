using Npgsql;

namespace Portfolio.Server.Tests.Postgres;

/// <summary>
/// An empty database of its own on the server that <c>PORTFOLIO_POSTGRES</c> names (a connection string of somebody who may make databases);
/// gone with the test.
/// </summary>
internal sealed class TestPostgres : IAsyncDisposable
{
    private static readonly string? Server = Environment.GetEnvironmentVariable("PORTFOLIO_POSTGRES");
    private static int made;

    private readonly string name = $"portfolio_server_test_{Environment.ProcessId}_{Interlocked.Increment(ref made)}";

    private TestPostgres()
    {
    }

    public string ConnectionString => new NpgsqlConnectionStringBuilder(Server) { Database = name }.ConnectionString;

    public static async Task<TestPostgres> MakeAsync()
    {
        Assert.SkipWhen(string.IsNullOrEmpty(Server), "PORTFOLIO_POSTGRES names no PostgreSQL server; tests/run.sh starts one.");
        var made = new TestPostgres();
        await OnServerAsync($"create database {made.name} template template0 encoding 'UTF8'");
        return made;
    }

    /// <summary>Lets nobody in any more and ends all connections, as a server that stops does.</summary>
    public async Task CutAsync()
    {
        await OnServerAsync($"alter database {name} allow_connections false");
        await OnServerAsync($"select pg_terminate_backend(pid, 5000) from pg_stat_activity where datname = '{name}'");
    }

    public Task LetInAsync() => OnServerAsync($"alter database {name} allow_connections true");

    public async Task<long> CountAsync(string sql)
    {
        await using var connection = new NpgsqlConnection($"{ConnectionString};Pooling=false");
        await connection.OpenAsync(TestContext.Current.CancellationToken);
        await using var command = new NpgsqlCommand(sql, connection);
        return (long)(await command.ExecuteScalarAsync(TestContext.Current.CancellationToken))!;
    }

    /// <summary>Begins a transaction with a statement, such as one that locks; it lasts until it is disposed of.</summary>
    public async Task<IAsyncDisposable> HoldAsync(string sql)
    {
        var connection = new NpgsqlConnection($"{ConnectionString};Pooling=false");
        await connection.OpenAsync(TestContext.Current.CancellationToken);
        await using var command = new NpgsqlCommand($"begin; {sql}", connection);
        await command.ExecuteNonQueryAsync(TestContext.Current.CancellationToken);
        return connection;
    }

    public async ValueTask DisposeAsync() => await OnServerAsync($"drop database {name} with (force)");

    private static async Task OnServerAsync(string sql)
    {
        await using var connection = new NpgsqlConnection($"{Server};Pooling=false");
        await connection.OpenAsync(CancellationToken.None);
        await using var command = new NpgsqlCommand(sql, connection);
        await command.ExecuteNonQueryAsync(CancellationToken.None);
    }
}
