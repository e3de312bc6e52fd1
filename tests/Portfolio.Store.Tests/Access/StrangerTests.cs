using Portfolio.Store.Access;
using Portfolio.Store.Documents;
using Portfolio.Store.Runs;
using Portfolio.Store.Schedules;
using Portfolio.Store.Tests.Testing;

namespace Portfolio.Store.Tests.Access;

/// <summary>What keys without, or with too narrow, grants find: nothing.</summary>
public abstract class StrangerTests(StoreKind kind)
{
    public sealed class OnSqlite() : StrangerTests(StoreKind.Sqlite);

    public sealed class OnPostgres() : StrangerTests(StoreKind.Postgres);

    private async Task<(TestStore Store, string Run)> WithRunAsync()
    {
        var store = await TestStore.OpenAsync(kind);
        await store.WriteAsync("works", ("", "s"), ("lock", "a"), ("quay", "b"));
        await store.SubscribeAsync("office");
        var run = await store.QueueAsync(RunScenes.Asked(RunScenes.Today));
        var held = (await store.ClaimAsync())!;
        await store.Samples.WriteBlockAsync(held, 0, 3, RunScenes.Block(0), TestStore.Cancellation);
        await store.Endings.SucceedAsync(held, RunScenes.Result("r"), TestStore.Cancellation);
        await store.Schedules.PutAsync(Caller.System, "works", "0 2 * * *", null, true, null, TestStore.Cancellation);
        await store.HandOnLastAsync("office");
        return (store, run.Id);
    }

    /// <summary>Every read, as the number of things that it finds.</summary>
    private static async Task<Dictionary<string, int>> ReadEverythingAsync(TestStore store, Caller caller, string run)
    {
        var stop = TestStore.Cancellation;
        return new Dictionary<string, int>
        {
            ["portfolios"] = (await store.Documents.ListAsync(caller, null, 9, stop)).Count,
            ["document"] = (await store.Documents.ReadAsync(caller, "works", null, stop))?.Parts.Count ?? 0,
            ["heads"] = (await store.Documents.ReadHeadsAsync(caller, "works", null, stop))?.Count ?? 0,
            ["settings"] = Found(await store.Documents.ReadPartAsync(caller, "works", "", null, stop)),
            ["lock"] = Found(await store.Documents.ReadPartAsync(caller, "works", "lock", null, stop)),
            ["quay"] = Found(await store.Documents.ReadPartAsync(caller, "works", "quay", 1, stop)),
            ["revisions"] = (await store.Documents.ListRevisionsAsync(caller, "works", null, 9, stop)).Count,
            ["revision"] = Found(await store.Documents.FindRevisionAsync(caller, "works", 1, stop)),
            ["revision at"] = Found(await store.Documents.FindRevisionAtAsync(caller, "works", store.Clock.GetUtcNow(), stop)),
            ["changes"] = (await store.Documents.ListChangesAsync(caller, "works", 1, stop)).Count,
            ["events"] = (await store.Outbox.ReadAfterAsync(caller, "works", 0, 9, stop)).Count,
            ["run"] = Found(await store.Runs.FindAsync(caller, "works", run, stop)),
            ["runs"] = (await store.Runs.ListAsync(caller, "works", null, 9, stop)).Count,
            ["latest"] = Found(await store.Runs.FindLatestAsync(caller, "works", stop)),
            ["point"] = Found(await store.Runs.FindPointAsync(caller, "works", RunScenes.Today, stop)),
            ["points"] = (await store.Runs.ListPointsAsync(caller, "works", null, null, stop)).Count,
            ["rows"] = (await store.Results.ListAsync(caller, "works", run, 0, 1000, stop)).Count,
            ["total"] = Found(await store.Results.FindAsync(caller, "works", run, "portfolio", stop)),
            ["milestone"] = Found(await store.Results.FindAsync(caller, "works", run, "milestone/lock/M1", stop)),
            ["grids"] = (await store.Results.ListGridsAsync(caller, "works", run, stop)).Count,
            ["allocation"] = Found(await store.Results.FindAllocationAsync(caller, "works", run, 80, stop)),
            ["series"] = (await store.Results.ListSeriesAsync(caller, "works", "project/lock", "cost", null, null, stop)).Count,
            ["total series"] = (await store.Results.ListSeriesAsync(caller, "works", "portfolio", "finish", null, null, stop)).Count,
            ["minutes"] = Found(await store.Samples.ReadMinutesAsync(caller, "works", run, "finish/lock", stop)),
            ["money"] = Found(await store.Samples.ReadMoneyAsync(caller, "works", run, "cost/lock", stop)),
            ["schedule"] = Found(await store.Schedules.FindAsync(caller, "works", stop)),
            ["enabled"] = (await store.Schedules.ListEnabledAsync(caller, stop)).Count,
            ["page of events"] = (await store.Outbox.ReadAfterAsync(caller, "works", null, 9, stop)).Events.Count,
            ["subscription"] = Found(await store.Subscriptions.FindAsync(caller, "works", "office", stop)),
            ["subscriptions"] = (await store.Subscriptions.ListAsync(caller, "works", null, 9, stop)).Count,
            ["active"] = (await store.Subscriptions.ListActiveAsync(caller, null, stop)).Count,
            ["deliveries"] = (await store.Deliveries.ListAsync(caller, "works", "office", null, null, 9, stop)).Count,
        };

        static int Found(object? thing) => thing is null ? 0 : 1;
    }

    [Fact]
    public async Task The_system_finds_everything()
    {
        var (store, run) = await WithRunAsync();
        await using var _ = store;
        Assert.DoesNotContain(0, (await ReadEverythingAsync(store, Caller.System, run)).Values);
    }

    [Theory]
    [InlineData(Right.Read, "harbour")]
    [InlineData(Right.Admin, "harbour")]
    [InlineData(Right.Admin, "WORKS")]
    public async Task A_stranger_finds_nothing(Right right, string portfolio)
    {
        var (store, run) = await WithRunAsync();
        await using var _ = store;
        var stranger = await store.CallerAsync(new Grant(right, portfolio));
        Assert.All(await ReadEverythingAsync(store, stranger, run), found => Assert.Equal((found.Key, 0), (found.Key, found.Value)));
    }

    [Theory]
    [InlineData(true)]
    [InlineData(false)]
    public async Task A_key_revoked_or_expired_after_it_was_looked_up_finds_nothing(bool revoked)
    {
        var (store, run) = await WithRunAsync();
        await using var _ = store;
        // The last administrator's key could not be revoked.
        await store.Keys.BootstrapAsync("an-administrator-key-of-more-than-32-characters", TestStore.Cancellation);
        var made = (await store.Keys.CreateAsync(Caller.System, "k", [new(Right.Admin, "*")], store.Clock.GetUtcNow().AddHours(1), TestStore.Cancellation))!;
        var caller = (await store.Keys.AuthenticateAsync(made.Secret, TestStore.Cancellation))!;
        if (revoked)
            await store.Keys.RevokeAsync(Caller.System, made.Key.Id, null, TestStore.Cancellation);
        else
            store.Clock.Advance(TimeSpan.FromHours(1));
        Assert.All((await ReadEverythingAsync(store, caller, run)).Values, found => Assert.Equal(0, found));
    }

    [Fact]
    public async Task A_reader_of_one_project_finds_that_project_and_no_totals()
    {
        var (store, run) = await WithRunAsync();
        await using var _ = store;
        var reader = await store.CallerAsync(new Grant(Right.Read, "works", ["lock"]));
        var found = await ReadEverythingAsync(store, reader, run);
        string[] nothing = 
        [
            "settings", "quay", "events", "total", "allocation", "total series", "enabled", "page of events", "subscription", "subscriptions",
            "active", "deliveries",
        ];
        Assert.All(nothing, name => Assert.Equal((name, 0), (name, found[name])));
        Assert.All(found.Keys.Except(nothing), name => Assert.True(found[name] > 0, name));
        Assert.Equal((1, 1, 2, 2), (found["document"], found["changes"], found["rows"], found["grids"]));
        Assert.Null(await store.Samples.ReadMinutesAsync(reader, "works", run, "finish/quay", TestStore.Cancellation));
    }

    [Fact]
    public async Task Who_only_submits_reads_the_projects_it_submits_to()
    {
        var (store, run) = await WithRunAsync();
        await using var _ = store;
        var found = await ReadEverythingAsync(store, await store.CallerAsync(new Grant(Right.Submit, "works", ["lock"])), run);
        Assert.Equal(["lock", "portfolios"], found.Where(entry => entry.Value > 0).Select(entry => entry.Key).Order());
    }

    [Theory]
    [InlineData(Right.Admin, "harbour", null, WriteOutcome.NotFound)]
    [InlineData(Right.Read, "works", null, WriteOutcome.Forbidden)]
    [InlineData(Right.Finance, "works", null, WriteOutcome.Forbidden)]
    [InlineData(Right.Submit, "works", null, WriteOutcome.Forbidden)]
    [InlineData(Right.Manage, "works", "quay", WriteOutcome.Forbidden)]
    [InlineData(Right.Manage, "works", "lock", WriteOutcome.Accepted)]
    [InlineData(Right.Manage, "works", null, WriteOutcome.Accepted)]
    public async Task Writes_need_the_right_on_every_part_they_change(Right right, string portfolio, string? project, WriteOutcome expected)
    {
        var (store, _) = await WithRunAsync();
        await using var __ = store;
        var caller = await store.CallerAsync(new Grant(right, portfolio, project is null ? null : [project]));
        var result = await store.Documents.WriteAsync(
            caller,
            new DocumentWrite { Portfolio = "works", Action = "project.put" },
            (_, _) => Task.FromResult<Proposal>(TestStore.Parts(("lock", "changed"))),
            TestStore.Cancellation);
        Assert.Equal(expected, result.Outcome);
        Assert.Equal(expected == WriteOutcome.Accepted ? 2 : 1, await store.CountAsync("revision"));
        var entry = (await store.Audit.ListAsync(Caller.System, null, 1, TestStore.Cancellation))[0];
        Assert.Equal(expected == WriteOutcome.Accepted, entry.Actor == caller.KeyId);
    }

    [Theory]
    [InlineData(Right.Manage, "*", WriteOutcome.Forbidden)]
    [InlineData(Right.Admin, "new", WriteOutcome.Accepted)]
    [InlineData(Right.Admin, "works", WriteOutcome.NotFound)]
    public async Task Only_administrators_make_portfolios(Right right, string portfolio, WriteOutcome expected)
    {
        await using var store = await TestStore.OpenAsync(kind);
        var caller = await store.CallerAsync(new Grant(right, portfolio));
        var result = await store.Documents.WriteAsync(
            caller,
            new DocumentWrite { Portfolio = "new", Action = "document.put" },
            (_, _) => Task.FromResult<Proposal>(TestStore.Parts(("", "s"))),
            TestStore.Cancellation);
        Assert.Equal(expected, result.Outcome);
    }

    [Theory]
    [InlineData(Right.Admin, "harbour", RunRequestOutcome.NotFound, RunCancelOutcome.NotFound, SchedulePutOutcome.NotFound)]
    [InlineData(Right.Read, "works", RunRequestOutcome.Forbidden, RunCancelOutcome.Forbidden, SchedulePutOutcome.Forbidden)]
    [InlineData(Right.Submit, "works", RunRequestOutcome.Forbidden, RunCancelOutcome.Forbidden, SchedulePutOutcome.Forbidden)]
    [InlineData(Right.Manage, "works", RunRequestOutcome.Created, RunCancelOutcome.AlreadyEnded, SchedulePutOutcome.Stored)]
    public async Task Runs_and_schedules_need_the_right_to_manage(
        Right right, string portfolio, RunRequestOutcome asked, RunCancelOutcome stopped, SchedulePutOutcome put)
    {
        var (store, run) = await WithRunAsync();
        await using var _ = store;
        var caller = await store.CallerAsync(new Grant(right, portfolio));
        Assert.Equal(
            asked, (await store.Requests.CreateAsync(caller, RunScenes.Asked(RunScenes.Today), null, TestStore.Cancellation)).Outcome);
        Assert.Equal(stopped, (await store.Requests.RequestCancelAsync(caller, "works", run, null, TestStore.Cancellation)).Outcome);
        Assert.Equal(put, (await store.Schedules.PutAsync(caller, "works", "0 3 * * *", 500, false, null, TestStore.Cancellation)).Outcome);
        Assert.Null(await store.Claims.ClaimAsync(caller, "w", "1.0", RunScenes.Lease, TestStore.Cancellation));
    }
}
