using Portfolio.Server.Tests.Hosting;

namespace Portfolio.Server.Tests.Runs;

/// <summary>One run stands for a date. The portfolio's dates end at midnight in Auckland, 13 hours before UTC in January.</summary>
public sealed class ClosedDateTests
{
    private const string Quick = "\"iterations\":10,\"recorded\":true";

    [Fact]
    public async Task TheLastRunCreatedBeforeTheDateEndedStandsForIt()
    {
        await using var server = new PortfolioServer();
        var client = await StartAsync(server);
        // 2027-01-04T12:00Z is 01:00 on the 5th there.
        var first = await client.SucceedAsync("p", $$"""{ {{Quick}} }""");
        Assert.Equal("2027-01-05", first.Text("asOf"));
        server.Clock.Advance(TimeSpan.FromHours(22));
        var second = await client.SucceedAsync("p", $$"""{ {{Quick}} }""");
        Assert.Equal("2027-01-05", second.Text("asOf"));
        Assert.Equal(second.Text("id"), await LatestAsync(client));

        server.Clock.Advance(TimeSpan.FromHours(1));
        await (await client.PostRunAsync("p", $$"""{ {{Quick}}, "asOf":"2027-01-05" }""")).ProblemAsync(409, "date-closed");
        var unrecorded = await client.SucceedAsync("p", """{"iterations":10,"asOf":"2027-01-05"}""");
        Assert.False(unrecorded.GetProperty("recorded").GetBoolean());
        Assert.Equal(second.Text("id"), await LatestAsync(client));
    }

    [Fact]
    public async Task AClosedDateWithoutARunTakesTheFirstOneAndThenHoldsIt()
    {
        await using var server = new PortfolioServer();
        var client = await StartAsync(server);
        var history = await client.RunAsync("p", $$"""{ {{Quick}}, "asOf":"2026-11-30" }""");
        // Accepted first, it holds the date whether it has ended yet or not.
        await (await client.PostRunAsync("p", $$"""{ {{Quick}}, "asOf":"2026-11-30" }""")).ProblemAsync(409, "date-closed");
        await client.UntilAsync("p", history, "succeeded");
        await (await client.PostRunAsync("p", $$"""{ {{Quick}}, "asOf":"2026-11-30" }""")).ProblemAsync(409, "date-closed");
        Assert.Equal(history, await LatestAsync(client));
    }

    [Fact]
    public async Task ARunOfAClosedDateIsReplacedByName()
    {
        await using var server = new PortfolioServer();
        var client = await StartAsync(server);
        var old = await client.SucceedAsync("p", $$"""{ {{Quick}}, "asOf":"2026-11-30" }""");
        var other = await client.SucceedAsync("p", $$"""{ {{Quick}}, "asOf":"2026-11-23" }""");
        await (await client.PostRunAsync("p", $$"""{ {{Quick}}, "asOf":"2026-11-30", "replaces":"{{other.Text("id")}}" }""")).ProblemAsync(422, "refused");
        var replacing = await client.SucceedAsync("p", $$"""{ {{Quick}}, "asOf":"2026-11-30", "replaces":"{{old.Text("id")}}" }""");
        Assert.Equal((replacing.Text("id"), old.Text("id")), (await LatestAsync(client), replacing.Text("replaces")));
        Assert.Equal("succeeded", (await client.ReadRunAsync("p", old.Text("id"))).State());
        await (await client.PostRunAsync("p", $$"""{ {{Quick}}, "asOf":"2026-11-30", "replaces":"{{old.Text("id")}}" }""")).ProblemAsync(409, "not-the-point");
    }

    [Fact]
    public async Task AnotherDateFindsTheNearestEarlierPoint()
    {
        await using var server = new PortfolioServer();
        var client = await StartAsync(server);
        var run = await client.SucceedAsync("p", $$"""{ {{Quick}}, "asOf":"2026-11-23" }""");
        await client.SucceedAsync("p", $$"""{ {{Quick}}, "asOf":"2026-11-30" }""");
        Assert.Equal(run.Text("id"), (await client.ReadRunAsync("p", "latest?asOf=2026-11-29")).Text("id"));
        await (await client.ReadAsync("/v1/portfolios/p/runs/latest?asOf=2026-11-22")).ProblemAsync(404, "not-found");
    }

    private static async Task<HttpClient> StartAsync(PortfolioServer server)
    {
        var client = server.Client();
        await client.PutJsonAsync("/v1/portfolios/p/document", RunSamples.Uncertain(timeZone: "Pacific/Auckland"));
        return client;
    }

    private static async Task<string> LatestAsync(HttpClient client) => (await client.ReadRunAsync("p", "latest")).Text("id");
}
