using System.Net;
using System.Text.Json;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Parts;
using Portfolio.Store.Access;

namespace Portfolio.Server.Tests.Updates;

public sealed class UpdateEndpointTests(ServerFixture fixture) : IClassFixture<ServerFixture>
{
    private static int next;

    private readonly HttpClient client = fixture.Server.Client();

    private Task<string> PortfolioAsync() => client.PortfolioAsync($"updated-{Interlocked.Increment(ref next)}");

    /// <param name="update">The rest of an entry for the weir.</param>
    /// <param name="path">Of the project, a member that is then there as stated; null: is gone.</param>
    [Theory]
    [InlineData("""
        "name":"Lock"
        """, "name", "\"Lock\"")]
    [InlineData("""
        "programme":null
        """, "programme", null)]
    [InlineData("""
        "overhead":{"actual":7}
        """, "overhead", """{"perDay":100,"actual":7}""")]
    [InlineData("""
        "overhead":{"perDay":null}
        """, "overhead", """{"actual":5}""")]
    [InlineData("""
        "overhead":null
        """, "overhead", null)]
    [InlineData("""
        "activities":[{"id":"A20","duration":{"type":"uniform","low":1,"high":2}}]
        """, "activities.1.duration", """{"type":"uniform","low":1,"high":2}""")]
    [InlineData("""
        "activities":[{"id":"A20","predecessors":["A10"]}]
        """, "activities.1.predecessors", """["A10"]""")]
    [InlineData("""
        "activities":[{"id":"A10","demands":null,"drivers":[]}]
        """, "activities.0", """{"id":"A10","duration":5,"drivers":[]}""")]
    [InlineData("""
        "activities":[{"id":"A10","cost":{"fixed":3}},{"id":"A20","name":"Second"}]
        """, "activities.0.cost", """{"fixed":3}""")]
    [InlineData("""
        "create":true,"activities":[{"id":"A30","duration":1}]
        """, "activities.2", """{"id":"A30","duration":1}""")]
    [InlineData("""
        "statusDate":"2027-02-01","activities":[{"id":"A10","actualStart":"2027-01-05","remaining":3}]
        """, "activities.0.remaining", "3")]
    [InlineData("""
        "tags":{"b":"2"}
        """, "tags", """{"b":"2"}""")]
    public async Task AMemberThatIsSentReplacesTheStoredOneWhole(string update, string path, string? after)
    {
        var portfolio = await PortfolioAsync();
        var answer = await client.UpdateAsync(portfolio, $$"""{"updates":[{"project":"weir",{{update}}}]}""");
        Assert.True(answer.StatusCode == HttpStatusCode.OK, await answer.TextAsync());
        await answer.WrittenAsync(200, 2);
        Assert.Equal((await client.ReadAsync($"{portfolio}/document")).Tag(), answer.Tag());
        var weir = (await (await client.ReadAsync($"{portfolio}/projects/weir")).JsonAsync());
        Assert.Equal(after, Find(weir, path.Split('.'))?.GetRawText());
    }

    [Fact]
    public async Task WorkThatIsFinishedHasNothingRemaining()
    {
        var portfolio = await PortfolioAsync();
        await client.UpdateAsync(portfolio, """{"updates":[{"project":"quay","statusDate":"2027-02-01","activities":[{"id":"B10","actualStart":"2027-01-05","remaining":3}]}]}""");
        const string finish = """{"updates":[{"project":"quay","activities":[{"id":"B10","actualFinish":"2027-01-20"MORE}]}]}""";
        Assert.Equal(["remaining.finished /updates/0/activities/0/remaining"], await (await client.UpdateAsync(portfolio, finish.Replace("MORE", ",\"remaining\":1"))).WhereAsync());
        await (await client.UpdateAsync(portfolio, finish.Replace("MORE", ""))).WrittenAsync(200, 3);
        Assert.Equal(
            """{"id":"B10","duration":4,"actualStart":"2027-01-05","actualFinish":"2027-01-20"}""",
            await (await client.ReadAsync($"{portfolio}/projects/quay/activities/B10")).TextAsync());
    }

    [Theory]
    [InlineData("""{"updates":[{"project":"dam"}]}""", "project.unknown /updates/0/project")]
    [InlineData("""{"updates":[{"project":"weir","activities":[{"id":"A99","duration":1}]}]}""", "activity.unknown /updates/0/activities/0/id")]
    [InlineData("""{"updates":[{"project":"weir"},{"project":"weir"}]}""", "id.duplicate /updates/1/project")]
    [InlineData("""{"updates":[{"project":"weir","activities":[{"id":"A10"},{"id":"A10"}]}]}""", "id.duplicate /updates/0/activities/1/id")]
    [InlineData("""{"updates":[{"name":"Weir"}]}""", "member.missing /updates/0")]
    [InlineData("""{"updates":[{"project":"weir","activities":[{"duration":1}]}]}""", "member.missing /updates/0/activities/0")]
    [InlineData("{}", "member.missing ")]
    [InlineData("""{"updates":[{"project":"weir","statusDate":null}]}""", "member.missing /updates/0")]
    [InlineData("""{"updates":[{"project":"weir","create":true,"activities":[{"id":"A 1","duration":1}]}]}""", "id.format /updates/0/activities/0/id")]
    [InlineData("""{"updates":[{"project":"weir","activities":[{"id":"A10","actualStart":"2027-01-01"}]}]}""", "remaining.missing /updates/0/activities/0")]
    [InlineData("""{"updates":[{"project":"quay","activities":[{"id":"B10","predecessors":["weir/A20"]}]}]}""", "link.cycle /updates/0/activities/0/predecessors/0")]
    [InlineData("""{"updates":[{"project":"weir","activities":[{"id":"A10","duration":{"type":"pert","low":3,"mode":2,"high":9}}]}]}""", "distribution.order /updates/0/activities/0/duration")]
    public async Task WhatIsWrongIsNamedWhereItWasSent(string json, string fault)
    {
        var portfolio = await PortfolioAsync();
        var before = await client.DocumentAsync(portfolio);
        Assert.Equal(fault, Assert.Single(await (await client.UpdateAsync(portfolio, json)).WhereAsync()));
        Assert.Equal(fault, Assert.Single(await (await client.UpdateAsync(portfolio, json, "?dryRun=true")).WhereAsync()));
        Assert.Equal(before, await client.DocumentAsync(portfolio));
    }

    [Fact]
    public async Task FaultsOfSeveralProjectsComeTogetherInTheOrderSentAndNothingIsKept()
    {
        var portfolio = await PortfolioAsync();
        var before = await client.DocumentAsync(portfolio);
        var answer = await client.UpdateAsync(portfolio, """
            {"updates":[{"project":"quay","name":"new","activities":[{"id":"B20","duration":-1},{"id":"B30"}]},{"project":"dam"},{"project":"weir","calendar":"none","statusDate":"2027-13-01"}]}
            """);
        Assert.Equal(
            [
                "distribution.negative /updates/0/activities/0/duration", "activity.unknown /updates/0/activities/1/id",
                "project.unknown /updates/1/project", "calendar.unknown /updates/2/calendar", "date.format /updates/2/statusDate",
            ], await answer.WhereAsync());
        Assert.Equal(before, await client.DocumentAsync(portfolio));
    }

    [Theory]
    [InlineData("""{"updates":[{"project":"weir","colour":null}]}""", "/updates/0/colour")]
    [InlineData("""{"updates":[{"project":"weir","activities":null}]}""", "/updates/0/activities")]
    [InlineData("""{"updates":[{"project":"weir","activities":[{"id":"A10","actualStart":5}]}]}""", "/updates/0/activities/0/actualStart")]
    [InlineData("""{"updates":[null]}""", "/updates/0")]
    [InlineData("""{"updates":[{"project":"weir","project":"weir"}]}""", "/updates/0/project")]
    public async Task WhatIsNoUpdateIsRefusedAtItsFirstPlace(string json, string path)
    {
        var answer = await client.UpdateAsync(await PortfolioAsync(), json);
        Assert.Equal(path, Assert.Single((await answer.ProblemAsync(400, "malformed")).Faults()).Path);
    }

    [Theory]
    [InlineData(""" "statusDate":"2027-02-01","overhead":{"actual":9},"activities":[{"id":"A10","name":"n","duration":9}] """, new string[0])]
    [InlineData(""" "create":true,"activities":[{"id":"A40","duration":9}] """, new string[0])]
    [InlineData(""" "name":"x","overhead":{"perDay":1},"activities":[{"id":"A10","demands":[],"drivers":null}] """, new[] { "/updates/0/name", "/updates/0/overhead/perDay", "/updates/0/activities/0/demands", "/updates/0/activities/0/drivers" })]
    [InlineData(""" "create":true,"activities":[{"id":"A40","duration":9,"drivers":["ground"]}] """, new[] { "/updates/0/activities/0/drivers" })]
    public async Task WhoMaySubmitChangesWhatIsReported(string update, string[] beyond)
    {
        var portfolio = await PortfolioAsync();
        var grant = new Grant(Right.Submit, portfolio["/v1/portfolios/".Length..], ["weir"]);
        var submitter = await fixture.Server.ClientAsync(grant);
        var answer = await submitter.UpdateAsync(portfolio, $$"""{"updates":[{"project":"weir",{{update}}}]}""");
        if (beyond.Length == 0)
            await answer.WrittenAsync(200, 2);
        else
            Assert.Equal(beyond.Select(path => $"right.missing {path}"), await answer.WhereAsync(403, "forbidden"));
        Assert.Equal(
            ["right.missing /updates/0/project"],
            await (await submitter.UpdateAsync(portfolio, """{"updates":[{"project":"quay"},{"project":"weir"}]}""")).WhereAsync(403, "forbidden"));
        var reader = await fixture.Server.ClientAsync(grant with { Right = Right.Read });
        await (await reader.UpdateAsync(portfolio, """{"updates":[]}""")).ProblemAsync(403, "forbidden");
        var stranger = await fixture.Server.ClientAsync(grant with { Portfolio = "elsewhere" });
        await (await stranger.UpdateAsync(portfolio, """{"updates":[]}""")).ProblemAsync(404, "not-found");
    }

    [Fact]
    public async Task ConditionsAreHonouredAndNothingChangedIsNoRevision()
    {
        var portfolio = await PortfolioAsync();
        var tag = (await client.ReadAsync($"{portfolio}/document")).Tag();
        await (await client.UpdateAsync(portfolio, """{"updates":[]}""", ifMatch: "\"old\"")).ProblemAsync(412, "precondition-failed");
        await (await client.UpdateAsync(portfolio, """{"updates":[{"project":"weir","name":"Weir"}]}""", ifMatch: tag)).WrittenAsync(200, 1, changed: false);
        await (await client.UpdateAsync(portfolio, """{"updates":[{"project":"weir","name":"W"},{"project":"quay","name":"Q"}]}""", "?note=night", tag)).WrittenAsync(200, 2);
        Assert.Equal("night", (await (await client.ReadAsync($"{portfolio}/revisions/2")).JsonAsync()).GetProperty("note").GetString());
        await (await client.UpdateAsync("/v1/portfolios/never", """{"updates":[]}""")).ProblemAsync(404, "not-found");
    }

    [Fact]
    public async Task ManyAtOnceLoseNothingOfEachOther()
    {
        var portfolio = await PortfolioAsync();
        string[] members = ["name", "earliestStart", "calendar"];
        string[] values = ["n", "2027-03-01", "five-day"];
        await Task.WhenAll(new[] { "weir/A10", "weir/A20", "quay/B10", "quay/B20" }.SelectMany(_ => members, (thing, member) => (thing.Split('/'), member)).Select(async each =>
        {
            var ((project, activity), value) = ((each.Item1[0], each.Item1[1]), values[Array.IndexOf(members, each.member)]);
            var answer = await client.UpdateAsync(portfolio, $$"""{"updates":[{"project":"{{project}}","activities":[{"id":"{{activity}}","{{each.member}}":"{{value}}"}]}]}""");
            Assert.Equal(HttpStatusCode.OK, answer.StatusCode);
        }));
        var document = await (await client.ReadAsync($"{portfolio}/document")).JsonAsync();
        var activities = document.GetProperty("projects").EnumerateArray().SelectMany(project => project.GetProperty("activities").EnumerateArray()).ToList();
        Assert.Equal(4, activities.Count);
        Assert.All(activities, activity => Assert.Equal(values, members.Select(member => activity.GetProperty(member).GetString())));
    }

    private static JsonElement? Find(JsonElement here, string[] path)
    {
        foreach (var step in path)
        {
            if (here.ValueKind == JsonValueKind.Array)
                here = here[int.Parse(step, System.Globalization.CultureInfo.InvariantCulture)];
            else if (!here.TryGetProperty(step, out here))
                return null;
        }
        return here;
    }
}
