using System.Net;
using Portfolio.Server.Tests.Hosting;

namespace Portfolio.Server.Tests.Parts;

/// <summary>Merge patches of parts.</summary>
public sealed class PatchTests(ServerFixture fixture) : IClassFixture<ServerFixture>
{
    private readonly HttpClient client = fixture.Server.Client();

    [Fact]
    public async Task WhatIsSentReplacesAndNullRemoves()
    {
        var at = await client.PortfolioAsync("patched");
        var patched = await client.PatchAsync(at + "/projects/weir", """{"programme":null,"overhead":{"actual":7.25},"tags":{"funding":"state"}}""");
        await patched.WrittenAsync(200, 2);
        var read = await client.ReadAsync(at + "/projects/weir");
        Assert.Equal(patched.Tag(), read.Tag());
        Assert.StartsWith(
            """{"id":"weir","name":"Weir","tags":{"funding":"state"},"statusDate":"2027-01-04","calendar":"five-day","overhead":{"perDay":100,"actual":7.25},"activities":[{"id":"A10",""",
            await read.TextAsync());
        await (await client.PatchAsync(at + "/projects/weir", """{"tags":{"funding":"state"},"priority":null}""")).WrittenAsync(200, 2, changed: false);

        await (await client.PatchAsync(at + "/projects/weir/activities/A10", """{"duration":{"type":"uniform","low":1,"high":2},"demands":null}""")).WrittenAsync(200, 3);
        Assert.Equal("""{"id":"A10","duration":{"type":"uniform","low":1,"high":2},"drivers":["ground"]}""", await (await client.ReadAsync(at + "/projects/weir/activities/A10")).TextAsync());
        await (await client.PatchAsync(at + "/settings", """{"confidence":[80],"commitments":{"budget":9}}""")).WrittenAsync(200, 4);
        Assert.Contains("\"confidence\":[80],\"commitments\":{\"budget\":9},\"calendars\":[{\"id\":\"five-day\"", await (await client.ReadAsync(at + "/settings")).TextAsync());
        await (await client.PatchAsync(at + "/projects/none", "{}")).ProblemAsync(404, "not-found");
        await (await client.PatchAsync(at + "/projects/weir/activities/none", "{}")).ProblemAsync(404, "not-found");
    }

    [Theory]
    [InlineData("""{"duration":{"mode":4}}""", "merge.mixed", "/duration")]
    [InlineData("""{"duration":{"type":"constant","value":4}}""", "merge.mixed", "/duration")]
    [InlineData("""{"duration":{"type":"constant","value":4,"low":null,"mode":null}}""", "merge.mixed", "/duration")]
    [InlineData("""{"duration":{"type":"constant","value":4,"low":null,"mode":null,"high":null}}""", null, null)]
    [InlineData("""{"duration":{"type":"pert","low":1,"mode":2,"high":3,"weight":5}}""", null, null)]
    [InlineData("""{"duration":4}""", null, null)]
    [InlineData("""{"duration":{"low":null}}""", "member.missing", "/duration")]
    [InlineData("""{"cost":{"fixed":{"type":"constant","value":4}}}""", null, null)]
    public async Task ADistributionIsNeverMixedFromBeforeAndNow(string patch, string? code, string? path)
    {
        var id = "mixed-" + Convert.ToHexString(System.Security.Cryptography.SHA256.HashData(System.Text.Encoding.UTF8.GetBytes(patch)))[..12];
        var at = await client.PortfolioAsync(id) + "/projects/weir/activities/A20";
        var answer = await client.PatchAsync(at, patch);
        if (code is null)
            Assert.Equal(HttpStatusCode.OK, answer.StatusCode);
        else
            Assert.Equal([(code, "weir/A20", path!)], await answer.RefusedAsync());
    }

    [Theory]
    [InlineData("/projects/weir", "activities", "weir")]
    [InlineData("/projects/weir", "riskEvents", "weir")]
    [InlineData("/projects/weir", "chanceBranches", "weir")]
    [InlineData("/settings", "calendars", "settings")]
    [InlineData("/settings", "pools", "settings")]
    [InlineData("/settings", "drivers", "settings")]
    [InlineData("/settings", "riskEvents", "settings")]
    public async Task AListOfThingsWithIdsIsNotPatched(string part, string member, string subject)
    {
        var at = await client.PortfolioAsync($"list-{subject}-{member}");
        Assert.Equal(
            [("merge.list", subject, "/" + member)], await (await client.PatchAsync(at + part, $$"""{"{{member}}":[],"name":"New"}""")).RefusedAsync());
        Assert.DoesNotContain("New", await (await client.ReadAsync(at + part)).TextAsync());
    }

    [Fact]
    public async Task EverythingWrongIsNamedWhereItWasSentOrAsStored()
    {
        var at = await client.PortfolioAsync("patch-faults");
        Assert.Equal(
            [("actual.not-before-status", "weir/A10", ""), ("merge.list", "weir", "/activities"), ("priority.range", "weir", "/priority"), ("id.address", "weir", "/id")],
            await (await client.PatchAsync((await StartedAsync(at)) + "/projects/weir", """{"activities":[],"priority":0,"statusDate":"2027-01-04","id":"lock"}""")).RefusedAsync());
        Assert.Equal("/nam", (await (await client.PatchAsync(at + "/projects/weir", """{"nam":1}""")).ProblemAsync(400, "malformed")).Faults()[0].Path);
        Assert.Equal("/name", (await (await client.PatchAsync(at + "/projects/weir", """{"name":1}""")).ProblemAsync(400, "malformed")).Faults()[0].Path);
        Assert.Equal(("/name", "member.duplicate"), (await (await client.PatchAsync(at + "/projects/weir", """{"name":"a","name":"b"}""")).ProblemAsync(400, "malformed")).Faults()[0]);
        Assert.Equal(("", "member.kind"), (await (await client.PatchAsync(at + "/projects/weir", "[]")).ProblemAsync(400, "malformed")).Faults()[0]);
        Assert.Equal("json.malformed", (await (await client.PatchAsync(at + "/projects/weir", """{"name":"a","tags":{"x":1,}}""")).ProblemAsync(400, "malformed")).Faults()[0].Code);
        await (await client.PatchAsync(at + "/projects/weir", "{}", mediaType: "application/json")).ProblemAsync(415, "unsupported-media-type");
    }

    private async Task<string> StartedAsync(string at)
    {
        await (await client.PatchAsync(at + "/projects/weir", """{"statusDate":"2027-01-10"}""")).WrittenAsync(200, 2);
        await (await client.PatchAsync(at + "/projects/weir/activities/A10", """{"actualStart":"2027-01-06","remaining":3}""")).WrittenAsync(200, 3);
        return at;
    }
}
