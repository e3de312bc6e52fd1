using System.Data.Common;
using Microsoft.Data.Sqlite;
using Portfolio.Store.Audit;
using Portfolio.Store.Sqlite;

namespace Portfolio.Store.Tests.Testing;

/// <summary>A folder of its own.</summary>
internal sealed class SqlitePlace(string? folder = null) : TestPlace
{
    public string Folder { get; } = folder ?? Directory.CreateTempSubdirectory("portfolio-store-").FullName;

    private string File => Path.Combine(Folder, "portfolio.db");

    public override async Task<Database> OpenAsync(TimeProvider clock) =>
        await SqliteDatabase.OpenAsync(Folder, clock, TestStore.Cancellation);

    public override DbConnection Connect() => new SqliteConnection($"Data Source={File};Foreign Keys=True;Pooling=False");

    public override Task<long> SizeAsync() => Task.FromResult(new FileInfo(File).Length);

    public override bool IsConstraint(DbException refused) => refused is SqliteException { SqliteErrorCode: 19 };

    public override string TablesSql =>
        "select name from sqlite_schema where type = 'table' and name not like 'sqlite_stat%' order by name";

    public override string RowsSql(string table) => $"select * from {table}";

    public override string WithoutReferencesSql => "pragma foreign_keys = off";

    public override string DropAuditGuardsSql => "drop trigger audit_no_update; drop trigger audit_no_delete";

    public override Task<AuditVerification> CheckAuditAsync() => AuditCheck.OfFolderAsync(Folder, TestStore.Cancellation);

    public override ValueTask DisposeAsync()
    {
        Directory.Delete(Folder, recursive: true);
        return ValueTask.CompletedTask;
    }
}
