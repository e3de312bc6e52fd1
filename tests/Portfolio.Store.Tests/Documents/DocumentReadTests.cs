using System.Text;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;
using Portfolio.Store.Tests.Testing;

namespace Portfolio.Store.Tests.Documents;

public abstract class DocumentReadTests(StoreKind kind)
{
    public sealed class OnSqlite() : DocumentReadTests(StoreKind.Sqlite);

    public sealed class OnPostgres() : DocumentReadTests(StoreKind.Postgres);

    private static string Texts(StoredDocument? document) =>
        string.Join(" ", document!.Parts.Select(part => $"{part.Project}={Encoding.UTF8.GetString(part.Bytes)}"));

    private async Task<TestStore> WithThreeRevisionsAsync()
    {
        var store = await TestStore.OpenAsync(kind);
        await store.WriteAsync("works", ("", "s1"), ("lock", "a1"), ("quay", "b1"));
        store.Clock.Advance(TimeSpan.FromHours(1));
        await store.WriteAsync("works", ("quay", "b2"), ("weir", "c2"));
        store.Clock.Advance(TimeSpan.FromHours(1));
        await store.Documents.WriteAsync(
            Caller.System,
            new DocumentWrite { Portfolio = "works", Action = "project.delete", Note = "lock is done" },
            (_, _) => Task.FromResult<Proposal>(TestStore.Parts(("", "s3")) with { Removed = ["lock"], Order = ["weir", "quay"] }),
            TestStore.Cancellation);
        return store;
    }

    [Theory]
    [InlineData(1, "=s1 lock=a1 quay=b1")]
    [InlineData(2, "=s1 lock=a1 quay=b2 weir=c2")]
    [InlineData(3, "=s3 weir=c2 quay=b2")]
    [InlineData(null, "=s3 weir=c2 quay=b2")]
    public async Task Any_revision_reads_as_it_was(int? number, string expected)
    {
        await using var store = await WithThreeRevisionsAsync();
        Assert.Equal(expected, Texts(await store.Documents.ReadAsync(Caller.System, "works", number, TestStore.Cancellation)));
        var heads = await store.Documents.ReadHeadsAsync(Caller.System, "works", number, TestStore.Cancellation);
        Assert.Equal(expected.Split(' ').Select(part => part.Split('=')[0]), heads!.Select(part => part.Project));
    }

    [Theory]
    [InlineData(1, "quay", "b1")]
    [InlineData(3, "quay", "b2")]
    [InlineData(null, "", "s3")]
    [InlineData(2, "lock", "a1")]
    [InlineData(3, "lock", null)]
    [InlineData(1, "weir", null)]
    [InlineData(4, "quay", null)]
    public async Task A_part_reads_as_it_was(int? number, string project, string? expected)
    {
        await using var store = await WithThreeRevisionsAsync();
        var part = await store.Documents.ReadPartAsync(Caller.System, "works", project, number, TestStore.Cancellation);
        Assert.Equal(expected, part is null ? null : Encoding.UTF8.GetString(part.Bytes));
        Assert.Equal(expected is null ? null : ContentHash.Of(Encoding.UTF8.GetBytes(expected)), part?.Hash);
    }

    [Theory]
    [InlineData(-1, null)]
    [InlineData(0, 1L)]
    [InlineData(59, 1L)]
    [InlineData(60, 2L)]
    [InlineData(999, 3L)]
    public async Task The_revision_current_at_an_instant_is_the_last_recorded_by_then(int minutes, long? expected)
    {
        await using var store = await WithThreeRevisionsAsync();
        var found = await store.Documents.FindRevisionAtAsync(
            Caller.System, "works", TestStore.Start.AddMinutes(minutes), TestStore.Cancellation);
        Assert.Equal(expected, found?.Number);
    }

    [Fact]
    public async Task Revisions_are_listed_newest_first_with_who_when_and_why()
    {
        await using var store = await WithThreeRevisionsAsync();
        var page = await store.Documents.ListRevisionsAsync(Caller.System, "works", null, 2, TestStore.Cancellation);
        Assert.Equal([3, 2], page.Select(revision => revision.Number));
        Assert.Equal(("system", "lock is done", TestStore.Start.AddHours(2)), (page[0].Actor, page[0].Note, page[0].RecordedAt));
        Assert.Equal([1], (await store.Documents.ListRevisionsAsync(Caller.System, "works", 2, 2, TestStore.Cancellation)).Select(
            revision => revision.Number));
        Assert.Null(await store.Documents.FindRevisionAsync(Caller.System, "works", 4, TestStore.Cancellation));
    }

    [Fact]
    public async Task Changes_name_what_was_there_and_what_is()
    {
        await using var store = await WithThreeRevisionsAsync();
        var changes = await store.Documents.ListChangesAsync(Caller.System, "works", 3, TestStore.Cancellation);
        Assert.Equal(
            [
                new PartChange("", Hash("s1"), Hash("s3")),
                new PartChange("lock", Hash("a1"), null),
                new PartChange("quay", Hash("b2"), Hash("b2")),
            ],
            changes.OrderBy(change => change.Project, StringComparer.Ordinal));
        Assert.Equal(
            [new PartChange("quay", Hash("b1"), Hash("b2")), new PartChange("weir", null, Hash("c2"))],
            await store.Documents.ListChangesAsync(Caller.System, "works", 2, TestStore.Cancellation));
    }

    [Fact]
    public async Task A_project_that_left_may_come_back()
    {
        await using var store = await WithThreeRevisionsAsync();
        await store.WriteAsync("works", ("lock", "a4"));
        Assert.Equal(
            "=s3 weir=c2 quay=b2 lock=a4", Texts(await store.Documents.ReadAsync(Caller.System, "works", null, TestStore.Cancellation)));
        Assert.Equal("=s3 weir=c2 quay=b2", Texts(await store.Documents.ReadAsync(Caller.System, "works", 3, TestStore.Cancellation)));
        var changes = await store.Documents.ListChangesAsync(Caller.System, "works", 4, TestStore.Cancellation);
        Assert.Equal([new PartChange("lock", null, Hash("a4"))], changes);
    }

    [Fact]
    public async Task Portfolios_are_listed_by_id_page_by_page()
    {
        await using var store = await WithThreeRevisionsAsync();
        await store.WriteAsync("Harbour", ("", "s"));
        await store.WriteAsync("basin", ("", "s"));
        var all = await store.Documents.ListAsync(Caller.System, null, 2, TestStore.Cancellation);
        Assert.Equal(["Harbour", "basin"], all.Select(entry => entry.Id));
        var rest = await store.Documents.ListAsync(Caller.System, "basin", 2, TestStore.Cancellation);
        Assert.Equal([new PortfolioEntry("works", 3, TestStore.Start, null)], rest);
    }

    [Fact]
    public async Task Damaged_content_is_noticed()
    {
        await using var store = await WithThreeRevisionsAsync();
        await store.RawAsync<long>("update part_content set bytes = (select bytes from part_content where hash = @Other) where hash = @Hash",
            new { Hash = Hash("b2"), Other = Hash("c2") });
        await Assert.ThrowsAsync<StoreDamagedException>(
            () => store.Documents.ReadAsync(Caller.System, "works", null, TestStore.Cancellation));
    }

    private static string Hash(string text) => ContentHash.Of(Encoding.UTF8.GetBytes(text));
}
