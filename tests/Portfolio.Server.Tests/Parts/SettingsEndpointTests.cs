using System.Net;
using Portfolio.Server.Tests.Hosting;

namespace Portfolio.Server.Tests.Parts;

public sealed class SettingsEndpointTests(ServerFixture fixture) : IClassFixture<ServerFixture>
{
    private readonly HttpClient client = fixture.Server.Client();

    [Fact]
    public async Task TheCurrencyStaysOnceARunWasAskedForAndIsNamedWithAllElse()
    {
        var at = await client.PortfolioAsync("currency");
        await (await client.PatchAsync(at + "/settings", """{"currency":"USD"}""")).WrittenAsync(200, 2);
        Assert.True((await client.PostJsonAsync(at + "/runs", """{"iterations":10}""")).IsSuccessStatusCode);
        Assert.Equal(
            [("currency.fixed", "settings", "/currency")], await (await client.PatchAsync(at + "/settings", """{"currency":"EUR"}""")).RefusedAsync());
        Assert.Equal([("member.missing", "settings", "")], await (await client.PatchAsync(at + "/settings", """{"currency":null}""")).RefusedAsync());
        var document = $$"""{"settings":{"name":"","currency":"EUR","weekEnds":"noon"},"projects":[{{PartCalls.Quay.Replace("2027", "2727")}}]}""";
        Assert.Equal(
            [("member.missing", "settings", "/settings"), ("currency.fixed", "settings", "/settings/currency"), ("value.unknown", "settings", "/settings/weekEnds"), ("date.range", "quay", "/projects/0/statusDate")],
            await (await client.PutJsonAsync(at + "/document", document, "*")).RefusedAsync());
    }

    [Fact]
    public async Task SettingsAreReplacedByWhoSaysWhat()
    {
        var at = await client.PortfolioAsync("settings") + "/settings";
        var read = await client.ReadAsync(at);
        Assert.Equal(PartCalls.Settings, await read.TextAsync());
        Assert.Equal(HttpStatusCode.NotModified, (await client.ReadAsync(at, read.Tag())).StatusCode);
        var other = PartCalls.Settings.Replace("Harbour", "Works");
        await (await client.PutJsonAsync(at, other)).ProblemAsync(428, "precondition-required");
        await (await client.PutJsonAsync(at, other, "\"0\"")).ProblemAsync(412, "precondition-failed");
        var written = await client.PutJsonAsync(at, other, read.Tag());
        await written.WrittenAsync(200, 2);
        Assert.Equal(written.Tag(), (await client.ReadAsync(at)).Tag());
        await (await client.PutJsonAsync(at, other, "*")).WrittenAsync(200, 2, changed: false);
        Assert.Equal(PartCalls.Settings, await (await client.ReadAsync(at + "?revision=1")).TextAsync());
        await (await client.RemoveAsync(at, "*")).ProblemAsync(405, "method-not-allowed");
        await (await client.PutJsonAsync("/v1/portfolios/nowhere/settings", other, "*")).ProblemAsync(404, "not-found");
    }

    [Fact]
    public async Task WhatProjectsUseCannotBeTakenAway()
    {
        var at = await client.PortfolioAsync("in-use") + "/settings";
        Assert.Equal(
            [("calendar.unknown", "weir", ""), ("pool.unknown", "weir/A10", ""), ("driver.unknown", "weir/A10", ""), ("currency.unknown", "settings", "/currency")],
            (await (await client.PutJsonAsync(at, """{"name":"Bare","currency":"XXQ"}""", "*")).RefusedAsync()).OrderBy(fault => fault.Path).ThenBy(fault => fault.Subject == "weir" ? 0 : 1).ThenByDescending(fault => fault.Code));
        Assert.Equal([("demand.never-fits", "weir/A10", "")], await (await client.PutJsonAsync(at, PartCalls.Settings.Replace("\"capacity\":2", "\"capacity\":1"), "*")).RefusedAsync());
        await (await client.PutJsonAsync(at, PartCalls.Settings.Replace("\"capacity\":2", "\"capacity\":3"), "*")).WrittenAsync(200, 2);
        await (await client.RemoveAsync("/v1/portfolios/in-use/projects/weir", "*")).WrittenAsync(200, 3);
        await (await client.PutJsonAsync(at, """{"name":"Bare","currency":"EUR"}""", "*")).WrittenAsync(200, 4);
    }

    [Fact]
    public async Task WhatSettingsNameInProjectsMustBeThere()
    {
        var at = await client.PortfolioAsync("named") + "/settings";
        var settings = PartCalls.Settings[..^1] + ""","commitments":{"programmes":{"coast":{"budget":1}}},"riskEvents":[{"id":"storm","probability":0.1,"impacts":[{"activity":"quay/B99","delay":1}]}]}""";
        Assert.Equal(
            [("programme.unknown", "programme/coast", "/commitments/programmes/coast"), ("activity.unknown", "event/storm", "/riskEvents/0/impacts/0/activity")],
            await (await client.PutJsonAsync(at, settings, "*")).RefusedAsync());
        await (await client.PutJsonAsync(at, settings.Replace("coast", "river").Replace("B99", "B20"), "*")).WrittenAsync(200, 2);
        Assert.Equal([("activity.unknown", "event/storm", "")], await (await client.RemoveAsync("/v1/portfolios/named/projects/quay/activities/B20", "*")).RefusedAsync());
        Assert.Equal([("programme.unknown", "programme/river", "")], await (await RenamedAsync("quay", "weir")).RefusedAsync());
    }

    // The last project of a programme that something was promised for.
    private async Task<HttpResponseMessage> RenamedAsync(string first, string last)
    {
        await client.PatchAsync($"/v1/portfolios/named/projects/{first}", """{"programme":null}""");
        return await client.PatchAsync($"/v1/portfolios/named/projects/{last}", """{"programme":"lake"}""");
    }

    [Fact]
    public async Task RanksThatContradictEachOtherAndMoneyWithTooManyDigitsAreFound()
    {
        var at = await client.PortfolioAsync("ranks-and-money") + "/settings";
        var pairs = """{"dependence":{"pairs":[{"between":["driver/ground","project/weir"],"rank":0.9},{"between":["driver/ground","project/quay"],"rank":0.9},{"between":["project/weir","project/quay"],"rank":-0.9}]}}""";
        Assert.Equal([("dependence.not-positive", "settings", "/dependence")], await (await client.PatchAsync(at, pairs)).RefusedAsync());
        await (await client.PatchAsync("/v1/portfolios/ranks-and-money/projects/weir", """{"overhead":{"actual":5.25}}""")).WrittenAsync(200, 2);
        Assert.Equal([("money.decimals", "weir", "")], await (await client.PatchAsync(at, """{"currency":"JPY"}""")).RefusedAsync());
    }
}
