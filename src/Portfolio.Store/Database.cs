namespace Portfolio.Store;

/// <summary>
/// Where everything is kept: the embedded database of one process, or PostgreSQL under several. The rest of the store speaks SQL that both
/// understand. One writer works at a time, so that numbers that continue a sequence can be formed by looking at the last one; readers are
/// never blocked. Thread safe; create once, dispose last.
/// </summary>
public abstract class Database : IAsyncDisposable
{
    private volatile bool unwritable;

    private protected Database(TimeProvider clock) => Clock = clock;

    internal TimeProvider Clock { get; }

    /// <summary>Told of each statement of a write, and of <c>commit</c>, before it is run: where tests let storage fail.</summary>
    internal Action<string>? BeforeStatement { get; set; }

    /// <summary>
    /// Whether other processes work on it beside this one: a lease that has not run out may then be held by one that is alive.
    /// </summary>
    public abstract bool IsShared { get; }

    // Changes nothing and has to be written all the same; there and back, as SQLite writes no page for a row that is given the values it has.
    private const string TouchSql = """
        update schema_migration set applied_at = applied_at + 1 where number = 1;
        update schema_migration set applied_at = applied_at - 1 where number = 1
        """;

    /// <summary>Throws when the storage cannot be read or, after a write that the storage refused, still cannot be written.</summary>
    public async Task PingAsync(CancellationToken cancellation)
    {
        await MigrationLevelAsync(cancellation);
        if (unwritable)
            await WriteAsync(open => open.ExecuteAsync(TouchSql), cancellation);
    }

    /// <summary>The number of the last migration applied.</summary>
    public Task<int> MigrationLevelAsync(CancellationToken cancellation) =>
        ReadAsync(open => open.FirstAsync<int>("select max(number) from schema_migration"), cancellation);

    /// <summary>A chore for quiet hours.</summary>
    public abstract Task MaintainAsync(CancellationToken cancellation);

    /// <summary>
    /// Reads within one snapshot: every statement of <paramref name="work"/> sees the same commits. It changes nothing outside: where a
    /// connection had died unnoticed it is called a second time.
    /// </summary>
    internal abstract Task<T> ReadAsync<T>(Func<StoreTransaction, Task<T>> work, CancellationToken cancellation);

    /// <summary>
    /// Writes in one transaction that holds the write lock from its beginning; it is committed when <paramref name="work"/> returns and
    /// rolled back when it throws. Not to be nested: the inner one would wait for the outer one for ever.
    /// </summary>
    /// <exception cref="StoreUnavailableException">The storage cannot be written just now.</exception>
    internal abstract Task<T> WriteAsync<T>(Func<StoreTransaction, Task<T>> work, CancellationToken cancellation);

    /// <summary>Does something of which two processes must not be at the same time, such as preparing a schema. Not to be nested.</summary>
    public abstract Task AloneAsync(Func<Task> work, CancellationToken cancellation);

    /// <summary>Waits for the writer at work, then gives the storage back. A second time does nothing.</summary>
    public abstract ValueTask DisposeAsync();

    /// <summary>Remembers how the last write went.</summary>
    private protected void Written(bool refused) => unwritable = refused;

    /// <param name="now">Microseconds; null: by the clock of this process.</param>
    private protected StoreTransaction Opened(
        System.Data.Common.DbTransaction transaction, bool writes, CancellationToken cancellation, long? now = null) =>
        new(transaction, now ?? Clock.GetUtcNow().ToMicroseconds(), writes ? BeforeStatement : null, cancellation);
}
