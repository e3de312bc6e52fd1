using System.Globalization;
using System.Reflection;
using System.Security.Cryptography;
using System.Text;
using Microsoft.Data.Sqlite;

namespace Portfolio.Store.Sqlite;

/// <summary>One numbered step of the schema. Steps only go forward and, once released, never change: their checksum is kept.</summary>
internal sealed record Migration(int Number, string Name, string Sql)
{
    public string Checksum => Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(Sql)));
}

/// <summary>Brings a database to the newest step, each step in a transaction of its own.</summary>
internal static class SqliteMigrations
{
    private const string Prefix = "Portfolio.Store.Migrations.Sqlite.";

    /// <summary>All steps of this program, by number, without gaps from 1.</summary>
    public static IReadOnlyList<Migration> All { get; } = Load();

    private const string CreateTable = """
        create table if not exists schema_migration (
          number integer primary key, name text not null, checksum text not null, applied_at integer not null) strict;
        """;

    public static void Apply(SqliteConnection connection, IReadOnlyList<Migration> migrations, long now)
    {
        SqliteFolder.Run(connection, CreateTable);
        var applied = ReadApplied(connection);
        if (applied.Count > migrations.Count)
            throw new StoreSchemaException(
                $"The storage is at step {applied.Count}, this program knows {migrations.Count}: a newer version has written it.");
        foreach (var (migration, checksum) in migrations.Zip(applied))
        {
            if (checksum != migration.Checksum)
                throw new StoreSchemaException(
                    $"Step {migration.Number} ({migration.Name}) of the storage is not the one that this program would apply.");
        }
        foreach (var migration in migrations.Skip(applied.Count))
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

    private static Migration[] Load()
    {
        var assembly = Assembly.GetExecutingAssembly();
        var steps = assembly.GetManifestResourceNames().Where(name => name.StartsWith(Prefix, StringComparison.Ordinal));
        return [.. steps.Order(StringComparer.Ordinal).Select(Read)];

        Migration Read(string resource)
        {
            using var reader = new StreamReader(assembly.GetManifestResourceStream(resource)!, Encoding.UTF8);
            var name = resource[Prefix.Length..^".sql".Length];
            return new Migration(int.Parse(name[..4], CultureInfo.InvariantCulture), name, reader.ReadToEnd().ReplaceLineEndings("\n"));
        }
    }
}
