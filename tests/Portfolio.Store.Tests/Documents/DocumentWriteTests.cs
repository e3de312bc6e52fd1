using System.Text;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;
using Portfolio.Store.Tests.Testing;

namespace Portfolio.Store.Tests.Documents;

public abstract class DocumentWriteTests(StoreKind kind)
{
    public sealed class OnSqlite() : DocumentWriteTests(StoreKind.Sqlite);

    public sealed class OnPostgres() : DocumentWriteTests(StoreKind.Postgres);

    private static readonly DocumentWrite Write = new() { Portfolio = "works", Action = "document.put" };

    [Fact]
    public async Task The_first_write_makes_the_portfolio_and_tells_audit_and_listeners()
    {
        await using var store = await TestStore.OpenAsync(kind);
        var seen = "nothing";
        var result = await store.Documents.WriteAsync(
            Caller.System,
            Write with { Note = "begin" },
            (head, _) =>
            {
                seen = head is null ? "null" : "head";
                return Task.FromResult<Proposal>(TestStore.Parts(("", "s"), ("lock", "a")));
            },
            TestStore.Cancellation);
        Assert.Equal(("null", WriteOutcome.Accepted, 1, true), (seen, result.Outcome, result.Revision, result.Created));
        Assert.Equal(["", "lock"], result.Changes.Select(change => change.Project));
        var entry = (await store.Audit.ListAsync(Caller.System, null, 1, TestStore.Cancellation))[0];
        Assert.Equal(("system", "document.put", "portfolios/works"), (entry.Actor, entry.Action, entry.Object));
        Assert.Contains("\"note\":\"begin\"", entry.Detail, StringComparison.Ordinal);
        var told = Assert.Single(await store.Outbox.ReadAfterAsync(Caller.System, "works", 0, 10, TestStore.Cancellation));
        Assert.Equal(("revision.created", "1", """{"revision":1,"changed":["","lock"]}"""), (told.Kind, told.Subject, told.Payload));
    }

    [Fact]
    public async Task A_write_that_changes_nothing_makes_no_revision()
    {
        await using var store = await TestStore.OpenAsync(kind);
        await store.WriteAsync("works", ("", "s"), ("lock", "a"));
        var (audit, outbox) = (await store.CountAsync("audit"), await store.CountAsync("outbox"));
        var result = await store.WriteAsync("works", ("lock", "a"));
        Assert.Equal((WriteOutcome.Unchanged, 1), (result.Outcome, result.Revision));
        Assert.Equal((audit, outbox), (await store.CountAsync("audit"), await store.CountAsync("outbox")));
    }

    [Fact]
    public async Task The_decision_reads_the_head_inside_the_transaction()
    {
        await using var store = await TestStore.OpenAsync(kind);
        await store.WriteAsync("works", ("", "s"), ("lock", "a"));
        var seen = new List<string>();
        await store.Documents.WriteAsync(
            Caller.System,
            Write,
            async (head, _) =>
            {
                seen.Add($"{head!.Revision} {string.Join(",", head.Parts.Select(part => part.Project))}");
                seen.Add(Encoding.UTF8.GetString((await head.ReadAsync("lock"))!));
                seen.Add($"{await head.ReadAsync("none") is null} {await head.HasRunsAsync()}");
                seen.Add(string.Join(",", (await head.ReadAllAsync()).Select(part => Encoding.UTF8.GetString(part.Bytes))));
                return TestStore.Parts(("lock", "b"));
            },
            TestStore.Cancellation);
        Assert.Equal(["1 ,lock", "a", "True False", "s,a"], seen);
    }

    [Fact]
    public async Task A_refusal_keeps_nothing()
    {
        await using var store = await TestStore.OpenAsync(kind);
        await store.WriteAsync("works", ("", "s"), ("lock", "a"));
        var reason = new object();
        var result = await store.Documents.WriteAsync(
            Caller.System, Write, (_, _) => Task.FromResult<Proposal>(new Refusal(reason)), TestStore.Cancellation);
        Assert.Equal((WriteOutcome.Refused, 1), (result.Outcome, result.Revision));
        Assert.Same(reason, result.Refusal);
        Assert.Equal((1, 1), (await store.CountAsync("revision"), await store.CountAsync("outbox")));
        Assert.Equal(1, await store.CountAsync("audit"));
    }

    [Fact]
    public async Task When_the_decision_throws_nothing_is_kept_and_the_next_write_works()
    {
        await using var store = await TestStore.OpenAsync(kind);
        await store.WriteAsync("works", ("", "s"));
        await Assert.ThrowsAsync<TimeZoneNotFoundException>(
            () => store.Documents.WriteAsync(
                Caller.System, Write, (_, _) => throw new TimeZoneNotFoundException(), TestStore.Cancellation));
        Assert.Equal((1, 1), (await store.CountAsync("revision"), await store.CountAsync("audit")));
        Assert.Equal(2, (await store.WriteAsync("works", ("", "t"))).Revision);
    }

    [Fact]
    public async Task Rows_that_join_stand_or_fall_with_the_write()
    {
        await using var store = await TestStore.OpenAsync(kind);
        WriteResult? joined = null;
        var write = Write with
        {
            Joining = async (open, result, _) =>
            {
                joined = result;
                await store.Audit.AppendAsync(open, Caller.System, "joined", "x", new { });
            },
        };
        var result = await store.Documents.WriteAsync(
            Caller.System, write, (_, _) => Task.FromResult<Proposal>(TestStore.Parts(("", "s"))), TestStore.Cancellation);
        Assert.Same(result, joined);
        Assert.Equal(2, await store.CountAsync("audit"));

        var failing = Write with { Joining = (_, _, _) => throw new IOException("no") };
        await Assert.ThrowsAsync<IOException>(
            () => store.Documents.WriteAsync(
                Caller.System, failing, (_, _) => Task.FromResult<Proposal>(TestStore.Parts(("", "t"))), TestStore.Cancellation));
        Assert.Equal((1, 2), (await store.CountAsync("revision"), await store.CountAsync("audit")));
    }

    [Fact]
    public async Task Writes_at_the_same_time_follow_one_another_and_lose_nothing()
    {
        await using var store = await TestStore.OpenAsync(kind);
        await store.WriteAsync("works", ("", "0"));
        await Task.WhenAll(Enumerable.Range(0, 20).Select(_ => Task.Run(() => store.Documents.WriteAsync(
            Caller.System,
            Write,
            async (head, _) => TestStore.Parts(("", $"{int.Parse(Encoding.UTF8.GetString((await head!.ReadAsync(""))!), null) + 1}")),
            TestStore.Cancellation))));
        var read = (await store.Documents.ReadAsync(Caller.System, "works", null, TestStore.Cancellation))!;
        Assert.Equal((21, "20"), (read.Revision.Number, Encoding.UTF8.GetString(read.Parts[0].Bytes)));
        Assert.Null((await store.Audit.VerifyAsync(TestStore.Cancellation)).FirstBroken);
    }

    [Fact]
    public async Task A_clock_set_back_does_not_make_a_revision_look_older()
    {
        await using var store = await TestStore.OpenAsync(kind);
        await store.WriteAsync("works", ("", "1"));
        await store.RawAsync<long>("update revision set recorded_at = recorded_at + 3600000000");
        await store.WriteAsync("works", ("", "2"));
        var revisions = await store.Documents.ListRevisionsAsync(Caller.System, "works", null, 2, TestStore.Cancellation);
        Assert.Equal(revisions[1].RecordedAt, revisions[0].RecordedAt);
    }

    [Fact]
    public async Task An_archived_portfolio_takes_no_writes_but_reads()
    {
        await using var store = await TestStore.OpenAsync(kind);
        await store.WriteAsync("works", ("", "s"));
        await store.RawAsync<long>("update portfolio set archived_at = 1");
        Assert.Equal(WriteOutcome.Archived, (await store.WriteAsync("works", ("", "t"))).Outcome);
        Assert.NotNull(await store.Documents.ReadAsync(Caller.System, "works", null, TestStore.Cancellation));
    }

    [Fact]
    public async Task A_night_of_posts_costs_megabytes()
    {
        // 200 projects of 55 KB of JSON that compresses to about a quarter; each posted once, changed in one place.
        await using var store = await TestStore.OpenAsync(kind);
        var projects = Enumerable.Range(0, 200).Select(number => ($"p{number}", ProjectText(number))).ToArray();
        await store.WriteAsync("works", [("", "{}"), .. projects]);
        await store.Database.MaintainAsync(TestStore.Cancellation);
        var before = await store.Place.SizeAsync();
        foreach (var (project, text) in projects)
            await store.WriteAsync("works", (project, text.Replace("\"A0\"", "\"B0\"", StringComparison.Ordinal)));
        await store.Database.MaintainAsync(TestStore.Cancellation);
        var grown = await store.Place.SizeAsync() - before;
        TestContext.Current.TestOutputHelper?.WriteLine($"document {before:N0} bytes, 200 posts {grown:N0} bytes");
        Assert.Equal(201, await store.CountAsync("revision"));
        Assert.InRange(grown, 1, 6_000_000);
    }

    private static string ProjectText(int number)
    {
        var text = new StringBuilder("{\"activities\":[");
        for (var i = 0; text.Length < 55_000; i++)
        {
            var noise = (number * 7919 + i * 104_729) % 1_000_003;
            text.Append(null, $"{{\"id\":\"A{i}\",\"name\":\"section {noise}\",\"duration\":{{\"type\":\"pert\",\"low\":{noise % 40},\"mode\":{noise % 97},\"high\":{noise % 311}}}}},");
        }
        return text.Append("]}").ToString();
    }
}
