using System.Data.Common;
using Portfolio.Store.Access;
using Portfolio.Store.Tests.Testing;

namespace Portfolio.Store.Tests;

public abstract class DatabaseTests(StoreKind kind)
{
    public sealed class OnSqlite() : DatabaseTests(StoreKind.Sqlite);

    public sealed class OnPostgres() : DatabaseTests(StoreKind.Postgres);

    [Fact]
    public async Task Opening_again_changes_nothing()
    {
        await using var store = await TestStore.OpenAsync(kind);
        var before = await store.DumpAsync();
        store.Clock.Advance(TimeSpan.FromDays(1));
        await store.ReopenAsync();
        Assert.Equal(before, await store.DumpAsync());
        Assert.Contains("0001_keys", before, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("update schema_migration set checksum = 'x' where number = 2", "Step 2")]
    [InlineData("insert into schema_migration values (99, 'later', 'x', 0)", "newer version")]
    public async Task A_schema_that_is_not_this_programs_is_refused(string tampering, string told)
    {
        await using var store = await TestStore.OpenAsync(kind);
        await store.RawAsync<long>(tampering);
        var before = await store.DumpAsync();
        await store.Database.DisposeAsync();
        var refused = await Assert.ThrowsAsync<StoreSchemaException>(() => store.Place.OpenAsync(store.Clock));
        Assert.Contains(told, refused.Message, StringComparison.Ordinal);
        Assert.Equal(before, await store.DumpAsync());
    }

    [Fact]
    public async Task Readers_see_one_snapshot_and_cannot_write()
    {
        await using var store = await TestStore.OpenAsync(kind);
        var seen = await store.Database.ReadAsync(
            async open =>
            {
                var before = await open.FirstAsync<long>("select count(*) from audit");
                await AppendAsync(store);
                return (before, await open.FirstAsync<long>("select count(*) from audit"));
            },
            TestStore.Cancellation);
        Assert.Equal((0, 0), seen);
        Assert.Equal(1, await store.CountAsync("audit"));
        await Assert.ThrowsAnyAsync<Exception>(
            () => store.Database.ReadAsync(open => open.ExecuteAsync("delete from outbox"), TestStore.Cancellation));
    }

    [Fact]
    public async Task Writers_take_turns_so_that_numbers_follow_each_other()
    {
        await using var store = await TestStore.OpenAsync(kind);
        await Task.WhenAll(Enumerable.Range(0, 20).Select(_ => Task.Run(() => AppendAsync(store))));
        Assert.Equal(20, await store.RawAsync<long>("select max(sequence) from audit"));
        Assert.Null((await store.Audit.VerifyAsync(TestStore.Cancellation)).FirstBroken);
    }

    [Fact]
    public async Task A_write_that_is_called_off_leaves_nothing_and_others_go_on()
    {
        await using var store = await TestStore.OpenAsync(kind);
        using var calledOff = new CancellationTokenSource();
        store.Database.BeforeStatement = statement =>
        {
            if (statement.StartsWith("insert", StringComparison.Ordinal))
                calledOff.Cancel();
        };
        await Assert.ThrowsAnyAsync<OperationCanceledException>(
            () => store.Audit.AppendAsync(Caller.System, "a", "b", new { }, calledOff.Token));
        store.Database.BeforeStatement = null;
        Assert.Equal(0, await store.CountAsync("audit"));
        await AppendAsync(store);
        Assert.Equal(1, await store.CountAsync("audit"));
        await store.Database.PingAsync(TestStore.Cancellation);
    }

    [Fact]
    public async Task A_statement_that_breaks_a_constraint_is_no_fault_of_the_storage()
    {
        await using var store = await TestStore.OpenAsync(kind);
        var refused = await Assert.ThrowsAnyAsync<DbException>(() => store.Database.WriteAsync(
            open => open.ExecuteAsync("insert into portfolio (id, created_at) values ('', 1)"), TestStore.Cancellation));
        Assert.True(store.Place.IsConstraint(refused));
        await store.Database.PingAsync(TestStore.Cancellation);
    }

    private static Task AppendAsync(TestStore store) => store.Audit.AppendAsync(Caller.System, "a", "b", new { }, TestStore.Cancellation);
}
