using Portfolio.Store.Access;
using Portfolio.Store.Documents;
using Portfolio.Store.Tests.Testing;

namespace Portfolio.Store.Tests.Documents;

/// <summary>Writes that are decided before the write lock is taken, and what is kept beside contents for such decisions.</summary>
public abstract class DecidedAheadTests(StoreKind kind)
{
    public sealed class OnSqlite() : DecidedAheadTests(StoreKind.Sqlite);

    public sealed class OnPostgres() : DecidedAheadTests(StoreKind.Postgres);

    private static readonly DocumentWrite Write = new() { Portfolio = "works", Action = "project.put", MayCreate = false };

    [Fact]
    public async Task A_decision_ahead_stands_when_nothing_came_between()
    {
        await using var store = await TestStore.OpenAsync(kind);
        await store.WriteAsync("works", ("", "s"), ("lock", "a"));
        var seen = new List<long>();
        var result = await store.Documents.WriteDecidedAheadAsync(Caller.System, Write, (head, _) =>
        {
            seen.Add(head!.Revision);
            return Task.FromResult<Proposal>(TestStore.Parts(("lock", "b")));
        }, TestStore.Cancellation);
        Assert.Equal((WriteOutcome.Accepted, 2), (result.Outcome, result.Revision));
        Assert.Equal([1], seen);
    }

    [Fact]
    public async Task It_is_made_again_when_another_write_came_between()
    {
        await using var store = await TestStore.OpenAsync(kind);
        await store.WriteAsync("works", ("", "s"), ("lock", "a"));
        var seen = new List<long>();
        var result = await store.Documents.WriteDecidedAheadAsync(Caller.System, Write, async (head, _) =>
        {
            seen.Add(head!.Revision);
            if (seen.Count == 1)
                await store.WriteAsync("works", ("quay", "q"));
            return TestStore.Parts(("lock", "b"));
        }, TestStore.Cancellation);
        Assert.Equal((WriteOutcome.Accepted, 3), (result.Outcome, result.Revision));
        Assert.Equal([1, 2], seen);
    }

    [Fact]
    public async Task It_is_made_again_when_it_looked_at_more_than_the_document()
    {
        await using var store = await TestStore.OpenAsync(kind);
        await store.WriteAsync("works", ("", "s"), ("lock", "a"));
        var times = 0;
        await store.Documents.WriteDecidedAheadAsync(Caller.System, Write, async (head, _) =>
        {
            times++;
            await head!.HasRunsAsync();
            return TestStore.Parts(("lock", "b"));
        }, TestStore.Cancellation);
        Assert.Equal(2, times);
    }

    [Theory]
    [InlineData("nowhere", Right.Admin, null, WriteOutcome.NotFound)]
    [InlineData("works", Right.Read, null, WriteOutcome.Forbidden)]
    [InlineData("works", Right.Submit, "quay", WriteOutcome.Forbidden)]
    public async Task Nothing_is_decided_for_who_may_not_write_the_parts(string portfolio, Right right, string? project, WriteOutcome expected)
    {
        await using var store = await TestStore.OpenAsync(kind);
        await store.WriteAsync("works", ("", "s"), ("lock", "a"));
        var caller = await store.CallerAsync(new Grant(right, Grant.Everywhere, project is null ? null : [project]));
        var result = await store.Documents.WriteDecidedAheadAsync(
            caller, Write with { Portfolio = portfolio, Right = Right.Submit, Parts = ["lock"] },
            (_, _) => throw new InvalidOperationException("Decided all the same."), TestStore.Cancellation);
        Assert.Equal(expected, result.Outcome);
    }

    [Theory]
    [InlineData(1)]
    [InlineData(20)]
    public async Task Outlines_are_found_by_content_and_may_be_missing(int projects)
    {
        await using var store = await TestStore.OpenAsync(kind);
        await store.WriteAsync("works", ("", "s"), ("old", "o"));
        ProposedPart[] parts = [.. Enumerable.Range(0, projects).Select(i => new ProposedPart($"p{i}", [(byte)i], [9, (byte)i]))];
        await store.Documents.WriteAsync(Caller.System, Write, (_, _) => Task.FromResult<Proposal>(new Change(parts)), TestStore.Cancellation);
        IReadOnlyDictionary<string, byte[]> found = new Dictionary<string, byte[]>();
        await store.Documents.WriteDecidedAheadAsync(Caller.System, Write, async (head, _) =>
        {
            found = await head!.ReadOutlinesAsync([.. head.Parts.Select(part => part.Hash)]);
            return new Change([]);
        }, TestStore.Cancellation);
        Assert.Equal(projects, found.Count);
        Assert.All(parts, part => Assert.Equal(part.Outline, found[part.Hash]));
    }
}
