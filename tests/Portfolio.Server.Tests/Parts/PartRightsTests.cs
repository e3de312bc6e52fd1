using Portfolio.Server.Tests.Hosting;
using Portfolio.Store.Access;

namespace Portfolio.Server.Tests.Parts;

/// <summary>Who may read and write which part.</summary>
public sealed class PartRightsTests(ServerFixture fixture) : IClassFixture<ServerFixture>
{
    private readonly HttpClient admin = fixture.Server.Client();

    [Fact]
    public async Task SubmittingReachesActivitiesButNotTheirDemandsAndDrivers()
    {
        var at = await admin.PortfolioAsync("submitted");
        var site = await fixture.Server.ClientAsync(new Grant(Right.Submit, "submitted", ["weir"]));
        await (await site.PatchAsync(at + "/projects/weir/activities/A20", """{"duration":4}""")).WrittenAsync(200, 2);
        await (await site.PutJsonAsync(at + "/projects/weir/activities/A30", """{"duration":1}""")).WrittenAsync(201, 3);
        await (await site.PutJsonAsync(at + "/projects/weir/activities/A10", """{"duration":7,"demands":[{"pool":"crane","units":2}],"drivers":["ground"]}""")).WrittenAsync(200, 4);
        Assert.Equal(
            [("right.missing", "weir/A10", "/demands"), ("right.missing", "weir/A10", "/drivers")],
            await (await site.PatchAsync(at + "/projects/weir/activities/A10", """{"demands":[],"drivers":null}""")).RefusedAsync(403, "forbidden"));
        Assert.Equal(
            [("right.missing", "weir/A40", "/drivers")],
            await (await site.PutJsonAsync(at + "/projects/weir/activities/A40", """{"duration":{"type":"gamma"},"drivers":["ground"]}""")).RefusedAsync(403, "forbidden"));
        await (await site.RemoveAsync(at + "/projects/weir/activities/A30", "*")).ProblemAsync(403, "forbidden");
        await (await site.PatchAsync(at + "/projects/quay/activities/B10", """{"duration":4}""")).ProblemAsync(403, "forbidden");
        await (await site.PatchAsync(at + "/projects/none/activities/B10", """{"duration":4}""")).ProblemAsync(403, "forbidden");
    }

    [Fact]
    public async Task OfAProjectSubmittingReachesTheStatusDateAndWhatOverheadHasCost()
    {
        var at = await admin.PortfolioAsync("status") + "/projects/weir";
        var site = await fixture.Server.ClientAsync(new Grant(Right.Submit, "status"));
        await (await site.PatchAsync(at, """{"statusDate":"2027-01-11","overhead":{"actual":9}}""")).WrittenAsync(200, 2);
        await (await site.PutJsonAsync(at, PartCalls.Weir.Replace("\"actual\":5", "\"actual\":10"))).WrittenAsync(200, 3);
        Assert.Equal(
            [("right.missing", "weir", "/name"), ("right.missing", "weir", "/overhead/perDay")],
            await (await site.PatchAsync(at, """{"name":"Mine","overhead":{"perDay":1,"actual":2}}""")).RefusedAsync(403, "forbidden"));
        await (await site.PutJsonAsync(at, """{"statusDate":"2027-01-11"}""")).ProblemAsync(403, "forbidden");
        await (await site.PutJsonAsync(at.Replace("weir", "new"), """{"statusDate":"2027-01-11"}""")).ProblemAsync(403, "forbidden");
        await (await site.RemoveAsync(at, "*")).ProblemAsync(403, "forbidden");
        await (await site.PatchAsync(at.Replace("/projects/weir", "/settings"), "{}")).ProblemAsync(403, "forbidden");
    }

    [Fact]
    public async Task PartsAreReadByWhoMayReadOrSubmitThem()
    {
        var at = await admin.PortfolioAsync("readers");
        var site = await fixture.Server.ClientAsync(new Grant(Right.Submit, "readers", ["weir"]));
        var reader = await fixture.Server.ClientAsync(new Grant(Right.Read, "readers", ["quay"]));
        Assert.Equal(PartCalls.Weir, await (await site.ReadAsync(at + "/projects/weir?asOf=2027-01-04")).TextAsync());
        Assert.Contains("A10", await (await site.ReadAsync(at + "/projects/weir/activities/A10?revision=1")).TextAsync());
        Assert.Equal(PartCalls.Quay, await (await reader.ReadAsync(at + "/projects/quay")).TextAsync());
        foreach (var (who, part) in new[] { (site, "/projects/quay"), (site, "/settings"), (reader, "/projects/weir/activities/A10"), (reader, "/settings"), (reader, "/projects/none") })
            await (await who.ReadAsync(at + part)).ProblemAsync(403, "forbidden");
        var stranger = await fixture.Server.ClientAsync(new Grant(Right.Manage, "elsewhere"));
        await (await stranger.ReadAsync(at + "/projects/weir")).ProblemAsync(404, "not-found");
        await (await stranger.PutJsonAsync(at + "/projects/weir", PartCalls.Weir)).ProblemAsync(404, "not-found");
        await (await reader.PatchAsync(at + "/projects/quay", "{}")).ProblemAsync(403, "forbidden");
    }

    [Fact]
    public async Task AManagerOfOneProjectWritesThatOne()
    {
        var at = await admin.PortfolioAsync("managed");
        var manager = await fixture.Server.ClientAsync(new Grant(Right.Manage, "managed", ["weir"]));
        await (await manager.PatchAsync(at + "/projects/weir", """{"name":"Mine"}""")).WrittenAsync(200, 2);
        await (await manager.PatchAsync(at + "/projects/quay", """{"name":"Mine"}""")).ProblemAsync(403, "forbidden");
        await (await manager.PatchAsync(at + "/projects/quay", """{"name":"Quay"}""")).ProblemAsync(403, "forbidden");
        await (await manager.PutJsonAsync(at + "/settings", PartCalls.Settings, "*")).ProblemAsync(403, "forbidden");
        // Not even to say that all others stay as they are: else it could be guessed what they hold.
        var whole = await (await admin.ReadAsync(at + "/document")).TextAsync();
        foreach (var document in new[] { whole, whole.Replace("EUR", "USD"), "{}" })
            await (await manager.PutJsonAsync(at + "/document", document, "*")).ProblemAsync(403, "forbidden");
        await (await manager.RemoveAsync(at + "/projects/weir", "*")).WrittenAsync(200, 3);
    }

    [Theory]
    [InlineData("PATCH", "projects/weir", """{"correlation":1e999}""", "weir", "/correlation")]
    [InlineData("PATCH", "projects/weir", """{"priority":1e999}""", "weir", "/priority")]
    [InlineData("PATCH", "projects/weir", """{"overhead":{"perDay":-1e999,"actual":1e999}}""", "weir", "/overhead/perDay")]
    [InlineData("PUT", "projects/weir/activities/A30", """{"duration":1e999,"demands":[{"pool":"crane","units":1e999}]}""", "weir/A30", "/demands")]
    [InlineData("POST", "updates", """{"updates":[{"project":"weir","overhead":{"perDay":1e999}}]}""", "weir", "/updates/0/overhead/perDay")]
    public async Task WhatMayNotBeSubmittedMayBeTooLargeForANumber(string method, string part, string json, string subject, string path)
    {
        var at = await admin.PortfolioAsync("large-" + Guid.NewGuid());
        var site = await fixture.Server.ClientAsync(new Grant(Right.Submit, at["/v1/portfolios/".Length..]));
        var type = method == "PATCH" ? "application/merge-patch+json" : "application/json";
        Assert.Equal(
            [("right.missing", subject, path)],
            await (await site.SendAsync(new HttpMethod(method), $"{at}/{part}", json, mediaType: type)).RefusedAsync(403, "forbidden"));
    }
}
