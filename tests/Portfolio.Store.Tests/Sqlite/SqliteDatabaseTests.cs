using Microsoft.Data.Sqlite;
using Microsoft.Extensions.Time.Testing;
using Portfolio.Store.Access;
using Portfolio.Store.Sqlite;
using Portfolio.Store.Tests.Testing;

namespace Portfolio.Store.Tests.Sqlite;

public sealed class SqliteDatabaseTests
{
    [Fact]
    public async Task A_fresh_folder_is_brought_to_the_newest_step()
    {
        await using var store = await TestStore.OpenAsync(StoreKind.Sqlite);
        Assert.Equal(SqliteMigrations.All.Count, await store.Database.MigrationLevelAsync(TestStore.Cancellation));
        Assert.Equal(Enumerable.Range(1, SqliteMigrations.All.Count), SqliteMigrations.All.Select(step => step.Number));
        Assert.Equal("ok", await store.RawAsync<string>("pragma integrity_check"));
    }

    [Fact]
    public async Task An_older_folder_is_brought_forward_step_by_step_and_keeps_what_it_has()
    {
        await using var place = new SqlitePlace();
        var clock = new FakeTimeProvider(TestStore.Start);
        await using (var old = await SqliteDatabase.OpenAsync(
            place.Folder, clock, [.. SqliteMigrations.All.Take(2)], TestStore.Cancellation))
        {
            Assert.Equal(2, await old.MigrationLevelAsync(TestStore.Cancellation));
            await old.WriteAsync(
                open => open.ExecuteAsync("insert into portfolio (id, created_at) values ('works', 1)"), TestStore.Cancellation);
        }
        await using var now = await place.OpenAsync(clock);
        Assert.Equal(SqliteMigrations.All.Count, await now.MigrationLevelAsync(TestStore.Cancellation));
        Assert.Equal(1, await now.ReadAsync(open => open.FirstAsync<long>("select count(*) from portfolio"), TestStore.Cancellation));
    }

    [Fact]
    public async Task A_folder_in_use_is_refused_and_free_again_afterwards()
    {
        await using var store = await TestStore.OpenAsync(StoreKind.Sqlite);
        await Assert.ThrowsAsync<StoreInUseException>(() => store.Place.OpenAsync(store.Clock));
        await store.ReopenAsync();
        await store.Database.PingAsync(TestStore.Cancellation);
    }

    [Theory]
    [InlineData("pragma journal_mode", "wal")]
    [InlineData("pragma synchronous", "2")]
    [InlineData("pragma foreign_keys", "1")]
    [InlineData("pragma trusted_schema", "0")]
    [InlineData("pragma journal_size_limit", "67108864")]
    public async Task The_writer_has_the_settings_that_durability_rests_on(string asked, string expected)
    {
        await using var store = await TestStore.OpenAsync(StoreKind.Sqlite);
        Assert.Equal(expected, await store.Database.WriteAsync(open => open.FirstAsync<string>(asked), TestStore.Cancellation));
    }

    [Theory]
    [InlineData(5)]
    [InlineData(8)]
    [InlineData(10)]
    [InlineData(13)]
    [InlineData(14)]
    public async Task A_disk_that_refuses_a_write_is_told_and_asked_again_until_it_takes_one(int code)
    {
        await using var store = await TestStore.OpenAsync(StoreKind.Sqlite);
        store.Database.BeforeStatement = _ => throw new SqliteException("of the test", code);
        await store.Database.PingAsync(TestStore.Cancellation);
        await Assert.ThrowsAsync<StoreUnavailableException>(() => AppendAsync(store));
        await Assert.ThrowsAsync<StoreUnavailableException>(() => store.Database.PingAsync(TestStore.Cancellation));
        store.Database.BeforeStatement = null;
        await store.Database.PingAsync(TestStore.Cancellation);
        Assert.Equal(0, await store.CountAsync("audit"));
        await AppendAsync(store);
        Assert.Equal(1, await store.CountAsync("audit"));
    }

    [Fact]
    public async Task Maintenance_folds_the_log_into_the_file()
    {
        await using var store = await TestStore.OpenAsync(StoreKind.Sqlite);
        await store.WriteAsync("works", ("", "s"), ("lock", "p"));
        await store.Database.MaintainAsync(TestStore.Cancellation);
        Assert.Equal(0, new FileInfo(Path.Combine(((SqlitePlace)store.Place).Folder, "portfolio.db-wal")).Length);
    }

    [Fact]
    public async Task Nobody_but_the_owner_reads_the_files()
    {
        if (OperatingSystem.IsWindows())
            return;
        const UnixFileMode owner = UnixFileMode.UserRead | UnixFileMode.UserWrite;
        await using var place = new SqlitePlace();
        var folder = Path.Combine(place.Folder, "data");
        string[] names = ["portfolio.db", "portfolio.db-shm", "portfolio.db-wal", "portfolio.lock"];
        for (var time = 0; time < 2; time++)
        {
            await using (var database = await SqliteDatabase.OpenAsync(folder, new FakeTimeProvider(TestStore.Start), TestStore.Cancellation))
            {
                Assert.Equal(names, Directory.GetFiles(folder).Select(file => Path.GetFileName(file)).Order(StringComparer.Ordinal));
                foreach (var name in names)
                    Assert.Equal(owner, File.GetUnixFileMode(Path.Combine(folder, name)));
            }
            // As an older program left it.
            File.SetUnixFileMode(Path.Combine(folder, "portfolio.db"), owner | UnixFileMode.GroupRead | UnixFileMode.OtherRead);
        }
        Assert.Equal(owner | UnixFileMode.UserExecute, File.GetUnixFileMode(folder));
    }

    private static Task AppendAsync(TestStore store) => store.Audit.AppendAsync(Caller.System, "a", "b", new { }, TestStore.Cancellation);
}
