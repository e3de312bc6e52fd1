using Npgsql;
using Portfolio.Store.Migrations;

namespace Portfolio.Store.Postgres;

/// <summary>Brings a database to the newest step, each step in a transaction of its own.</summary>
internal static class PostgresMigrations
{
    public static IReadOnlyList<Migration> All { get; } = Migration.Load("Postgres");

    private const string CreateTable = """
        create table if not exists schema_migration (
          number bigint primary key, name text not null, checksum text not null, applied_at bigint not null);
        """;

    /// <param name="connection">Nobody else migrates meanwhile.</param>
    public static async Task ApplyAsync(
        NpgsqlConnection connection, IReadOnlyList<Migration> migrations, long now, CancellationToken cancellation)
    {
        await PostgresServer.RunAsync(connection, CreateTable, cancellation);
        foreach (var migration in Migration.Missing(migrations, await ReadAppliedAsync(connection, cancellation)))
            await ApplyOneAsync(connection, migration, now, cancellation);
    }

    private static async Task ApplyOneAsync(NpgsqlConnection connection, Migration migration, long now, CancellationToken cancellation)
    {
        await using var transaction = await connection.BeginTransactionAsync(cancellation);
        await PostgresServer.RunAsync(connection, migration.Sql, cancellation);
        await using var command = new NpgsqlCommand(
            "insert into schema_migration (number, name, checksum, applied_at) values ($1, $2, $3, $4)", connection);
        command.Parameters.Add(new NpgsqlParameter<long> { TypedValue = migration.Number });
        command.Parameters.Add(new NpgsqlParameter<string> { TypedValue = migration.Name });
        command.Parameters.Add(new NpgsqlParameter<string> { TypedValue = migration.Checksum });
        command.Parameters.Add(new NpgsqlParameter<long> { TypedValue = now });
        await command.ExecuteNonQueryAsync(cancellation);
        await transaction.CommitAsync(cancellation);
    }

    private static async Task<List<string>> ReadAppliedAsync(NpgsqlConnection connection, CancellationToken cancellation)
    {
        await using var command = new NpgsqlCommand("select checksum from schema_migration order by number", connection);
        await using var reader = await command.ExecuteReaderAsync(cancellation);
        var checksums = new List<string>();
        while (await reader.ReadAsync(cancellation))
            checksums.Add(reader.GetString(0));
        return checksums;
    }
}
