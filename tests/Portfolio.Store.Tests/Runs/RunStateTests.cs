using System.Data.Common;
using Portfolio.Store.Access;
using Portfolio.Store.Runs;
using Portfolio.Store.Tests.Testing;

namespace Portfolio.Store.Tests.Runs;

/// <summary>The table itself refuses states that cannot be, whatever code writes to it.</summary>
public abstract class RunStateTests(StoreKind kind)
{
    public sealed class OnSqlite() : RunStateTests(StoreKind.Sqlite);

    public sealed class OnPostgres() : RunStateTests(StoreKind.Postgres);

    private async Task<TestStore> WithRunAsync(bool claimed)
    {
        var store = await TestStore.OpenAsync(kind);
        await store.WriteAsync("works", ("", "s"), ("lock", "a"));
        await store.QueueAsync(RunScenes.Asked(RunScenes.Today));
        if (claimed)
            await store.ClaimAsync();
        return store;
    }

    [Theory]
    [InlineData("state = 'running'")]
    [InlineData("state = 'running', lease_until = 1, owner = 'w'")]
    [InlineData("state = 'succeeded', finished_at = 1")]
    [InlineData("state = 'failed', finished_at = 1, error = 'x'")]
    [InlineData("state = 'cancelled', finished_at = 1")]
    [InlineData("state = 'cancelled', cancel_requested = 1")]
    [InlineData("state = 'paused'")]
    [InlineData("finished_at = 1")]
    [InlineData("lease_until = 1, owner = 'w'")]
    [InlineData("attempt = 1")]
    [InlineData("fence = 1")]
    [InlineData("kind = 'nightly'")]
    [InlineData("due_date = '2026-12-01'")]
    [InlineData("recorded = 2")]
    [InlineData("overlay = @Bytes")]
    [InlineData("recorded = 0, replaces = id")]
    [InlineData("iterations = 0")]
    [InlineData("seed = -1")]
    [InlineData("revision = 2")]
    [InlineData("portfolio = 'harbour'")]
    [InlineData("requested_by = 'nobody'")]
    public async Task A_queued_run_cannot_become(string change)
    {
        await using var store = await WithRunAsync(claimed: false);
        var refused = await Assert.ThrowsAnyAsync<DbException>(
            () => store.RawAsync<long>($"update run set {change}", new { Bytes = new byte[] { 0 } }));
        Assert.True(store.Place.IsConstraint(refused), refused.Message);
    }

    [Theory]
    [InlineData("state = 'queued'")]
    [InlineData("owner = null")]
    [InlineData("started_at = null")]
    [InlineData("state = 'succeeded', owner = null, lease_until = null, finished_at = 1, inputs_digest = null, result_digest = null, warnings = '[]'")]
    [InlineData("state = 'failed', owner = null, lease_until = null, finished_at = 1")]
    [InlineData("state = 'cancelled', owner = null, lease_until = null, finished_at = 1")]
    [InlineData("error = 'x'")]
    [InlineData("warnings = '[]'")]
    [InlineData("result_digest = 'short'")]
    public async Task A_running_run_cannot_become(string change)
    {
        await using var store = await WithRunAsync(claimed: true);
        var refused = await Assert.ThrowsAnyAsync<DbException>(
            () => store.RawAsync<long>($"update run set {change}", new { Bytes = new byte[] { 0 } }));
        Assert.True(store.Place.IsConstraint(refused), refused.Message);
    }

    [Fact]
    public async Task A_run_tells_its_whole_life()
    {
        await using var store = await TestStore.OpenAsync(kind);
        await store.WriteAsync("works", ("", "s"), ("lock", "a"));
        var asked = RunScenes.Asked(RunScenes.Today) with { Seed = (1L << 53) - 1, TraceParent = "00-1-1-01" };
        var queued = await store.QueueAsync(asked);
        Assert.Equal((RunState.Queued, RunKind.Request, 1, 100, asked.Seed), (
            queued.State, queued.Kind, queued.Revision, queued.Iterations, queued.Seed));
        Assert.Equal((7, "system", "00-1-1-01"), (Guid.Parse(queued.Id).Version, queued.RequestedBy, queued.TraceParent));

        store.Clock.Advance(TimeSpan.FromMinutes(1));
        var held = (await store.ClaimAsync())!;
        Assert.Equal((RunState.Running, 1, 1, RunScenes.Engine), (held.Run.State, held.Run.Attempt, held.Fence, held.Run.EngineVersion));
        await store.Samples.WriteBlockAsync(held, 0, 60, RunScenes.Block(0), TestStore.Cancellation);
        Assert.Equal(60, (await store.FindAsync(queued.Id)).IterationsDone);

        store.Clock.Advance(TimeSpan.FromMinutes(1));
        Assert.True(await store.Endings.SucceedAsync(held, RunScenes.Result("r"), TestStore.Cancellation));
        var done = await store.FindAsync(queued.Id);
        Assert.Equal((RunState.Succeeded, true, RunScenes.Digest, "[]"), (done.State, done.Represents, done.ResultDigest, done.Warnings));
        Assert.Equal(
            (TestStore.Start, TestStore.Start.AddMinutes(1), TestStore.Start.AddMinutes(2)), (
                done.QueuedAt, done.StartedAt!.Value, done.FinishedAt!.Value));
        var events = await store.Outbox.ReadAfterAsync(Caller.System, "works", 1, 10, TestStore.Cancellation);
        Assert.Equal(["run.queued", "run.succeeded"], events.Select(told => told.Kind));
        Assert.Equal(["run.succeeded", "run.queued"], (await store.Audit.ListAsync(Caller.System, null, 2, TestStore.Cancellation)).Select(entry => entry.Action));
    }

    [Fact]
    public async Task A_failed_run_frees_its_samples_and_says_why()
    {
        await using var store = await WithRunAsync(claimed: false);
        var held = (await store.ClaimAsync())!;
        await store.Samples.WriteBlockAsync(held, 0, 60, RunScenes.Block(0), TestStore.Cancellation);
        Assert.True(await store.Endings.FailAsync(held, "The disk is full.", TestStore.Cancellation));
        var failed = await store.FindAsync(held.Run.Id);
        Assert.Equal(
            (RunState.Failed, "The disk is full.", false, 60), (failed.State, failed.Error, failed.Represents, failed.IterationsDone));
        Assert.Equal(0, await store.CountAsync("sample"));
        Assert.Null(await store.Runs.FindLatestAsync(Caller.System, "works", TestStore.Cancellation));
    }
}
