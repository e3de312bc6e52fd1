using Microsoft.Data.Sqlite;
using Portfolio.Store.Migrations;

namespace Portfolio.Store.Sqlite;

/// <summary>Brings a database to the newest step, each step in a transaction of its own.</summary>
internal static class SqliteMigrations
{
    public static IReadOnlyList<Migration> All { get; } = Migration.Load("Sqlite");

    private const string CreateTable = """
        create table if not exists schema_migration (
          number integer primary key, name text not null, checksum text not null, applied_at integer not null) strict;
        """;

    public static void Apply(SqliteConnection connection, IReadOnlyList<Migration> migrations, long now)
    {
        SqliteFolder.Run(connection, CreateTable);
        foreach (var migration in Migration.Missing(migrations, ReadApplied(connection)))
            ApplyOne(connection, migration, now);
    }

    private static void ApplyOne(SqliteConnection connection, Migration migration, long now)
    {
        using var transaction = connection.BeginTransaction();
        using var command = connection.CreateCommand();
        command.Transaction = transaction;
        command.CommandText = migration.Sql;
        command.ExecuteNonQuery();
        command.CommandText = "insert into schema_migration (number, name, checksum, applied_at) values (@number, @name, @checksum, @now);";
        command.Parameters.AddWithValue("@number", migration.Number);
        command.Parameters.AddWithValue("@name", migration.Name);
        command.Parameters.AddWithValue("@checksum", migration.Checksum);
        command.Parameters.AddWithValue("@now", now);
        command.ExecuteNonQuery();
        transaction.Commit();
    }

    private static List<string> ReadApplied(SqliteConnection connection)
    {
        using var command = connection.CreateCommand();
        command.CommandText = "select checksum from schema_migration order by number;";
        using var reader = command.ExecuteReader();
        var checksums = new List<string>();
        while (reader.Read())
            checksums.Add(reader.GetString(0));
        return checksums;
    }
}
