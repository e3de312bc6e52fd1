using System.Net;
using System.Net.Http.Headers;
using System.Text.Json;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Store.Access;

namespace Portfolio.Server.Tests.Results;

public sealed class ResultEndpointTests(FinishedRunFixture fixture) : IClassFixture<FinishedRunFixture>
{
    private const string Base = "/v1/portfolios/works/runs/";

    private readonly HttpClient client = fixture.Server.Client();

    private string Results => $"{Base}{fixture.Run}/results";

    [Fact]
    public async Task TheListHasOneRowForEachScopeInOrderAndTheCautionsOnce()
    {
        var list = await (await client.ReadAsync(Results)).JsonAsync();
        string[] scopes =
            ["portfolio", "programme/locks", "programme/harbour", "project/weir", "project/quay", "project/pumps", "milestone/weir/M", "milestone/quay/S"];
        Assert.Equal(scopes, Scopes(list));
        Assert.False(list.TryGetProperty("next", out _));
        Assert.Contains("covers.entered-only", list.GetProperty("warnings").EnumerateArray().Select(warning => warning.GetProperty("code").GetString()));
        var row = list.GetProperty("items")[3];
        Assert.Equal(fixture.Run, row.GetProperty("run").GetString());
        Assert.Equal("2027-01-03", row.GetProperty("asOf").GetString());
        Assert.Equal([50, 80, 82.5m], Levels(row.GetProperty("finish")));
        Assert.Equal(120000, row.GetProperty("joint").GetProperty("budget").GetDecimal());
    }

    [Fact]
    public async Task PagesFollowTheLink()
    {
        var seen = new List<string>();
        for (var address = $"{Results}?limit=3"; address is not null;)
        {
            var response = await client.ReadAsync(address);
            var page = await response.JsonAsync();
            seen.AddRange(Scopes(page));
            var link = response.Headers.TryGetValues("Link", out var links) ? links.Single() : null;
            Assert.Equal(page.TryGetProperty("next", out _), link is not null);
            address = link?[1..link.IndexOf('>', StringComparison.Ordinal)];
        }
        Assert.Equal(Scopes(await (await client.ReadAsync(Results)).JsonAsync()), seen);
    }

    [Theory]
    [InlineData("portfolio", 0)]
    [InlineData("programme/locks", 1)]
    [InlineData("project/weir", 3)]
    [InlineData("milestone/quay/S", 7)]
    public async Task EachScopeHasAnAddressOfItsOwn(string scope, int place)
    {
        var row = await (await client.ReadAsync($"{Results}/{scope}")).JsonAsync();
        var listed = (await (await client.ReadAsync(Results)).JsonAsync()).GetProperty("items")[place];
        foreach (var member in listed.EnumerateObject()) Assert.True(JsonElement.DeepEquals(member.Value, row.GetProperty(member.Name)), member.Name);
        Assert.NotEqual(0, row.GetProperty("warnings").GetArrayLength());
    }

    [Theory]
    [InlineData("latest", "latest")]
    [InlineData("latest?asOf=2027-01-03", "the run of the date")]
    [InlineData("latest?asOf=2027-02-01", "the nearest earlier one")]
    public async Task TheLatestRunIsNamed(string asked, string _)
    {
        var (run, query) = asked.Split('?') is [var name, var rest] ? (name, "?" + rest) : (asked, "");
        var response = await client.ReadAsync($"{Base}{run}/results/portfolio{query}");
        Assert.Equal(fixture.Run, (await response.JsonAsync()).GetProperty("run").GetString());
        Assert.Equal($"{Results}/portfolio", response.Content.Headers.ContentLocation!.OriginalString);
    }

    [Theory]
    [InlineData("latest/results/portfolio?asOf=2027-01-02")]
    [InlineData("0190a6f0-0000-7000-8000-00000000ffff/results")]
    [InlineData("latest/results/programme/none")]
    [InlineData("latest/results/project/plans")] // without activities
    [InlineData("latest/results/milestone/weir/A")]
    [InlineData("latest/distribution?scope=project/none")]
    public async Task WhatIsNotThereIs404(string address) => await (await client.ReadAsync(Base + address)).ProblemAsync(404, "not-found");

    [Fact]
    public async Task AQueuedRunHasNoResultsYet()
    {
        await using var server = FinishedRuns.Server();
        await FinishedRuns.PutAsync(server, "works");
        var run = await FinishedRuns.QueueAsync(server, "works", new(2027, 1, 3));
        var problem = await (await server.Client().ReadAsync($"{Base}{run}/results")).ProblemAsync(409, "run-without-results");
        Assert.Contains("queue", problem.GetProperty("detail").GetString(), StringComparison.Ordinal);
        await (await server.Client().ReadAsync($"{Base}latest/results")).ProblemAsync(404, "not-found");
    }

    [Theory]
    [InlineData("5,10,99.5")]
    [InlineData("99.5,33.25")] // 33.25 is in no grid: it is read from the iterations
    public async Task AnyLevelsCanBeAskedFor(string levels)
    {
        var asked = levels.Split(',').Select(level => decimal.Parse(level, System.Globalization.CultureInfo.InvariantCulture)).ToArray();
        foreach (var scope in new[] { "portfolio", "programme/locks", "project/weir", "milestone/quay/S" })
        {
            var row = await (await client.ReadAsync($"{Results}/{scope}?levels={levels}")).JsonAsync();
            Assert.Equal(asked, Levels(row.GetProperty("finish")));
            if (row.TryGetProperty("cost", out var cost)) Assert.Equal(asked, Levels(cost));
        }
        var list = await (await client.ReadAsync($"{Results}?levels={levels}")).JsonAsync();
        Assert.All(list.GetProperty("items").EnumerateArray(), row => Assert.Equal(asked, Levels(row.GetProperty("finish"))));
    }

    [Fact]
    public async Task ALevelBetweenKeptOnesLiesBetweenThem()
    {
        var cost = (await (await client.ReadAsync($"{Results}/portfolio?levels=33,33.25,34")).JsonAsync()).GetProperty("cost").GetProperty("percentiles");
        var values = cost.EnumerateArray().Select(at => at.GetProperty("value").GetDecimal()).ToArray();
        Assert.True(values[0] < values[1] && values[1] < values[2], string.Join(' ', values));
    }

    [Theory]
    [InlineData("results?levels=0", "levels")]
    [InlineData("results?levels=100", "levels")]
    [InlineData("results?levels=80,x", "levels")]
    [InlineData("results?levels=1.2345678", "levels")]
    [InlineData("results/portfolio?levels=", "levels")]
    [InlineData("results?limit=1001", "limit")]
    [InlineData("results?cursor=x", "cursor")]
    [InlineData("results?asOf=2027-13-01", "asOf")]
    [InlineData("results?format=xml", "format")]
    [InlineData("distribution?scope=portfolio/x", "scope")]
    [InlineData("distribution?metric=contingency", "metric")]
    [InlineData("distribution?metric=cost&scope=milestone/weir/M", "metric")]
    [InlineData("distribution?bin=year", "bin")]
    [InlineData("distribution?metric=cost&bin=1001", "bin")]
    public async Task AFaultNamesItsParameter(string address, string parameter)
    {
        var problem = await (await client.ReadAsync($"{Base}latest/{address}")).ProblemAsync(422, "refused");
        Assert.Equal(parameter, Assert.Single(problem.GetProperty("errors").EnumerateArray()).GetProperty("subject").GetString());
    }

    [Fact]
    public async Task AllFaultsAreNamedAtOnce()
    {
        var tooMany = string.Join(',', Enumerable.Range(1, 100));
        var problem = await (await client.ReadAsync($"{Results}?levels={tooMany}&limit=0&asOf=2027-01-03")).ProblemAsync(422, "refused");
        Assert.Equal(["levels", "limit", "asOf"], problem.GetProperty("errors").EnumerateArray().Select(fault => fault.GetProperty("subject").GetString()));
    }

    [Fact]
    public async Task ResultsAreNotSentTwice()
    {
        var tag = (await client.ReadAsync(Results)).Tag()!;
        var again = await client.ReadAsync($"{Base}latest/results", tag);
        Assert.Equal((HttpStatusCode.NotModified, tag), (again.StatusCode, again.Tag()));
        foreach (var other in new[] { $"{Results}?levels=5", $"{Results}?limit=5", $"{Results}?format=csv", $"{Results}/portfolio" })
            Assert.Equal(HttpStatusCode.OK, (await client.ReadAsync(other, tag)).StatusCode);
    }

    [Fact]
    public async Task CsvComesByFormatOrAccept()
    {
        var response = await client.ReadAsync($"{Results}?format=csv&limit=2");
        Assert.Equal("text/csv", response.Content.Headers.ContentType!.MediaType);
        var lines = (await response.TextAsync()).Split("\r\n");
        Assert.StartsWith("scope,run,asOf,revision,happens,level,finish,", lines[0], StringComparison.Ordinal);
        // header, eight scopes at three levels each whatever the limit, and the end of the last line
        Assert.Equal(1 + 8 * 3 + 1, lines.Length);
        Assert.StartsWith($"portfolio,{fixture.Run},2027-01-03,1,,50,", lines[1], StringComparison.Ordinal);
        var accepting = new HttpRequestMessage(HttpMethod.Get, Results);
        accepting.Headers.Accept.Add(new MediaTypeWithQualityHeaderValue("application/json", 0.5));
        accepting.Headers.Accept.Add(new MediaTypeWithQualityHeaderValue("text/csv"));
        Assert.Equal(await response.TextAsync(), await (await client.SendAsync(accepting, TestContext.Current.CancellationToken)).TextAsync());
    }

    [Fact]
    public async Task OtherRepresentationsAreNotServed()
    {
        var request = new HttpRequestMessage(HttpMethod.Get, Results);
        request.Headers.Accept.ParseAdd("image/png");
        await (await client.SendAsync(request, TestContext.Current.CancellationToken)).ProblemAsync(406, "not-acceptable");
    }

    [Fact]
    public async Task AKeyLimitedToProjectsSeesTheseAndNoTotals()
    {
        var limited = await fixture.Server.ClientAsync(new Grant(Right.Read, "works", ["weir"]));
        Assert.Equal(["project/weir", "milestone/weir/M"], Scopes(await (await limited.ReadAsync(Results)).JsonAsync()));
        string[] totals = ["results/portfolio", "results/programme/locks", "distribution", "distribution?scope=programme/locks&metric=cost"];
        foreach (var total in totals)
            await (await limited.ReadAsync($"{Base}latest/{total}")).ProblemAsync(403, "forbidden");
        await (await limited.ReadAsync($"{Results}/project/quay")).ProblemAsync(404, "not-found");
        await (await limited.ReadAsync($"{Base}latest/distribution?scope=milestone/quay/S")).ProblemAsync(404, "not-found");
        Assert.Equal(HttpStatusCode.OK, (await limited.ReadAsync($"{Results}/project/weir?levels=33.25")).StatusCode);
        Assert.NotEqual((await client.ReadAsync(Results)).Tag(), (await limited.ReadAsync(Results)).Tag());
    }

    [Fact]
    public async Task FiguresOfExpiredIterationsAreGoneButKeptLevelsStay()
    {
        await FinishedRuns.PutAsync(fixture.Server, "old");
        await FinishedRuns.MakeAsync(fixture.Server, "old", new(2027, 1, 3), keepSamples: false);
        const string old = "/v1/portfolios/old/runs/latest/";
        Assert.Equal(HttpStatusCode.OK, (await client.ReadAsync($"{old}results?levels=0.5,17,82.5,99.5")).StatusCode);
        string[] gone = ["results?levels=33.25", "results/project/weir?levels=33.25", "distribution", "distribution?scope=project/weir&metric=cost"];
        foreach (var address in gone)
            await (await client.ReadAsync(old + address)).ProblemAsync(410, "iterations-expired");
        await (await client.ReadAsync("/v1/portfolios/old/contingency?level=33.25")).ProblemAsync(410, "iterations-expired");
    }

    private static IEnumerable<string> Scopes(JsonElement list) =>
        list.GetProperty("items").EnumerateArray().Select(row => row.GetProperty("scope").GetString()!);

    private static IEnumerable<decimal> Levels(JsonElement metric) =>
        metric.GetProperty("percentiles").EnumerateArray().Select(at => at.GetProperty("p").GetDecimal());
}
