using Portfolio.Store.Sqlite;
using Portfolio.Store.Tests.Testing;

namespace Portfolio.Store.Tests;

public sealed class DatabaseTests
{
    [Fact]
    public async Task A_fresh_folder_is_brought_to_the_newest_step_and_opening_again_changes_nothing()
    {
        await using var store = await TestStore.OpenAsync();
        Assert.Equal(SqliteMigrations.All.Count, await store.Database.MigrationLevelAsync(TestStore.Cancellation));
        Assert.Equal(Enumerable.Range(1, SqliteMigrations.All.Count), SqliteMigrations.All.Select(step => step.Number));
        var before = await store.RawAsync<string>("select group_concat(checksum || applied_at) from schema_migration");

        store.Clock.Advance(TimeSpan.FromDays(1));
        await store.ReopenAsync();

        Assert.Equal(before, await store.RawAsync<string>("select group_concat(checksum || applied_at) from schema_migration"));
        Assert.Equal("ok", await store.RawAsync<string>("pragma integrity_check"));
    }

    [Fact]
    public async Task An_older_folder_is_brought_forward_step_by_step_and_keeps_what_it_has()
    {
        var folder = Directory.CreateTempSubdirectory("portfolio-store-").FullName;
        var clock = new Microsoft.Extensions.Time.Testing.FakeTimeProvider(TestStore.Start);
        try
        {
            await using (var old = await Database.OpenAsync(folder, clock, [.. SqliteMigrations.All.Take(2)], TestStore.Cancellation))
            {
                Assert.Equal(2, await old.MigrationLevelAsync(TestStore.Cancellation));
                await old.WriteAsync(
                    open => open.ExecuteAsync("insert into portfolio (id, created_at) values ('works', 1)"), TestStore.Cancellation);
            }
            await using var now = await Database.OpenAsync(folder, clock, TestStore.Cancellation);
            Assert.Equal(SqliteMigrations.All.Count, await now.MigrationLevelAsync(TestStore.Cancellation));
            Assert.Equal(1, await now.ReadAsync(open => open.FirstAsync<long>("select count(*) from portfolio"), TestStore.Cancellation));
        }
        finally
        {
            Directory.Delete(folder, recursive: true);
        }
    }

    [Fact]
    public async Task A_folder_in_use_is_refused_and_free_again_afterwards()
    {
        await using var store = await TestStore.OpenAsync();
        await Assert.ThrowsAsync<StoreInUseException>(() => Database.OpenAsync(store.Folder, store.Clock, TestStore.Cancellation));
        await store.ReopenAsync();
        await store.Database.PingAsync(TestStore.Cancellation);
    }

    [Theory]
    [InlineData("update schema_migration set checksum = 'x' where number = 2", "Step 2")]
    [InlineData("insert into schema_migration values (99, 'later', 'x', 0)", "newer version")]
    public async Task A_schema_that_is_not_this_programs_is_refused(string tampering, string told)
    {
        await using var store = await TestStore.OpenAsync();
        await store.RawAsync<long>(tampering);
        await store.Database.DisposeAsync();
        var refused = await Assert.ThrowsAsync<StoreSchemaException>(
            () => Database.OpenAsync(store.Folder, store.Clock, TestStore.Cancellation));
        Assert.Contains(told, refused.Message, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("pragma journal_mode", "wal")]
    [InlineData("pragma synchronous", "2")]
    [InlineData("pragma foreign_keys", "1")]
    [InlineData("pragma trusted_schema", "0")]
    [InlineData("pragma journal_size_limit", "67108864")]
    public async Task The_writer_has_the_settings_that_durability_rests_on(string asked, string expected)
    {
        await using var store = await TestStore.OpenAsync();
        Assert.Equal(expected, await store.Database.WriteAsync(open => open.FirstAsync<string>(asked), TestStore.Cancellation));
    }

    [Fact]
    public async Task Readers_see_one_snapshot_and_cannot_write()
    {
        await using var store = await TestStore.OpenAsync();
        var seen = await store.Database.ReadAsync(
            async open =>
            {
                var before = await open.FirstAsync<long>("select count(*) from audit");
                await store.Audit.AppendAsync(Portfolio.Store.Access.Caller.System, "a", "b", new { }, TestStore.Cancellation);
                return (before, await open.FirstAsync<long>("select count(*) from audit"));
            },
            TestStore.Cancellation);
        Assert.Equal((0, 0), seen);
        Assert.Equal(1, await store.CountAsync("audit"));
        await Assert.ThrowsAsync<Microsoft.Data.Sqlite.SqliteException>(
            () => store.Database.ReadAsync(open => open.ExecuteAsync("delete from outbox"), TestStore.Cancellation));
    }

    [Theory]
    [InlineData(5)]
    [InlineData(8)]
    [InlineData(10)]
    [InlineData(13)]
    [InlineData(14)]
    public async Task A_disk_that_refuses_a_write_is_told_and_asked_again_until_it_takes_one(int code)
    {
        await using var store = await TestStore.OpenAsync();
        store.Database.BeforeStatement = _ => throw new Microsoft.Data.Sqlite.SqliteException("of the test", code);
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
    public async Task A_statement_that_breaks_a_constraint_is_no_fault_of_the_disk()
    {
        await using var store = await TestStore.OpenAsync();
        store.Database.BeforeStatement = _ => throw new Microsoft.Data.Sqlite.SqliteException("of the test", 19);
        await Assert.ThrowsAsync<Microsoft.Data.Sqlite.SqliteException>(() => AppendAsync(store));
        await store.Database.PingAsync(TestStore.Cancellation);
    }

    private static Task AppendAsync(TestStore store) =>
        store.Audit.AppendAsync(Portfolio.Store.Access.Caller.System, "a", "b", new { }, TestStore.Cancellation);

    [Fact]
    public async Task Maintenance_folds_the_log_into_the_file()
    {
        await using var store = await TestStore.OpenAsync();
        await store.WriteAsync("works", ("", "s"), ("lock", "p"));
        await store.Database.MaintainAsync(TestStore.Cancellation);
        Assert.Equal(0, new FileInfo(Path.Combine(store.Folder, "portfolio.db-wal")).Length);
    }
}
