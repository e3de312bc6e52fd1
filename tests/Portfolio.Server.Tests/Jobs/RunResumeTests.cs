using Microsoft.Extensions.DependencyInjection;
using Portfolio.Engine;
using Portfolio.Server.Jobs;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Runs;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;
using Portfolio.Store.Runs;
using Portfolio.Store.Samples;

namespace Portfolio.Server.Tests.Jobs;

/// <summary>A worker that ends between two blocks, in good order or not. The server of these tests works nothing by itself.</summary>
public sealed class RunResumeTests : IAsyncLifetime
{
    private const string TwentyBlocks = """{"iterations":80000}""";
    private static readonly TimeSpan Lease = TimeSpan.FromSeconds(30);

    private readonly PortfolioServer server = new(null, ("Roles", "api"), ("Engine:Threads", "2"));
    private HttpClient client = null!;

    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    public async ValueTask InitializeAsync()
    {
        client = server.Client();
        await client.PutJsonAsync("/v1/portfolios/p/document", RunSamples.Uncertain());
    }

    public ValueTask DisposeAsync() => server.DisposeAsync();

    [Fact]
    public async Task AfterACrashOnlyMissingBlocksAreWorkedAndTheDigestIsThatOfAnUndisturbedRun()
    {
        var run = await client.RunAsync("p", TwentyBlocks);
        var held = await ClaimAsync();
        using var blocks = new BlockSpans(run);
        await CrashAfterAsync(2, held, blocks);
        var kept = blocks.Stored.ToList();
        blocks.Stored.Clear();
        Assert.Equal("running", (await client.ReadRunAsync("p", run)).State());

        // Nobody may take it before the lease has run out.
        await WorkAsync();
        Assert.Equal(1, (await client.ReadRunAsync("p", run)).GetProperty("attempt").GetInt32());
        server.Clock.Advance(Lease);
        await WorkAsync();
        var resumed = await client.UntilAsync("p", run, "succeeded");
        Assert.Equal(2, resumed.GetProperty("attempt").GetInt32());
        Assert.Equal(Enumerable.Range(0, 20), kept.Concat(blocks.Stored).Order());

        var undisturbed = await client.RunAsync("p", TwentyBlocks);
        await WorkAsync();
        Assert.Equal((await client.UntilAsync("p", undisturbed, "succeeded")).Text("resultDigest"), resumed.Text("resultDigest"));
    }

    [Fact]
    public async Task AWorkerToldToStopGivesTheRunBackWithItsBlocks()
    {
        var run = await client.RunAsync("p", TwentyBlocks);
        using var blocks = new BlockSpans(run);
        using var stopping = new CancellationTokenSource();
        blocks.After(3, stopping.Cancel);
        await server.Services.GetRequiredService<RunWorker>().WorkAsync(stopping.Token);
        var waiting = await client.ReadRunAsync("p", run);
        Assert.Equal("queued", waiting.State());
        Assert.InRange(waiting.GetProperty("progress").GetDouble(), 2 * 4096 / 80000.0, 0.9);
        await WorkAsync();
        await client.UntilAsync("p", run, "succeeded");
        Assert.Equal(Enumerable.Range(0, 20), blocks.Stored.Order());
    }

    [Fact]
    public async Task AWorkerWhoseRunWasTakenOverWritesNothingMore()
    {
        var run = await client.RunAsync("p", TwentyBlocks);
        var lost = await ClaimAsync();
        server.Clock.Advance(Lease);
        var held = await ClaimAsync();
        Assert.Equal(run, held.Run.Id);
        await Assert.ThrowsAsync<LeaseLost>(() => Attempt().WorkAsync(lost, Cancellation));
        Assert.Empty(await server.Services.GetRequiredService<SampleStore>().ListBlocksAsync(held, Cancellation));
    }

    [Fact]
    public async Task ARunThatNeverComesForwardIsGivenUp()
    {
        var run = await client.RunAsync("p", TwentyBlocks);
        for (var crash = 0; crash < 3; crash++)
        {
            await ClaimAsync();
            server.Clock.Advance(Lease);
        }
        await WorkAsync();
        var failed = await client.UntilAsync("p", run, "failed");
        Assert.Equal("The server stopped 3 times while it worked this run; it is not tried again.", failed.Text("error"));
    }

    private async Task CrashAfterAsync(int count, RunLease held, BlockSpans blocks)
    {
        using var crash = new CancellationTokenSource();
        blocks.After(count, crash.Cancel);
        await Assert.ThrowsAnyAsync<OperationCanceledException>(() => Attempt().WorkAsync(held, crash.Token));
    }

    private RunAttempt Attempt() =>
        new(server.Services.GetRequiredService<DocumentStore>(), server.Services.GetRequiredService<SampleStore>(), new RunProgress(), threads: 2);

    private async Task<RunLease> ClaimAsync() =>
        (await server.Services.GetRequiredService<RunClaims>().ClaimAsync(Caller.System, "a worker", Plan.EngineVersion, Lease, Cancellation))!;

    private Task WorkAsync() => server.Services.GetRequiredService<RunWorker>().WorkAsync(Cancellation);
}
