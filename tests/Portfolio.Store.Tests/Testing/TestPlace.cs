using System.Data.Common;
using Portfolio.Store.Audit;

namespace Portfolio.Store.Tests.Testing;

/// <summary>On which database a class of tests runs: each is written once, with one nested class for either.</summary>
public enum StoreKind
{
    Sqlite,
    Postgres,
}

/// <summary>Where a store under test is kept, and what is said differently there. Gone with the test.</summary>
internal abstract class TestPlace : IAsyncDisposable
{
    public static async Task<TestPlace> MakeAsync(StoreKind kind) =>
        kind == StoreKind.Sqlite ? new SqlitePlace() : await PostgresPlace.MakeAsync();

    public abstract Task<Database> OpenAsync(TimeProvider clock);

    /// <summary>Past everything that the store guards.</summary>
    public abstract DbConnection Connect();

    /// <summary>Bytes.</summary>
    public abstract Task<long> SizeAsync();

    /// <summary>Whether a statement was refused because what it wanted may not be.</summary>
    public abstract bool IsConstraint(DbException refused);

    public abstract string TablesSql { get; }

    /// <summary>Rows as text, in an order that hangs on nothing but them.</summary>
    public abstract string RowsSql(string table);

    public abstract string WithoutReferencesSql { get; }

    public abstract string DropAuditGuardsSql { get; }

    /// <summary>From outside, as an auditor does beside a server that is running.</summary>
    public abstract Task<AuditVerification> CheckAuditAsync();

    public abstract ValueTask DisposeAsync();
}
