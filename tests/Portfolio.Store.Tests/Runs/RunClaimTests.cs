using Portfolio.Store.Access;
using Portfolio.Store.Runs;
using Portfolio.Store.Tests.Testing;

namespace Portfolio.Store.Tests.Runs;

public abstract class RunClaimTests(StoreKind kind)
{
    public sealed class OnSqlite() : RunClaimTests(StoreKind.Sqlite);

    public sealed class OnPostgres() : RunClaimTests(StoreKind.Postgres);

    private async Task<TestStore> WithRunsAsync(params string[] portfolios)
    {
        var store = await TestStore.OpenAsync(kind);
        foreach (var portfolio in portfolios.Distinct())
            await store.WriteAsync(portfolio, ("", "s"));
        foreach (var portfolio in portfolios)
            await store.QueueAsync(RunScenes.Asked(RunScenes.Today, portfolio));
        return store;
    }

    [Fact]
    public async Task Of_two_claims_at_once_one_wins()
    {
        await using var store = await WithRunsAsync("works");
        var claims = await Task.WhenAll(Enumerable.Range(0, 8).Select(_ => Task.Run(() => store.ClaimAsync())));
        Assert.Single(claims, claim => claim is not null);
    }

    [Fact]
    public async Task The_oldest_goes_first_and_no_portfolio_starves_behind_anothers_queue()
    {
        await using var store = await WithRunsAsync("works", "works", "works", "harbour", "harbour");
        var order = new List<(string, long)>();
        while (await store.ClaimAsync() is { } held)
        {
            order.Add((held.Run.Portfolio, held.Run.Sequence));
            store.Clock.Advance(TimeSpan.FromSeconds(1));
        }
        Assert.Equal([("works", 1), ("harbour", 4), ("works", 2), ("harbour", 5), ("works", 3)], order);
    }

    [Fact]
    public async Task A_lease_that_ran_out_is_claimed_again_before_anything_queued()
    {
        await using var store = await WithRunsAsync("works", "harbour");
        var first = (await store.ClaimAsync())!;
        store.Clock.Advance(RunScenes.Lease);
        var second = (await store.ClaimAsync())!;
        Assert.Equal((first.Run.Id, first.Fence + 1, 2), (second.Run.Id, second.Fence, second.Run.Attempt));
        Assert.Equal(first.Run.StartedAt, second.Run.StartedAt);
    }

    [Fact]
    public async Task A_lease_that_is_renewed_is_not_claimed()
    {
        await using var store = await WithRunsAsync("works");
        var held = (await store.ClaimAsync())!;
        store.Clock.Advance(RunScenes.Lease / 2);
        Assert.Equal(LeaseState.Held, await store.Claims.RenewAsync(held, RunScenes.Lease, TestStore.Cancellation));
        store.Clock.Advance(RunScenes.Lease * 0.75);
        Assert.Null(await store.ClaimAsync());
        store.Clock.Advance(RunScenes.Lease * 0.25);
        Assert.NotNull(await store.ClaimAsync());
    }

    [Fact]
    public async Task A_worker_with_a_stale_fence_writes_nothing()
    {
        await using var store = await WithRunsAsync("works");
        var stale = (await store.ClaimAsync())!;
        store.Clock.Advance(RunScenes.Lease);
        Assert.NotNull(await store.ClaimAsync());
        var before = await store.DumpAsync();
        Assert.Equal(LeaseState.Lost, await store.Claims.RenewAsync(stale, RunScenes.Lease, TestStore.Cancellation));
        Assert.False(await store.Samples.WriteBlockAsync(stale, 0, 3, RunScenes.Block(0), TestStore.Cancellation));
        Assert.False(await store.Endings.SucceedAsync(stale, RunScenes.Result("r"), TestStore.Cancellation));
        Assert.False(await store.Endings.FailAsync(stale, "x", TestStore.Cancellation));
        Assert.False(await store.Endings.CancelAsync(stale, TestStore.Cancellation));
        Assert.False(await store.Claims.ReleaseAsync(stale, TestStore.Cancellation));
        Assert.Equal(before, await store.DumpAsync());
    }

    [Fact]
    public async Task A_run_released_in_good_order_keeps_its_blocks_and_is_queued_again()
    {
        await using var store = await WithRunsAsync("works");
        var held = (await store.ClaimAsync())!;
        await store.Samples.WriteBlockAsync(held, 0, 3, RunScenes.Block(0), TestStore.Cancellation);
        Assert.True(await store.Claims.ReleaseAsync(held, TestStore.Cancellation));
        Assert.Equal(RunState.Queued, (await store.FindAsync(held.Run.Id)).State);
        var again = (await store.ClaimAsync())!;
        Assert.Equal([0], await store.Samples.ListBlocksAsync(again, TestStore.Cancellation));
    }

    [Fact]
    public async Task At_the_start_of_a_process_all_leases_end()
    {
        await using var store = await WithRunsAsync("works", "harbour");
        await store.ClaimAsync();
        await store.ClaimAsync();
        Assert.Null(await store.ClaimAsync());
        Assert.Equal(2, await store.Claims.ExpireAllAsync(Caller.System, TestStore.Cancellation));
        Assert.Equal(2, (await store.ClaimAsync())!.Run.Attempt);
    }

    [Fact]
    public async Task Blocks_of_another_engine_version_are_dropped()
    {
        await using var store = await WithRunsAsync("works");
        var held = (await store.ClaimAsync())!;
        await store.Samples.WriteBlockAsync(held, 0, 3, RunScenes.Block(0), TestStore.Cancellation);
        await store.Claims.ReleaseAsync(held, TestStore.Cancellation);
        var again = (await store.ClaimAsync("2.0"))!;
        Assert.Equal(("2.0", 0), (again.Run.EngineVersion, again.Run.IterationsDone));
        Assert.Empty(await store.Samples.ListBlocksAsync(again, TestStore.Cancellation));
    }

    [Fact]
    public async Task A_queued_run_is_cancelled_at_once_and_a_running_one_by_its_worker()
    {
        await using var store = await WithRunsAsync("works", "works");
        var held = (await store.ClaimAsync())!;
        var queued = (await store.Runs.ListAsync(Caller.System, "works", null, 1, TestStore.Cancellation))[0];

        var stopped = await store.Requests.RequestCancelAsync(Caller.System, "works", queued.Id, null, TestStore.Cancellation);
        Assert.Equal((RunCancelOutcome.Accepted, RunState.Cancelled), (stopped.Outcome, stopped.Run!.State));
        Assert.Null(await store.ClaimAsync());

        var asked = await store.Requests.RequestCancelAsync(Caller.System, "works", held.Run.Id, null, TestStore.Cancellation);
        Assert.Equal((RunCancelOutcome.Accepted, RunState.Running, true), (asked.Outcome, asked.Run!.State, asked.Run.CancelRequested));
        Assert.Equal(RunCancelOutcome.Accepted, (await store.Requests.RequestCancelAsync(Caller.System, "works", held.Run.Id, null, TestStore.Cancellation)).Outcome);
        Assert.Equal(LeaseState.CancelRequested, await store.Claims.RenewAsync(held, RunScenes.Lease, TestStore.Cancellation));
        Assert.True(await store.Endings.CancelAsync(held, TestStore.Cancellation));
        Assert.Equal(RunState.Cancelled, (await store.FindAsync(held.Run.Id)).State);
        var late = await store.Requests.RequestCancelAsync(Caller.System, "works", held.Run.Id, null, TestStore.Cancellation);
        Assert.Equal(RunCancelOutcome.AlreadyEnded, late.Outcome);
        Assert.Equal(
            ["run.queued", "run.queued", "run.cancelled", "run.cancel-requested", "run.cancelled"],
            (await store.Outbox.ReadAfterAsync(Caller.System, "works", 1, 10, TestStore.Cancellation)).Select(told => told.Kind));
    }

    [Fact]
    public async Task Waiting_runs_are_counted_and_lists_page_newest_first()
    {
        await using var store = await WithRunsAsync("works", "works", "harbour", "works");
        await store.ClaimAsync();
        Assert.Equal(3, await store.Runs.CountQueuedAsync(Caller.System, TestStore.Cancellation));
        var page = await store.Runs.ListAsync(Caller.System, "works", null, 2, TestStore.Cancellation);
        Assert.Equal([4, 2], page.Select(run => run.Sequence));
        Assert.Equal([1], (await store.Runs.ListAsync(Caller.System, "works", 2, 2, TestStore.Cancellation)).Select(run => run.Sequence));
    }
}
