using System.Data.Common;
using Microsoft.Extensions.Time.Testing;
using Npgsql;
using Portfolio.Store.Audit;
using Portfolio.Store.Postgres;
using Portfolio.Store.Tests.Testing;

[assembly: AssemblyFixture(typeof(PostgresTemplate))]

namespace Portfolio.Store.Tests.Testing;

/// <summary>
/// A database of its own on the server that <c>PORTFOLIO_POSTGRES</c> names (a connection string of somebody who may make databases),
/// copied from one that was migrated once.
/// </summary>
internal sealed class PostgresPlace : TestPlace
{
    private static readonly string? Server = Environment.GetEnvironmentVariable("PORTFOLIO_POSTGRES");
    private static int made;

    /// <summary>Ends all other connections to the database, as an operator or a broken network does.</summary>
    internal const string CutSql = """
        select count(pg_terminate_backend(pid, 5000)) from pg_stat_activity where datname = current_database() and pid <> pg_backend_pid()
        """;

    private readonly string name = NewName();

    private PostgresPlace()
    {
    }

    public static bool IsServed => !string.IsNullOrEmpty(Server);

    public static async Task<PostgresPlace> MakeAsync(string template = PostgresTemplate.Migrated)
    {
        Assert.SkipUnless(IsServed, "PORTFOLIO_POSTGRES names no PostgreSQL server; tests/run.sh starts one.");
        var place = new PostgresPlace();
        var from = template == PostgresTemplate.Migrated ? PostgresTemplate.Name : template;
        await OnServerAsync($"create database {place.name} template {from}");
        return place;
    }

    public string ConnectionString => ConnectionTo(name);

    public override async Task<Database> OpenAsync(TimeProvider clock) =>
        await PostgresDatabase.OpenAsync(ConnectionString, clock, TestStore.Cancellation);

    public override DbConnection Connect() => new NpgsqlConnection($"{ConnectionString};Pooling=false");

    public override async Task<long> SizeAsync()
    {
        await using var connection = (NpgsqlConnection)Connect();
        await connection.OpenAsync(TestStore.Cancellation);
        await using var command = new NpgsqlCommand("select pg_database_size(current_database())", connection);
        return (long)(await command.ExecuteScalarAsync(TestStore.Cancellation))!;
    }

    // Class 23: integrity constraint violation.
    public override bool IsConstraint(DbException refused) => refused.SqlState?.StartsWith("23", StringComparison.Ordinal) == true;

    public override string TablesSql => """
        select table_name collate "C" from information_schema.tables where table_schema = 'public' order by 1
        """;

    public override string RowsSql(string table) => $"""select cast({table} as text) collate "C" from {table} order by 1""";

    public override string WithoutReferencesSql => "set session_replication_role = replica";

    public override string DropAuditGuardsSql => "drop trigger audit_no_update on audit; drop trigger audit_no_delete on audit";

    public override Task<AuditVerification> CheckAuditAsync() => AuditCheck.OfPostgresAsync(ConnectionString, TestStore.Cancellation);

    public override async ValueTask DisposeAsync() => await OnServerAsync($"drop database {name} with (force)");

    internal static string NewName() => $"portfolio_test_{Environment.ProcessId}_{Interlocked.Increment(ref made)}";

    internal static string ConnectionTo(string database) =>
        new NpgsqlConnectionStringBuilder(Server) { Database = database }.ConnectionString;

    internal static async Task OnServerAsync(string sql)
    {
        await using var connection = new NpgsqlConnection(Server);
        await connection.OpenAsync(CancellationToken.None);
        await using var command = new NpgsqlCommand(sql, connection);
        await command.ExecuteNonQueryAsync(CancellationToken.None);
    }
}

/// <summary>The database that those of tests are copied from: migrating each would take most of their time.</summary>
public sealed class PostgresTemplate : IAsyncLifetime
{
    internal const string Migrated = "";
    internal const string Empty = "template0";

    internal static string Name { get; } = PostgresPlace.NewName();

    public async ValueTask InitializeAsync()
    {
        if (!PostgresPlace.IsServed)
            return;
        await PostgresPlace.OnServerAsync($"create database {Name} template {Empty} encoding 'UTF8'");
        await using var migrated = await PostgresDatabase.OpenAsync(
            PostgresPlace.ConnectionTo(Name), new FakeTimeProvider(TestStore.Start), CancellationToken.None);
    }

    public async ValueTask DisposeAsync()
    {
        if (PostgresPlace.IsServed)
            await PostgresPlace.OnServerAsync($"drop database {Name} with (force)");
    }
}
