using System.Net;
using Microsoft.Extensions.DependencyInjection;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Store.Access;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Tests.Runs;

public sealed class RunEndpointTests(ServerFixture fixture) : IClassFixture<ServerFixture>
{
    private readonly HttpClient client = fixture.Server.Client();

    [Fact]
    public async Task WhyARunFailedIsToldToThoseWhoReadTheWholePortfolio()
    {
        await using var server = new PortfolioServer(null, ("Roles", "api"));
        var manager = server.Client();
        await manager.PutJsonAsync("/v1/portfolios/p/document", Samples.Document());
        var run = await manager.RunAsync("p");
        var held = await server.Services.GetRequiredService<RunClaims>().ClaimAsync(
            Caller.System, "test", "2", TimeSpan.FromMinutes(1), TestContext.Current.CancellationToken);
        await server.Services.GetRequiredService<RunEndings>().FailAsync(
            held!, "The work of quay cannot be simulated.", TestContext.Current.CancellationToken);
        Assert.Equal("The work of quay cannot be simulated.", (await manager.ReadRunAsync("p", run)).Text("error"));
        var reader = await server.ClientAsync(new Grant(Right.Read, "p", ["weir-lock"]));
        Assert.Equal(
            ("failed", "The run failed; who reads the whole portfolio is told why."),
            ((await reader.ReadRunAsync("p", run)).State(), (await reader.ReadRunAsync("p", run)).Text("error")));
    }

    [Fact]
    public async Task ARunIsTakenWorkedAndShown()
    {
        await client.PutJsonAsync("/v1/portfolios/shown/document", Samples.Document());
        var taken = await client.PostRunAsync("shown", "");
        var queued = await taken.JsonAsync();
        var id = queued.Text("id");
        Assert.Equal((HttpStatusCode.Accepted, $"/v1/portfolios/shown/runs/{id}"), (taken.StatusCode, taken.Headers.Location?.ToString()));
        Assert.Equal(TimeSpan.FromSeconds(1), taken.Headers.RetryAfter?.Delta);
        Assert.Equal(
            ("queued", "2027-01-04", "request", 1, 10_000, 1, true),
            (queued.State(), queued.Text("asOf"), queued.Text("trigger"), queued.GetProperty("revision").GetInt32(), queued.GetProperty("iterations").GetInt32(),
                queued.GetProperty("seed").GetInt32(), queued.GetProperty("recorded").GetBoolean()));

        var done = await client.UntilAsync("shown", id, "succeeded");
        Assert.Equal((1, 1), (done.GetProperty("progress").GetInt32(), done.GetProperty("attempt").GetInt32()));
        Assert.Equal((64, 64), (done.Text("resultDigest").Length, done.Text("inputsDigest").Length));
        Assert.NotEqual(0, done.GetProperty("warnings").GetArrayLength());
        Assert.False(done.TryGetProperty("error", out _));

        var latest = await client.ReadAsync("/v1/portfolios/shown/runs/latest");
        Assert.Equal($"/v1/portfolios/shown/runs/{id}", latest.Content.Headers.ContentLocation?.ToString());
        Assert.Equal(id, (await latest.JsonAsync()).Text("id"));
    }

    [Fact]
    public async Task EqualInputsGiveEqualDigests()
    {
        await client.PutJsonAsync("/v1/portfolios/equal/document", RunSamples.Uncertain());
        var first = await client.SucceedAsync("equal");
        var second = await client.SucceedAsync("equal");
        var other = await client.SucceedAsync("equal", """{"seed":2}""");
        Assert.Equal((first.Text("resultDigest"), first.Text("inputsDigest")), (second.Text("resultDigest"), second.Text("inputsDigest")));
        Assert.NotEqual(first.Text("resultDigest"), other.Text("resultDigest"));
        Assert.False(other.GetProperty("recorded").GetBoolean());
        Assert.Equal(second.Text("id"), (await client.ReadRunAsync("equal", "latest")).Text("id"));
    }

    [Fact]
    public async Task RunsAreListedNewestFirstInPages()
    {
        await client.PutJsonAsync("/v1/portfolios/listed/document", Samples.Document());
        var ids = new List<string>();
        for (var i = 0; i < 3; i++)
            ids.Insert(0, await client.RunAsync("listed", """{"iterations":10}"""));
        var page = await client.ReadAsync("/v1/portfolios/listed/runs?limit=2");
        var json = await page.JsonAsync();
        Assert.Equal(ids.Take(2), json.GetProperty("items").EnumerateArray().Select(run => run.Text("id")));
        Assert.Contains("rel=\"next\"", Assert.Single(page.Headers.GetValues("Link")), StringComparison.Ordinal);
        var rest = await (await client.ReadAsync($"/v1/portfolios/listed/runs?limit=2&cursor={json.Text("next")}")).JsonAsync();
        Assert.Equal(ids.Skip(2), rest.GetProperty("items").EnumerateArray().Select(run => run.Text("id")));
        await (await client.ReadAsync("/v1/portfolios/listed/runs/latest")).ProblemAsync(404, "not-found");
    }

    [Fact]
    public async Task ProgressIsToldUntilTheEnd()
    {
        await client.PutJsonAsync("/v1/portfolios/told/document", RunSamples.Uncertain());
        var run = await client.RunAsync("told", """{"iterations":100000}""");
        var stream = await client.ReadAsync($"/v1/portfolios/told/runs/{run}/progress");
        Assert.Equal("text/event-stream", stream.Content.Headers.ContentType?.MediaType);
        var events = (await stream.TextAsync()).Split("\n\n", StringSplitOptions.RemoveEmptyEntries);
        Assert.Equal($$"""event: ended{{'\n'}}data: {"id":"{{run}}","state":"succeeded","progress":1}""", events[^1]);
        Assert.All(events[..^1], told => Assert.StartsWith("event: progress\n", told, StringComparison.Ordinal));
    }

    [Theory]
    [InlineData("""{"iterations":9}""", "/iterations", "number.range")]
    [InlineData("""{"iterations":1000001}""", "/iterations", "number.range")]
    [InlineData("""{"iterations":12.5}""", "/iterations", "number.not-whole")]
    [InlineData("""{"seed":-1}""", "/seed", "number.range")]
    [InlineData("""{"seed":9007199254740992}""", "/seed", "number.range")]
    [InlineData("""{"seed":2,"recorded":true}""", "/recorded", "run.recorded-seed")]
    [InlineData("""{"asOf":"2027-01-05"}""", "/asOf", "date.future")]
    [InlineData("""{"asOf":"5 January"}""", "/asOf", "date.format")]
    [InlineData("""{"revision":2}""", "/revision", "revision.unknown")]
    [InlineData("""{"revision":0}""", "/revision", "revision.unknown")]
    [InlineData("""{"replaces":"nothing"}""", "/replaces", "run.replaces-unknown")]
    [InlineData("""{"recorded":false,"replaces":"nothing"}""", "/replaces", "run.replaces-unrecorded")]
    public async Task WhatCannotBeRunIsRefused(string json, string path, string code)
    {
        await client.PutJsonAsync("/v1/portfolios/refused/document", Samples.Document());
        var problem = await (await client.PostRunAsync("refused", json)).ProblemAsync(422, "refused");
        Assert.Equal([(path, code)], problem.Faults());
    }

    [Theory]
    [InlineData("{ nothing }", "json.malformed")]
    [InlineData("{", "json.malformed")]
    [InlineData("{\"iterations\":", "json.malformed")]
    [InlineData("""{"iteration":10}""", "member.unknown")]
    [InlineData("""{"seed":1,"seed":1}""", "member.duplicate")]
    [InlineData("""{"seed":"1"}""", "member.kind")]
    public async Task WhatCannotBeReadIsRefusedWithItsPlace(string json, string code)
    {
        await client.PutJsonAsync("/v1/portfolios/refused/document", Samples.Document());
        Assert.Equal(code, Assert.Single((await (await client.PostRunAsync("refused", json)).ProblemAsync(400, "malformed")).Faults()).Code);
    }

    [Fact]
    public async Task APortfolioWithoutActivitiesCannotBeRun()
    {
        await client.PutJsonAsync("/v1/portfolios/empty/document", """{"settings":{"name":"Empty","currency":"EUR"},"projects":[{"id":"a","statusDate":"2027-01-04","activities":[]}]}""");
        var problem = await (await client.PostRunAsync("empty")).ProblemAsync(422, "refused");
        Assert.Equal([("", "run.nothing")], problem.Faults());
    }

    [Fact]
    public async Task RunsNeedTheirRights()
    {
        await client.PutJsonAsync("/v1/portfolios/rights/document", Samples.Document());
        var run = await client.RunAsync("rights");
        var reader = await fixture.Server.ClientAsync(new Grant(Right.Read, "rights"));
        var stranger = await fixture.Server.ClientAsync(new Grant(Right.Manage, "another"));
        var part = await fixture.Server.ClientAsync(new Grant(Right.Manage, "rights", ["weir"]));
        Assert.Equal(run, (await reader.ReadRunAsync("rights", run)).Text("id"));
        await (await reader.PostRunAsync("rights")).ProblemAsync(403, "forbidden");
        await (await reader.DeleteAsync($"/v1/portfolios/rights/runs/{run}", TestContext.Current.CancellationToken)).ProblemAsync(403, "forbidden");
        await (await part.PostRunAsync("rights")).ProblemAsync(403, "forbidden");
        await (await stranger.PostRunAsync("rights")).ProblemAsync(404, "not-found");
        await (await stranger.ReadAsync($"/v1/portfolios/rights/runs/{run}")).ProblemAsync(404, "not-found");
        await (await client.ReadAsync("/v1/portfolios/rights/runs/nothing")).ProblemAsync(404, "not-found");
    }
}
