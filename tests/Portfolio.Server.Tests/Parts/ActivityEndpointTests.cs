using System.Net;
using Portfolio.Server.Tests.Hosting;

namespace Portfolio.Server.Tests.Parts;

public sealed class ActivityEndpointTests(ServerFixture fixture) : IClassFixture<ServerFixture>
{
    private const string A20 = """{"id":"A20","duration":{"type":"pert","low":2,"mode":3,"high":6},"predecessors":["A10","quay/B10"]}""";

    private readonly HttpClient client = fixture.Server.Client();

    [Fact]
    public async Task AnActivityHasATagOfItsOwn()
    {
        var at = await client.PortfolioAsync("activity-tag") + "/projects/weir/activities/";
        var read = await client.ReadAsync(at + "A20");
        Assert.Equal(A20, await read.TextAsync());
        var other = await client.PutJsonAsync(at + "A10", """{"duration":6}""");
        await other.WrittenAsync(200, 2);
        Assert.Equal(HttpStatusCode.NotModified, (await client.ReadAsync(at + "A20", read.Tag())).StatusCode);
        Assert.Equal(other.Tag(), (await client.ReadAsync(at + "A10")).Tag());
        Assert.Equal("""{"id":"A10","duration":6}""", await (await client.ReadAsync(at + "A10?revision=2")).TextAsync());
        Assert.Contains("crane", await (await client.ReadAsync(at + "A10?revision=1")).TextAsync());
        await (await client.ReadAsync(at + "A30")).ProblemAsync(404, "not-found");
        await (await client.ReadAsync(at.Replace("weir", "none") + "A10")).ProblemAsync(404, "not-found");
    }

    [Fact]
    public async Task ANewActivityGoesLastAndAnOldOneKeepsItsPlace()
    {
        var at = await client.PortfolioAsync("activity-place") + "/projects/weir/activities/";
        await (await client.PutJsonAsync(at + "A30", """{"duration":1,"predecessors":["A20"]}""")).WrittenAsync(201, 2);
        await (await client.PutJsonAsync(at + "A10", """{"id":"A10","duration":9}""")).WrittenAsync(200, 3);
        await (await client.PutJsonAsync(at + "A10", """{"id":"A10","duration":9}""", "*")).WrittenAsync(200, 3, changed: false);
        var project = await (await client.ReadAsync("/v1/portfolios/activity-place/projects/weir")).JsonAsync();
        Assert.Equal(["A10", "A20", "A30"], project.GetProperty("activities").EnumerateArray().Select(activity => activity.GetProperty("id").GetString()));
    }

    [Fact]
    public async Task ConditionsAreThoseOfThisActivity()
    {
        var at = await client.PortfolioAsync("activity-match") + "/projects/weir/activities/";
        var tag = (await client.ReadAsync(at + "A20")).Tag();
        await (await client.PutJsonAsync(at + "A10", """{"duration":6}""", tag)).ProblemAsync(412, "precondition-failed");
        await (await client.PatchAsync(at + "A20", """{"name":"Walls"}""", tag)).WrittenAsync(200, 2);
        await (await client.RemoveAsync(at + "A20")).ProblemAsync(428, "precondition-required");
        await (await client.RemoveAsync(at + "A20", tag)).ProblemAsync(412, "precondition-failed");
        var removed = await client.RemoveAsync(at + "A20", "*");
        await removed.WrittenAsync(200, 3);
        Assert.Null(removed.Tag());
        await (await client.RemoveAsync(at + "A20", "*")).ProblemAsync(404, "not-found");
        await (await client.RemoveAsync(at.Replace("weir", "none") + "A20", "*")).ProblemAsync(404, "not-found");
        await (await client.PutJsonAsync(at.Replace("weir", "none") + "A20", A20)).ProblemAsync(404, "not-found");
        await (await client.SendAsync(HttpMethod.Put, at + "A10", A20.Replace("A20", "A10"), ifNoneMatch: "*")).ProblemAsync(412, "precondition-failed");
    }

    [Fact]
    public async Task FaultsPointIntoWhatWasSentAndNameWhatIsStored()
    {
        var at = await client.PortfolioAsync("activity-faults") + "/projects/weir/activities/";
        Assert.Equal(
            [("id.address", "weir/A10", "/id"), ("activity.unknown", "weir/A10", "/predecessors/0"), ("pool.unknown", "weir/A10", "/demands/0/pool"), ("driver.unknown", "weir/A10", "/drivers/0")],
            await (await client.PutJsonAsync(at + "A10", """{"id":"A11","duration":1,"predecessors":["A99"],"demands":[{"pool":"barge","units":1}],"drivers":["sky"]}""")).RefusedAsync());
        Assert.Equal([("activity.unknown", "weir/A20", "")], await (await client.RemoveAsync(at + "A10", "*")).RefusedAsync());
        Assert.Equal(
            [("activity.unknown", "quay/B20", ""), ("activity.unknown", "weir/A20", "")],
            await (await client.RemoveAsync(at.Replace("weir", "quay") + "B10", "*")).RefusedAsync());
        Assert.Equal([("id.format", "weir/-", "")], await (await client.PutJsonAsync(at + "-", """{"duration":1}""")).RefusedAsync());
        Assert.Equal("/predecessors/0", (await (await client.PutJsonAsync(at + "A10", """{"predecessors":[null]}""")).ProblemAsync(400, "malformed")).Faults()[0].Path);
    }

    [Theory]
    [InlineData("weir/activities/A10", """{"duration":5,"predecessors":["A20"]}""", "weir/A10", "/predecessors/0")]
    [InlineData("quay/activities/B20", """{"duration":5,"predecessors":["B10","weir/A20"]}""", "quay/B20", "/predecessors/1")]
    [InlineData("quay/activities/B10", """{"duration":5,"predecessors":["weir/A20"]}""", "quay/B10", "/predecessors/0")]
    public async Task ACircleIsReportedAtTheLinkThatWasSent(string activity, string json, string subject, string path)
    {
        var at = await client.PortfolioAsync("activity-circle-" + subject.Replace('/', '-')) + "/projects/";
        await (await client.PatchAsync(at + "weir/activities/A20", """{"predecessors":["A10","quay/B20"]}""")).WrittenAsync(200, 2);
        Assert.Equal([("link.cycle", subject, path)], await (await client.PutJsonAsync(at + activity, json)).RefusedAsync());
    }

    [Fact]
    public async Task ACircleIsReportedWhereItWasClosedEvenBehindOlderLinks()
    {
        var at = await client.PortfolioAsync("closing") + "/projects/quay/activities/";
        await (await client.PutJsonAsync(at + "B30", """{"duration":1}""")).WrittenAsync(201, 2);
        await (await client.PutJsonAsync(at + "B10", """{"duration":4,"predecessors":["B30"]}""")).WrittenAsync(200, 3);
        // B10 and B20 stand before B30 in the list, but B30 is what was sent.
        Assert.Equal([("link.cycle", "quay/B30", "/predecessors/0")], await (await client.PatchAsync(at + "B30", """{"predecessors":["B20"]}""")).RefusedAsync());
    }
}
