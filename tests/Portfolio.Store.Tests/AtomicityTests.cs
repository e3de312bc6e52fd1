using Portfolio.Store.Access;
using Portfolio.Store.Documents;
using Portfolio.Store.Runs;
using Portfolio.Store.Tests.Testing;

namespace Portfolio.Store.Tests;

/// <summary>Storage that fails before any one statement of a write leaves the database exactly as it was.</summary>
public abstract class AtomicityTests(StoreKind kind)
{
    public sealed class OnSqlite() : AtomicityTests(StoreKind.Sqlite);

    public sealed class OnPostgres() : AtomicityTests(StoreKind.Postgres);

    private static readonly Dictionary<string, Func<TestStore, RunLease, Task>> Writes = new()
    {
        ["first document"] = (store, _) => store.WriteAsync("harbour", ("", "s"), ("lock", "a")),
        ["changed document"] = (store, _) => store.Documents.WriteAsync(
            Caller.System,
            new DocumentWrite { Portfolio = "works", Action = "document.put" },
            (head, _) => Task.FromResult<Proposal>(
                TestStore.Parts(("quay", "b2"), ("weir", "c")) with { Removed = ["lock"], Order = ["weir", "quay"] }),
            TestStore.Cancellation),
        ["key"] = (store, _) => store.Keys.CreateAsync(
            Caller.System, "k", [new(Right.Read, "works", ["lock", "quay"]), new(Right.Finance, "*")], null, TestStore.Cancellation),
        ["run asked for"] = (store, _) => store.QueueAsync(RunScenes.Asked(RunScenes.Today)),
        ["run due"] = (store, _) => store.Requests.CreateDueAsync(
            Caller.System, RunScenes.Asked(RunScenes.Today), RunScenes.Today, TestStore.Cancellation),
        ["stop asked for"] = (
            store, held) => store.Requests.RequestCancelAsync(Caller.System, "works", held.Run.Id, null, TestStore.Cancellation),
        ["claim after another engine"] = (store, _) =>
        {
            store.Clock.Advance(RunScenes.Lease);
            return store.ClaimAsync("2.0");
        },
        ["block"] = (store, held) => store.Samples.WriteBlockAsync(held, 1, 3, RunScenes.Block(1), TestStore.Cancellation),
        ["success"] = (store, held) => store.Endings.SucceedAsync(held, RunScenes.Result("r"), TestStore.Cancellation),
        ["failure"] = (store, held) => store.Endings.FailAsync(held, "no room", TestStore.Cancellation),
        ["cancellation"] = (store, held) => store.Endings.CancelAsync(held, TestStore.Cancellation),
        ["document with its answer"] = (store, _) => store.Documents.WriteAsync(
            Caller.System,
            new DocumentWrite { Portfolio = "works", Action = "document.put", Joining = (open, _, _) => AnswerScenes.KeepAsync(open) },
            (_, _) => Task.FromResult<Proposal>(TestStore.Parts(("lock", "a2"))), TestStore.Cancellation),
        ["run with its answer"] = (store, _) => store.Requests.CreateAsync(
            Caller.System, RunScenes.Asked(RunScenes.Today), (open, _, _) => AnswerScenes.KeepAsync(open), TestStore.Cancellation),
        ["schedule"] = (store, _) => store.Schedules.PutAsync(Caller.System, "works", "0 2 * * *", null, true, null, TestStore.Cancellation),
        ["subscription"] = (store, _) => store.SubscribeAsync("other"),
        ["another secret"] = (store, _) => store.Subscriptions.RotateAsync(
            Caller.System, "works", "office", "whsec_c2Vjb25k", TimeSpan.FromHours(1), _ => null, null, TestStore.Cancellation),
        ["event handed on"] = (store, _) => store.HandOnLastAsync("office"),
        ["something noticed"] = (store, _) => store.Distribution.TellAsync(
            "works", "look", [new("a", "level.moved", "project/lock", "lock", new { }), new("b", "level.moved", "portfolio", null, new { })],
            TestStore.Cancellation),
    };

    public static TheoryData<string> Names => [.. Writes.Keys];

    private sealed class InjectedException : Exception;

    [Theory]
    [MemberData(nameof(Names))]
    public async Task A_failure_before_any_statement_leaves_nothing_half_written(string name)
    {
        var (store, held) = await BeginAsync();
        await using var _ = store;
        var before = await store.DumpAsync();

        var failures = 0;
        for (var succeeded = false; !succeeded; failures++)
        {
            var left = failures;
            store.Database.BeforeStatement = _ =>
            {
                if (left-- == 0)
                    throw new InjectedException();
            };
            try
            {
                await Writes[name](store, held);
                succeeded = true;
            }
            catch (InjectedException)
            {
                Assert.Equal(before, await store.DumpAsync());
            }
        }
        store.Database.BeforeStatement = null;
        Assert.True(failures > 3, $"only {failures} steps");
        Assert.NotEqual(before, await store.DumpAsync());
        Assert.Null((await store.Audit.VerifyAsync(TestStore.Cancellation)).FirstBroken);
    }

    /// <summary>What a process that is killed before each statement leaves behind.</summary>
    [Theory]
    [MemberData(nameof(Names))]
    public async Task A_process_killed_before_any_statement_leaves_nothing_half_written(string name)
    {
        var (store, held) = await BeginAsync();
        await using var _ = store;
        await (kind == StoreKind.Sqlite ? CopyBeforeEachAsync(name, store, held) : CutBeforeEachAsync(name, store, held));
    }

    /// <summary>The files as they lie on the disk then.</summary>
    private static async Task CopyBeforeEachAsync(string name, TestStore store, RunLease held)
    {
        var before = await store.DumpAsync();
        var folder = ((SqlitePlace)store.Place).Folder;
        var copies = new List<string>();
        store.Database.BeforeStatement = _ => copies.Add(Copy(folder, copies.Count));
        await Writes[name](store, held);
        store.Database.BeforeStatement = null;
        copies.Add(Copy(folder, copies.Count));
        var after = await store.DumpAsync();

        Assert.True(copies.Count > 3, $"only {copies.Count} steps");
        foreach (var copy in copies)
        {
            var place = new SqlitePlace(copy);
            await using (await place.OpenAsync(store.Clock))
            {
            }
            Assert.Equal(copy == copies[^1] ? after : before, await TableDump.DumpAsync(place));
        }
    }

    /// <summary>A server sees the connection end.</summary>
    private static async Task CutBeforeEachAsync(string name, TestStore store, RunLease held)
    {
        var before = await store.DumpAsync();
        var cuts = 0;
        for (var succeeded = false; !succeeded; cuts++)
        {
            var left = cuts;
            store.Database.BeforeStatement = _ =>
            {
                if (left-- == 0)
                    store.RawAsync<long>(PostgresPlace.CutSql).GetAwaiter().GetResult();
            };
            try
            {
                await Writes[name](store, held);
                succeeded = true;
            }
            catch (StoreUnavailableException)
            {
                Assert.Equal(before, await store.DumpAsync());
            }
        }
        store.Database.BeforeStatement = null;
        Assert.True(cuts > 3, $"only {cuts} steps");
        Assert.NotEqual(before, await store.DumpAsync());
    }

    private async Task<(TestStore Store, RunLease Held)> BeginAsync()
    {
        var store = await TestStore.OpenAsync(kind);
        await store.WriteAsync("works", ("", "s"), ("lock", "a"), ("quay", "b"));
        await store.SubscribeAsync("office");
        await store.QueueAsync(RunScenes.Asked(RunScenes.Today));
        var held = (await store.ClaimAsync())!;
        await store.Samples.WriteBlockAsync(held, 0, 3, RunScenes.Block(0), TestStore.Cancellation);
        return (store, held);
    }

    private static string Copy(string folder, int step)
    {
        var copy = Directory.CreateDirectory(Path.Combine(folder, $"killed-{step}")).FullName;
        foreach (var file in Directory.GetFiles(folder, "portfolio.db*").Where(file => !file.EndsWith("-shm", StringComparison.Ordinal)))
            File.Copy(file, Path.Combine(copy, Path.GetFileName(file)));
        return copy;
    }
}
