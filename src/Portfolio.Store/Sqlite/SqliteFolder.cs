using Microsoft.Data.Sqlite;

namespace Portfolio.Store.Sqlite;

/// <summary>The folder of the embedded database, held for this process, and its connections with their settings.</summary>
internal sealed class SqliteFolder : IDisposable
{
    // Before 3.51.3 a data race on resetting the write-ahead log could lose commits (sqlite.org/wal.html, "WAL-reset bug").
    private static readonly Version OldestSafe = new(3, 51, 3);

    private readonly FileStream hold;
    private readonly string connectionString;

    private SqliteFolder(string directory, FileStream hold)
    {
        this.hold = hold;
        connectionString = new SqliteConnectionStringBuilder
        {
            DataSource = FileIn(directory),
            ForeignKeys = true,
            Pooling = false,
            DefaultTimeout = 30,
        }.ToString();
    }

    private const string FileName = "portfolio.db";

    public static string FileIn(string directory) => Path.Combine(directory, FileName);

    // What the systems say of a file that another process has locked: EWOULDBLOCK, ERROR_SHARING_VIOLATION.
    private const int WouldBlock = 11;
    private const int WouldBlockOnMac = 35;
    private const int SharingViolation = unchecked((int)0x80070020);

    public static SqliteFolder Take(string directory)
    {
        OwnerOnly.MakeDirectory(directory);
        var hold = Hold(directory);
        try
        {
            OwnerOnly.MakeFile(FileIn(directory));
            OwnerOnly.Keep(Directory.GetFiles(directory, "portfolio.*"));
            var folder = new SqliteFolder(directory, hold);
            folder.CheckVersion();
            return folder;
        }
        catch (SqliteException unusable)
        {
            hold.Dispose();
            throw new StoreDamagedException($"'{FileIn(directory)}' cannot be used: {unusable.Message}");
        }
        catch
        {
            hold.Dispose();
            throw;
        }
    }

    /// <summary>
    /// FULL: a commit that was answered survives the loss of power. Untrusted schema: functions hidden in a foreign file are not run.
    /// </summary>
    public SqliteConnection OpenWriter() => Open("""
        pragma journal_mode = wal;
        pragma synchronous = full;
        pragma trusted_schema = off;
        pragma journal_size_limit = 67108864;
        pragma cache_size = -16384;
        """);

    public SqliteConnection OpenReader() => Open("pragma trusted_schema = off; pragma query_only = on;");

    public void Dispose() => hold.Dispose();

    private SqliteConnection Open(string settings)
    {
        var connection = new SqliteConnection(connectionString);
        try
        {
            connection.Open();
            Run(connection, settings);
            return connection;
        }
        catch
        {
            connection.Dispose();
            throw;
        }
    }

    /// <summary>
    /// Whether the failure lies with the disk or with who else uses it, not with the statement (sqlite.org/rescode.html).
    /// </summary>
    public static bool IsUnavailable(Exception failure) => failure is SqliteException { SqliteErrorCode: var code } && code is
        5 /* busy */ or 8 /* read-only */ or 10 /* input or output */ or 13 /* full */ or 14 /* cannot open */;

    private void CheckVersion()
    {
        using var connection = OpenWriter();
        var version = Version.Parse((string)Run(connection, "select sqlite_version();")!);
        if (version < OldestSafe)
            throw new StoreSchemaException($"SQLite {version} can lose commits; {OldestSafe} or newer is needed.");
    }

    internal static object? Run(SqliteConnection connection, string sql)
    {
        using var command = connection.CreateCommand();
        command.CommandText = sql;
        return command.ExecuteScalar();
    }

    /// <summary>The lock goes with the process, however it ends; the file itself stays and means nothing.</summary>
    private static FileStream Hold(string directory)
    {
        try
        {
            return new FileStream(Path.Combine(directory, "portfolio.lock"), FileMode.OpenOrCreate, FileAccess.ReadWrite, FileShare.None);
        }
        catch (IOException taken) when (taken.HResult is WouldBlock or WouldBlockOnMac or SharingViolation)
        {
            throw new StoreInUseException(directory, taken);
        }
    }
}
