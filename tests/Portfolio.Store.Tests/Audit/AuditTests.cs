using System.Security.Cryptography;
using System.Text;
using Portfolio.Store.Access;
using Portfolio.Store.Audit;
using Portfolio.Store.Tests.Testing;

namespace Portfolio.Store.Tests.Audit;

public abstract class AuditTests(StoreKind kind)
{
    public sealed class OnSqlite() : AuditTests(StoreKind.Sqlite);

    public sealed class OnPostgres() : AuditTests(StoreKind.Postgres);

    private async Task<TestStore> WithEntriesAsync(int count)
    {
        var store = await TestStore.OpenAsync(kind);
        for (var i = 1; i <= count; i++)
            await store.Audit.AppendAsync(Caller.System, "test", $"thing/{i}", new { number = i }, TestStore.Cancellation);
        return store;
    }

    [Fact]
    public async Task The_hash_is_over_the_fields_with_their_lengths_and_the_hash_before()
    {
        await using var store = await WithEntriesAsync(1);
        var entry = Assert.Single(await store.Audit.ListAsync(Caller.System, null, 10, TestStore.Cancellation));
        var zeros = new string('0', 64);
        // 2026-12-01T08:00:00Z in microseconds
        var text = $$"""1:116:17961120000000006:system4:test7:thing/112:{"number":1}64:{{zeros}}""";
        Assert.Equal(zeros, entry.PreviousHash);
        Assert.Equal(Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(text))), entry.Hash);
    }

    [Fact]
    public async Task A_whole_chain_is_found_whole()
    {
        await using var store = await WithEntriesAsync(5);
        var found = await store.Audit.VerifyAsync(TestStore.Cancellation);
        Assert.Equal((5, null), (found.Entries, found.FirstBroken));
        Assert.Equal(found.HeadHash, (await store.Audit.ListAsync(Caller.System, null, 1, TestStore.Cancellation))[0].Hash);
    }

    [Theory]
    [InlineData("update audit set detail = '{}'")]
    [InlineData("delete from audit")]
    public async Task Entries_cannot_be_changed_or_deleted(string statement)
    {
        await using var store = await WithEntriesAsync(2);
        var refused = await Assert.ThrowsAnyAsync<System.Data.Common.DbException>(() => store.RawAsync<long>(statement));
        Assert.Contains("only ever appended to", refused.Message, StringComparison.Ordinal);
        Assert.Equal(2, await store.CountAsync("audit"));
    }

    [Theory]
    [InlineData("update audit set at = at + 1 where sequence = 3", 3)]
    [InlineData("update audit set actor = 'System' where sequence = 5", 5)]
    [InlineData("update audit set action = 'testt', object = 'hing/2' where sequence = 2", 2)]
    [InlineData("update audit set object = object || '0' where sequence = 1", 1)]
    [InlineData("update audit set detail = '{\"number\":4}' where sequence = 3", 3)]
    [InlineData("update audit set prev_hash = hash where sequence = 4", 4)]
    [InlineData("update audit set hash = prev_hash where sequence = 2", 2)]
    [InlineData("update audit set sequence = 9 where sequence = 5", 5)]
    [InlineData("delete from audit where sequence = 4", 4)]
    [InlineData("delete from audit where sequence = 1", 1)]
    [InlineData("insert into audit select 6, at, actor, action, object, detail, hash, hash from audit where sequence = 5", 6)]
    [InlineData(
        "update audit set sequence = 9 where sequence = 3; update audit set sequence = 3 where sequence = 4; "
        + "update audit set sequence = 4 where sequence = 9", 3)]
    public async Task Tampering_past_the_triggers_is_found_at_the_first_broken_entry(string tampering, long broken)
    {
        await using var store = await WithEntriesAsync(5);
        await store.RawAsync<long>($"{store.Place.DropAuditGuardsSql}; {tampering}");
        var found = await store.Audit.VerifyAsync(TestStore.Cancellation);
        Assert.Equal((broken - 1, broken), (found.Entries, found.FirstBroken));
        Assert.Equal(found, await store.Place.CheckAuditAsync());
    }

    [Fact]
    public async Task A_trail_cut_short_shows_in_the_head()
    {
        await using var store = await WithEntriesAsync(5);
        var whole = await store.Audit.VerifyAsync(TestStore.Cancellation);
        await store.RawAsync<long>($"{store.Place.DropAuditGuardsSql}; delete from audit where sequence = 5");
        var cut = await store.Audit.VerifyAsync(TestStore.Cancellation);
        Assert.Null(cut.FirstBroken);
        Assert.NotEqual(whole.HeadHash, cut.HeadHash);
    }

    [Fact]
    public async Task Only_administrators_of_everything_read_it_newest_first()
    {
        await using var store = await WithEntriesAsync(5);
        var page = await store.Audit.ListAsync(Caller.System, new AuditQuestion { Before = 5 }, 2, TestStore.Cancellation);
        Assert.Equal([4, 3], page.Select(entry => entry.Sequence));
        var stranger = await store.CallerAsync(new Grant(Right.Admin, "works"));
        Assert.Empty(await store.Audit.ListAsync(stranger, null, 10, TestStore.Cancellation));
    }
}
