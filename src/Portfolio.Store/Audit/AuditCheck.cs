using Dapper;
using Microsoft.Data.Sqlite;
using Npgsql;
using Portfolio.Store.Sqlite;

namespace Portfolio.Store.Audit;

/// <summary>Checks the audit trail from outside: beside a server that is running, without its folder lock, changing nothing.</summary>
public static class AuditCheck
{
    /// <exception cref="IOException">There is no database here, or it cannot be read.</exception>
    public static async Task<AuditVerification> OfFolderAsync(string directory, CancellationToken cancellation)
    {
        var file = SqliteFolder.FileIn(directory);
        if (!File.Exists(file))
            throw new FileNotFoundException($"There is no database in '{directory}'.", file);
        try
        {
            await using var connection = new SqliteConnection(
                new SqliteConnectionStringBuilder { DataSource = file, Mode = SqliteOpenMode.ReadOnly, Pooling = false }.ToString());
            await connection.OpenAsync(cancellation);
            StoreTransaction.MatchColumns();
            return await AuditChain.VerifyAsync(connection.QueryUnbufferedAsync<AuditRow>(AuditChain.AllSql), cancellation);
        }
        catch (SqliteException unreadable)
        {
            throw new StoreDamagedException($"'{file}' cannot be read: {unreadable.Message}");
        }
    }

    /// <exception cref="IOException">It cannot be reached or read.</exception>
    public static async Task<AuditVerification> OfPostgresAsync(string connectionString, CancellationToken cancellation)
    {
        try
        {
            await using var connection = new NpgsqlConnection(connectionString);
            await connection.OpenAsync(cancellation);
            StoreTransaction.MatchColumns();
            return await AuditChain.VerifyAsync(connection.QueryUnbufferedAsync<AuditRow>(AuditChain.AllSql), cancellation);
        }
        catch (Exception unreadable) when (unreadable is NpgsqlException or ArgumentException)
        {
            throw new StoreDamagedException($"The database cannot be read: {unreadable.Message}");
        }
    }
}
