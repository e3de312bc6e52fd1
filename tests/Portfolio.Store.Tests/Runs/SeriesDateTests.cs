using Portfolio.Store.Access;
using Portfolio.Store.Runs;
using Portfolio.Store.Tests.Testing;

namespace Portfolio.Store.Tests.Runs;

/// <summary>Contract section 5, "One run stands for a date".</summary>
public abstract class SeriesDateTests(StoreKind kind)
{
    public sealed class OnSqlite() : SeriesDateTests(StoreKind.Sqlite);

    public sealed class OnPostgres() : SeriesDateTests(StoreKind.Postgres);

    private static readonly DateOnly Today = RunScenes.Today;
    private static readonly DateOnly LastWeek = RunScenes.Today.AddDays(-7);

    private async Task<TestStore> OpenAsync()
    {
        var store = await TestStore.OpenAsync(kind);
        await store.WriteAsync("works", ("", "s"));
        return store;
    }

    private static async Task<string?> PointAsync(TestStore store, DateOnly date) =>
        (await store.Runs.FindPointAsync(Caller.System, "works", date, TestStore.Cancellation))?.Id;

    private static async Task<RunRequestOutcome> AskAsync(TestStore store, NewRun run) =>
        (await store.Requests.CreateAsync(Caller.System, run, null, TestStore.Cancellation)).Outcome;

    [Fact]
    public async Task While_the_date_lasts_the_last_one_created_stands_whatever_the_order_of_finishing()
    {
        await using var store = await OpenAsync();
        var first = await store.QueueAsync(RunScenes.Asked(Today));
        var second = await store.QueueAsync(RunScenes.Asked(Today));
        var held = (await store.ClaimAsync())!;
        Assert.Equal(first.Id, held.Run.Id);
        Assert.Equal(second.Id, (await store.WorkAsync()).Run.Id);
        Assert.Equal(second.Id, await PointAsync(store, Today));
        await store.Endings.SucceedAsync(held, RunScenes.Result("r"), TestStore.Cancellation);
        Assert.Equal(second.Id, await PointAsync(store, Today));

        var third = await store.QueueAsync(RunScenes.Asked(Today));
        store.Clock.Advance(TimeSpan.FromHours(20));
        await store.WorkAsync();
        Assert.Equal(third.Id, await PointAsync(store, Today));
    }

    [Fact]
    public async Task A_run_that_is_not_recorded_never_stands_and_is_never_refused()
    {
        await using var store = await OpenAsync();
        await store.QueueAsync(RunScenes.Asked(LastWeek));
        await store.WorkAsync();
        var aside = await store.QueueAsync(RunScenes.Asked(LastWeek, recorded: false));
        await store.WorkAsync();
        Assert.NotEqual(aside.Id, await PointAsync(store, LastWeek));
        Assert.False((await store.FindAsync(aside.Id)).Represents);
    }

    [Fact]
    public async Task A_closed_date_takes_the_first_run_and_refuses_the_next()
    {
        await using var store = await OpenAsync();
        var first = await store.QueueAsync(RunScenes.Asked(LastWeek));
        var early = await store.Requests.CreateAsync(Caller.System, RunScenes.Asked(LastWeek), null, TestStore.Cancellation);
        Assert.Equal((RunRequestOutcome.DateHeld, first.Id), (early.Outcome, early.Run!.Id));
        await store.WorkAsync();
        Assert.Equal(first.Id, await PointAsync(store, LastWeek));
        Assert.Equal(RunRequestOutcome.DateHeld, await AskAsync(store, RunScenes.Asked(LastWeek)));
        Assert.Equal(1, await store.CountAsync("run"));
    }

    [Fact]
    public async Task A_run_that_failed_gives_the_date_back()
    {
        await using var store = await OpenAsync();
        await store.QueueAsync(RunScenes.Asked(LastWeek));
        await store.Endings.FailAsync((await store.ClaimAsync())!, "x", TestStore.Cancellation);
        var second = await store.QueueAsync(RunScenes.Asked(LastWeek));
        await store.WorkAsync();
        Assert.Equal(second.Id, await PointAsync(store, LastWeek));
    }

    [Fact]
    public async Task A_run_created_in_time_holds_the_date_after_its_end()
    {
        await using var store = await OpenAsync();
        var first = await store.QueueAsync(RunScenes.Asked(Today));
        store.Clock.Advance(TimeSpan.FromHours(16));
        var late = await store.Requests.CreateAsync(Caller.System, RunScenes.Asked(Today), null, TestStore.Cancellation);
        Assert.Equal((RunRequestOutcome.DateHeld, first.Id), (late.Outcome, late.Run!.Id));
    }

    [Fact]
    public async Task The_last_instant_of_a_date_is_before_its_end()
    {
        await using var store = await OpenAsync();
        await store.QueueAsync(RunScenes.Asked(Today));
        store.Clock.Advance(TimeSpan.FromHours(16) - TimeSpan.FromMicroseconds(1));
        Assert.Equal(RunRequestOutcome.Created, await AskAsync(store, RunScenes.Asked(Today)));
        store.Clock.Advance(TimeSpan.FromMicroseconds(1));
        Assert.Equal(RunRequestOutcome.DateHeld, await AskAsync(store, RunScenes.Asked(Today)));
    }

    [Fact]
    public async Task A_replacement_takes_the_place_when_it_succeeds_and_the_old_run_stays_readable()
    {
        await using var store = await OpenAsync();
        var old = await store.QueueAsync(RunScenes.Asked(LastWeek));
        await store.WorkAsync();
        var replacement = await store.QueueAsync(RunScenes.Asked(LastWeek, replaces: old.Id));
        Assert.Equal(old.Id, await PointAsync(store, LastWeek));
        Assert.Equal(RunRequestOutcome.DateHeld, await AskAsync(store, RunScenes.Asked(LastWeek, replaces: old.Id)));
        await store.WorkAsync();
        Assert.Equal(replacement.Id, await PointAsync(store, LastWeek));
        Assert.Equal((RunState.Succeeded, false), ((await store.FindAsync(old.Id)).State, (await store.FindAsync(old.Id)).Represents));
        Assert.Equal(RunRequestOutcome.ReplacesNotThePoint, await AskAsync(store, RunScenes.Asked(LastWeek, replaces: old.Id)));
        var entry = (await store.Audit.ListAsync(Caller.System, null, 1, TestStore.Cancellation))[0];
        Assert.Contains($"\"replaces\":\"{old.Id}\"", entry.Detail, StringComparison.Ordinal);
    }

    [Fact]
    public async Task Only_a_recorded_run_of_the_same_portfolio_and_date_can_be_replaced()
    {
        await using var store = await OpenAsync();
        await store.WriteAsync("harbour", ("", "s"));
        var old = await store.QueueAsync(RunScenes.Asked(LastWeek));
        await store.WorkAsync();
        var foreign = await store.QueueAsync(RunScenes.Asked(LastWeek, "harbour"));
        await store.WorkAsync();
        var aside = await store.QueueAsync(RunScenes.Asked(LastWeek, recorded: false));
        Assert.Equal(RunRequestOutcome.ReplacesUnknown, await AskAsync(store, RunScenes.Asked(LastWeek, replaces: foreign.Id)));
        Assert.Equal(RunRequestOutcome.ReplacesUnknown, await AskAsync(store, RunScenes.Asked(LastWeek, replaces: aside.Id)));
        Assert.Equal(RunRequestOutcome.ReplacesUnknown, await AskAsync(store, RunScenes.Asked(Today, replaces: old.Id)));
        Assert.Equal(
            RunRequestOutcome.ReplacesUnknown, await AskAsync(store, RunScenes.Asked(LastWeek, recorded: false, replaces: old.Id)));
        Assert.Equal(RunRequestOutcome.ReplacesUnknown, await AskAsync(store, RunScenes.Asked(LastWeek, replaces: "nothing")));
    }

    [Fact]
    public async Task Points_are_found_by_date_or_the_nearest_earlier_one()
    {
        await using var store = await OpenAsync();
        var newer = await store.QueueAsync(RunScenes.Asked(Today));
        await store.WorkAsync();
        var older = await store.QueueAsync(RunScenes.Asked(LastWeek));
        await store.WorkAsync();
        Assert.Equal(newer.Id, (await store.Runs.FindLatestAsync(Caller.System, "works", TestStore.Cancellation))!.Id);
        Assert.Equal(older.Id, await PointAsync(store, Today.AddDays(-1)));
        Assert.Null(await PointAsync(store, LastWeek.AddDays(-1)));
        var points = await store.Runs.ListPointsAsync(Caller.System, "works", LastWeek, Today, TestStore.Cancellation);
        Assert.Equal([older.Id, newer.Id], points.Select(run => run.Id));
        Assert.Empty(
            await store.Runs.ListPointsAsync(Caller.System, "works", LastWeek.AddDays(1), Today.AddDays(-1), TestStore.Cancellation));
    }

    [Fact]
    public async Task A_due_date_makes_one_run_however_often_it_is_asked_for()
    {
        await using var store = await OpenAsync();
        var answers = await Task.WhenAll(Enumerable.Range(0, 5).Select(_ => Task.Run(
            () => store.Requests.CreateDueAsync(Caller.System, RunScenes.Asked(Today), Today, TestStore.Cancellation))));
        Assert.Single(answers, answer => answer.Outcome == RunRequestOutcome.Created);
        Assert.Single(answers.Select(answer => answer.Run!.Id).Distinct());
        var due = Assert.Single(await store.Runs.ListDueAsync(Caller.System, "works", 5, TestStore.Cancellation));
        Assert.Equal((RunKind.Nightly, Today, true), (due.Kind, due.DueDate!.Value, due.Recorded));
    }

    [Fact]
    public async Task A_due_date_caught_up_late_fills_a_gap_but_takes_nobodys_place()
    {
        await using var store = await OpenAsync();
        var filling = (await store.Requests.CreateDueAsync(Caller.System, RunScenes.Asked(LastWeek), LastWeek, TestStore.Cancellation)).Run!;
        await store.WorkAsync();
        Assert.Equal(filling.Id, await PointAsync(store, LastWeek));

        var held = await store.QueueAsync(RunScenes.Asked(LastWeek.AddDays(1)));
        var date = LastWeek.AddDays(1);
        var late = (await store.Requests.CreateDueAsync(Caller.System, RunScenes.Asked(date), date, TestStore.Cancellation)).Run!;
        Assert.False(late.Recorded);
        await store.WorkAsync();
        await store.WorkAsync();
        Assert.Equal(held.Id, await PointAsync(store, date));
    }

    [Theory]
    [InlineData("works", 2)]
    [InlineData("nowhere", 1)]
    public async Task A_run_needs_a_revision_that_exists(string portfolio, long revision)
    {
        await using var store = await OpenAsync();
        Assert.Equal(RunRequestOutcome.NotFound, await AskAsync(store, RunScenes.Asked(Today, portfolio) with { Revision = revision }));
    }

    [Fact]
    public async Task An_archived_portfolio_is_not_run_and_joined_rows_stand_or_fall_with_the_request()
    {
        await using var store = await OpenAsync();
        await Assert.ThrowsAsync<IOException>(() => store.Requests.CreateAsync(
            Caller.System, RunScenes.Asked(Today), (_, _, _) => throw new IOException("no"), TestStore.Cancellation));
        Assert.Equal(0, await store.CountAsync("run"));
        await store.RawAsync<long>("update portfolio set archived_at = 1");
        Assert.Equal(RunRequestOutcome.Archived, await AskAsync(store, RunScenes.Asked(Today)));
    }
}
