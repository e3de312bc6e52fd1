using System.Net;
using Portfolio.Server.Tests.Hosting;

namespace Portfolio.Server.Tests.Runs;

public sealed class RunCancelTests
{
    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    [Fact]
    public async Task ARunningRunIsStoppedAndAnEndedOneIsNot()
    {
        await using var server = new PortfolioServer();
        var client = server.Client();
        await client.PutJsonAsync("/v1/portfolios/p/document", RunSamples.Uncertain(projects: 10, activities: 100));
        var run = await client.RunAsync("p", """{"iterations":1000000}""");
        await client.UntilAsync("p", run, "running");
        var waiting = await client.RunAsync("p");

        var accepted = await client.DeleteAsync($"/v1/portfolios/p/runs/{run}", Cancellation);
        Assert.Equal(HttpStatusCode.Accepted, accepted.StatusCode);
        var ended = await client.UntilAsync("p", run, "cancelled");
        Assert.False(ended.TryGetProperty("resultDigest", out _));
        await (await client.DeleteAsync($"/v1/portfolios/p/runs/{run}", Cancellation)).ProblemAsync(409, "run-ended");
        await client.UntilAsync("p", waiting, "succeeded");
        await (await client.DeleteAsync($"/v1/portfolios/p/runs/{waiting}", Cancellation)).ProblemAsync(409, "run-ended");
    }

    [Fact]
    public async Task AQueuedRunIsCancelledAtOnce()
    {
        await using var server = new PortfolioServer(null, ("Roles", "api"));
        var client = server.Client();
        await client.PutJsonAsync("/v1/portfolios/p/document", Samples.Document());
        var run = await client.RunAsync("p");
        var accepted = await client.DeleteAsync($"/v1/portfolios/p/runs/{run}", Cancellation);
        Assert.Equal((HttpStatusCode.Accepted, "cancelled"), (accepted.StatusCode, (await accepted.JsonAsync()).State()));
        await (await client.DeleteAsync($"/v1/portfolios/p/runs/{run}", Cancellation)).ProblemAsync(409, "run-ended");
        await (await client.DeleteAsync("/v1/portfolios/p/runs/nothing", Cancellation)).ProblemAsync(404, "not-found");
    }
}
