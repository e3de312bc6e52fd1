using System.Net;
using Portfolio.Server.Tests.Hosting;

namespace Portfolio.Server.Tests.Parts;

public sealed class ProjectEndpointTests(ServerFixture fixture) : IClassFixture<ServerFixture>
{
    private readonly HttpClient client = fixture.Server.Client();

    [Fact]
    public async Task AProjectIsReadWithATagOfItsOwn()
    {
        var at = await client.PortfolioAsync("own-tag");
        var read = await client.ReadAsync(at + "/projects/weir");
        Assert.Equal(PartCalls.Weir, await read.TextAsync());
        Assert.Equal("application/json", read.Content.Headers.ContentType?.MediaType);
        await (await client.PutJsonAsync(at + "/projects/quay", PartCalls.Quay.Replace("\"duration\":4", "\"duration\":5"))).WrittenAsync(200, 2);

        Assert.Equal(HttpStatusCode.NotModified, (await client.ReadAsync(at + "/projects/weir", read.Tag())).StatusCode);
        await (await client.ReadAsync(at + "/projects/nowhere")).ProblemAsync(404, "not-found");
        await (await client.ReadAsync("/v1/portfolios/nowhere/projects/weir")).ProblemAsync(404, "not-found");
    }

    [Fact]
    public async Task ANewProjectGoesLastAndAnOldOneKeepsItsPlace()
    {
        var at = await client.PortfolioAsync("places");
        var created = await client.PutJsonAsync(at + "/projects/basin?note=new", """{"statusDate":"2027-01-04"}""");
        await created.WrittenAsync(201, 2);
        Assert.Equal(at + "/projects/basin", created.Headers.Location?.ToString());
        Assert.Equal(created.Tag(), (await client.ReadAsync(at + "/projects/basin")).Tag());
        Assert.Equal("new", (await (await client.ReadAsync(at + "/revisions/2")).JsonAsync()).GetProperty("note").GetString());

        await (await client.PutJsonAsync(at + "/projects/weir", PartCalls.Weir.Replace("Weir", "Old weir"))).WrittenAsync(200, 3);
        await (await client.PutJsonAsync(at + "/projects/weir", PartCalls.Weir.Replace("Weir", "Old weir"))).WrittenAsync(200, 3, changed: false);
        var document = await (await client.ReadAsync(at + "/document")).JsonAsync();
        Assert.Equal(["weir", "quay", "basin"], document.GetProperty("projects").EnumerateArray().Select(project => project.GetProperty("id").GetString()));
    }

    [Fact]
    public async Task TheTagIsAskedForOnlyWhereSomethingIsRemoved()
    {
        var at = await client.PortfolioAsync("tags");
        var tag = (await client.ReadAsync(at + "/projects/weir")).Tag();
        var second = await client.PutJsonAsync(at + "/projects/weir", PartCalls.Weir.Replace("Weir", "Second"), tag);
        await second.WrittenAsync(200, 2);
        await (await client.PutJsonAsync(at + "/projects/weir", PartCalls.Weir, tag)).ProblemAsync(412, "precondition-failed");
        await (await client.PutJsonAsync(at + "/projects/new", """{"statusDate":"2027-01-04"}""", "*")).ProblemAsync(412, "precondition-failed");
        await (await client.SendAsync(HttpMethod.Put, at + "/projects/weir", PartCalls.Weir, ifNoneMatch: "*")).ProblemAsync(412, "precondition-failed");

        await (await client.RemoveAsync(at + "/projects/weir")).ProblemAsync(428, "precondition-required");
        await (await client.RemoveAsync(at + "/projects/weir", tag)).ProblemAsync(412, "precondition-failed");
        await (await client.RemoveAsync(at + "/projects/weir", second.Tag())).WrittenAsync(200, 3);
        await (await client.RemoveAsync(at + "/projects/weir", "*")).ProblemAsync(404, "not-found");
        Assert.Equal(PartCalls.Weir, await (await client.ReadAsync(at + "/projects/weir?revision=1")).TextAsync());
    }

    [Theory]
    [InlineData("TAG")]
    [InlineData("\"TAG")]
    [InlineData("\"TAG\" \"other\"")]
    [InlineData("*, \"TAG\" x")]
    public async Task AConditionThatCannotBeReadLetsNothingBeWritten(string condition)
    {
        var at = await client.PortfolioAsync("conditions-" + Guid.NewGuid()) + "/projects/weir";
        condition = condition.Replace("TAG", (await client.ReadAsync(at)).Tag()!.Trim('"'));
        foreach (var (match, noneMatch) in new[] { (condition, null), ((string?)null, condition) })
        {
            var refused = await client.SendAsync(
                HttpMethod.Patch, at, """{"name":"Overwritten"}""", match, "application/merge-patch+json", noneMatch);
            await refused.ProblemAsync(400, "bad-request");
        }
        await (await client.RemoveAsync(at, condition)).ProblemAsync(400, "bad-request");
        Assert.Equal(PartCalls.Weir, await (await client.ReadAsync(at)).TextAsync());
    }

    [Fact]
    public async Task OneOfSeveralTagsIsEnough()
    {
        var at = await client.PortfolioAsync("several") + "/projects/weir";
        var tag = (await client.ReadAsync(at)).Tag();
        await (await client.PatchAsync(at, """{"name":"A"}""", "\"old\", W/\"older\"")).ProblemAsync(412, "precondition-failed");
        await (await client.PatchAsync(at, """{"name":"A"}""", $"\"old\",, {tag}")).WrittenAsync(200, 2);
    }

    [Fact]
    public async Task ThePastStaysReadableByRevisionAndByDate()
    {
        await using var server = new PortfolioServer();
        var admin = server.Client();
        var at = await admin.PortfolioAsync("past");
        server.Clock.Advance(TimeSpan.FromDays(1));
        await admin.PutJsonAsync(at + "/projects/weir", PartCalls.Weir.Replace("Weir", "Later"));
        Assert.Equal(PartCalls.Weir, await (await admin.ReadAsync(at + "/projects/weir?revision=1")).TextAsync());
        Assert.Equal(PartCalls.Weir, await (await admin.ReadAsync(at + "/projects/weir?asOf=2027-01-04")).TextAsync());
        Assert.Contains("Later", await (await admin.ReadAsync(at + "/projects/weir?asOf=2027-01-05")).TextAsync());
        await (await admin.ReadAsync(at + "/projects/weir?asOf=2027-01-03")).ProblemAsync(404, "not-found");
        await (await admin.ReadAsync(at + "/projects/weir?revision=3")).ProblemAsync(404, "not-found");
        await (await admin.ReadAsync(at + "/projects/weir?revision=1&asOf=2027-01-04")).ProblemAsync(422, "refused");
    }

    [Fact]
    public async Task EverythingWrongIsNamedAtItsPlace()
    {
        var at = await client.PortfolioAsync("wrong");
        var faults = await (await client.PutJsonAsync(at + "/projects/weir", """
            {"id":"lock","statusDate":"2027-01-04","calendar":"six-day","correlation":2,"activities":[
              {"id":"A10","duration":{"type":"gamma"},"demands":[{"pool":"crane","units":3}]},
              {"id":"A20","duration":{"type":"pert","low":1,"mode":2,"high":30,"lowPercentile":10,"highPercentile":90},"predecessors":["quay/B99","A30"]}]}
            """)).RefusedAsync();
        Assert.Equal(
            [
                ("id.address", "weir", "/id"),
                ("calendar.unknown", "weir", "/calendar"),
                ("correlation.range", "weir", "/correlation"),
                ("type.unknown", "weir/A10", "/activities/0/duration/type"),
                ("demand.never-fits", "weir/A10", "/activities/0/demands/0/units"),
                ("distribution.negative", "weir/A20", "/activities/1/duration"),
                ("activity.unknown", "weir/A20", "/activities/1/predecessors/0"),
                ("activity.unknown", "weir/A20", "/activities/1/predecessors/1"),
            ],
            faults);
        await (await client.PutJsonAsync(at + "/projects/weir", """{"statusDate":[]}""")).ProblemAsync(400, "malformed");
        Assert.Equal("/activities/0", (await (await client.PutJsonAsync(at + "/projects/weir", """{"activities":[null]}""")).ProblemAsync(400, "malformed")).Faults()[0].Path);
        Assert.Equal([("id.format", "-x", "")], await (await client.PutJsonAsync(at + "/projects/-x", """{"statusDate":"2027-01-04"}""")).RefusedAsync());
        Assert.Equal(PartCalls.Weir, await (await client.ReadAsync(at + "/projects/weir")).TextAsync());
        await (await client.PutJsonAsync("/v1/portfolios/nowhere/projects/weir", PartCalls.Weir)).ProblemAsync(404, "not-found");
        await (await client.SendAsync(HttpMethod.Put, at + "/projects/weir", "x", mediaType: "text/csv")).ProblemAsync(415, "unsupported-media-type");
    }

    [Fact]
    public async Task WhatOthersNeedCannotBeTakenAway()
    {
        var at = await client.PortfolioAsync("needed");
        Assert.Equal([("project.unknown", "weir/A20", "")], await (await client.RemoveAsync(at + "/projects/quay", "*")).RefusedAsync());
        var renamed = PartCalls.Quay.Replace("B10", "B11");
        Assert.Equal([("activity.unknown", "weir/A20", "")], await (await client.PutJsonAsync(at + "/projects/quay", renamed)).RefusedAsync());
        await (await client.RemoveAsync(at + "/projects/weir", "*")).WrittenAsync(200, 2);
        await (await client.RemoveAsync(at + "/projects/quay", "*")).WrittenAsync(200, 3);
    }

    [Fact]
    public async Task ACircleThroughAnotherProjectIsFound()
    {
        var at = await client.PortfolioAsync("circle");
        var waits = PartCalls.Quay.Replace("""{"id":"B10","duration":4}""", """{"id":"B10","duration":4,"predecessors":["weir/A20"]}""");
        Assert.Equal([("link.cycle", "quay/B10", "/activities/0/predecessors/0")], await (await client.PutJsonAsync(at + "/projects/quay", waits)).RefusedAsync());
        // Projects may wait for each other as long as no activity does.
        var later = PartCalls.Quay.Replace("""["B10"]""", """["B10","weir/A10"]""");
        await (await client.PutJsonAsync(at + "/projects/quay", later)).WrittenAsync(200, 2);
    }

    [Fact]
    public async Task CorrelationsAreWorkedOutAgainWhenAProgrammeChanges()
    {
        var settings = PartCalls.Settings[..^1] + ""","dependence":{"betweenProjects":0.1,"withinProgramme":0.9,"pairs":[{"between":["project/weir","driver/ground"],"rank":0.4}]}}""";
        var apart = PartCalls.Weir.Replace("\"programme\":\"river\",", "");
        await client.PutJsonAsync("/v1/portfolios/ranks/document", $$"""{"settings":{{settings}},"projects":[{{apart}},{{PartCalls.Quay}}]}""");
        Assert.Equal([("dependence.not-positive", "settings", "")],
            await (await client.PutJsonAsync("/v1/portfolios/ranks/projects/weir", PartCalls.Weir)).RefusedAsync());
        await (await client.PutJsonAsync("/v1/portfolios/ranks/projects/weir", apart.Replace("Weir", "New"))).WrittenAsync(200, 2);
    }
}
