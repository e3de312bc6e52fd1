using System.Text.Json;
using Microsoft.AspNetCore.Http;
using Microsoft.AspNetCore.Routing;
using Microsoft.Extensions.DependencyInjection;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Store.Access;

namespace Portfolio.Server.Tests.Audit;

public sealed class AuditEndpointTests(ServerFixture fixture) : IClassFixture<ServerFixture>
{
    private readonly PortfolioServer server = fixture.Server;
    private readonly HttpClient admin = fixture.Server.Client();

    private async Task<List<JsonElement>> EntriesAsync(string query = "") =>
        [.. (await (await admin.ReadAsync("/v1/audit?" + query)).JsonAsync()).GetProperty("items").EnumerateArray()];

    private static string Text(JsonElement entry, string member) => entry.GetProperty(member).GetString()!;

    private static int Number(JsonElement entry) => entry.GetProperty("sequence").GetInt32();

    [Fact]
    public async Task ARefusedDocumentIsToldWithItsCodesAndWithoutItsContent()
    {
        await admin.PutJsonAsync("/v1/portfolios/told/document", """
            {"settings":{"name":"planted-canary","currency":"EUR","weekEnds":"Friday"},
             "projects":[{"id":"p","statusDate":"2027-13-01"},{"id":"q","statusDate":"2027-13-01"}]}
            """);
        var entry = (await EntriesAsync("portfolio=told"))[0];
        Assert.Equal(("document.put", "portfolios/told/document"), (Text(entry, "action"), Text(entry, "object")));
        Assert.Equal(
            """{"outcome":"refused","status":422,"problem":"refused","faults":3,"codes":{"value.unknown":1,"date.format":2}}""",
            entry.GetProperty("detail").GetRawText());
        Assert.DoesNotContain("planted-canary", entry.ToString(), StringComparison.Ordinal);
    }

    [Fact]
    public async Task EveryRefusedWriteOfEveryRouteLeavesOneLine()
    {
        await admin.PutJsonAsync("/v1/portfolios/many/document", Samples.Document());
        var routes = server.Services.GetRequiredService<EndpointDataSource>().Endpoints.OfType<RouteEndpoint>()
            .SelectMany(route => (route.Metadata.GetMetadata<HttpMethodMetadata>()?.HttpMethods ?? []).Select(method => (Route: route, Method: method)))
            .Where(each => each.Method is "POST" or "PUT" or "PATCH" or "DELETE").ToList();
        Assert.True(routes.Count > 8);
        var reader = await server.ClientAsync(new Grant(Right.Read, "many"));
        foreach (var (route, method) in routes)
        {
            var address = "/" + route.RoutePattern.RawText!.TrimStart('/').Replace("{portfolio}", "many", StringComparison.Ordinal);
            var last = Number((await EntriesAsync("limit=1"))[0]);
            var response = await reader.WriteAsync(new HttpMethod(method), address, method == "DELETE" ? null : "{}");
            Assert.InRange((int)response.StatusCode, 400, 499);
            var entry = Assert.Single(await EntriesAsync(), entry => Number(entry) > last);
            Assert.Equal((int)response.StatusCode, entry.GetProperty("detail").GetProperty("status").GetInt32());
            Assert.Matches("^[a-zA-Z]+\\.[a-z]+$", Text(entry, "action"));
        }
    }

    [Theory]
    [InlineData("PUT", "document", "{}", 428)]
    [InlineData("PUT", "schedule", """{"cron":"x"}""", 422)]
    [InlineData("PUT", "schedule", """{"crown":"x"}""", 400)]
    [InlineData("POST", "runs", """{"iterations":1}""", 422)]
    [InlineData("DELETE", "runs/none", null, 404)]
    public async Task WhateverTheReasonItIsTold(string method, string address, string? json, int status)
    {
        await admin.PutJsonAsync("/v1/portfolios/why/document", Samples.Document());
        var before = (await EntriesAsync("portfolio=why")).Count;
        var response = await admin.WriteAsync(new HttpMethod(method), "/v1/portfolios/why/" + address, json);
        Assert.Equal(status, (int)response.StatusCode);
        var entries = await EntriesAsync("portfolio=why");
        Assert.Equal((before + 1, status), (entries.Count, entries[0].GetProperty("detail").GetProperty("status").GetInt32()));
    }

    [Fact]
    public async Task StrangersReadersAndThoseWhoAskTooFastLeaveNoLine()
    {
        await using var own = new PortfolioServer(null, ("Limits:RequestsPerSecond", "1"));
        await own.Client(key: null).PutJsonAsync("/v1/portfolios/x/document", "{}");
        await own.Client("a-wrong-key-of-more-than-thirty-two-characters").PutJsonAsync("/v1/portfolios/x/document", "{}");
        var client = own.Client();
        var answers = await Task.WhenAll(Enumerable.Range(0, 60).Select(_ => client.PutJsonAsync("/v1/portfolios/x/document", "{}")));
        var refused = answers.Count(answer => (int)answer.StatusCode == 422);
        Assert.Equal(60 - refused, answers.Count(answer => (int)answer.StatusCode == 429));
        Assert.InRange(refused, 1, 59);
        HttpResponseMessage read;
        while ((int)(read = await client.ReadAsync("/v1/audit?limit=1000")).StatusCode == 429)
            await Task.Delay(50, TestContext.Current.CancellationToken);
        var actions = (await read.JsonAsync()).GetProperty("items").EnumerateArray().Select(entry => Text(entry, "action"));
        Assert.Equal([.. Enumerable.Repeat("document.put", refused), "key.create"], actions);
    }

    [Fact]
    public async Task EntriesAreFoundByActorActionPortfolioAndDateInPages()
    {
        await using var own = new PortfolioServer();
        var client = own.Client();
        foreach (var id in new[] { "weir", "weir-2", "weir" })
            await client.PutJsonAsync($"/v1/portfolios/{id}/document", Samples.Document(), id == "weir" ? null : "*");
        own.Clock.Advance(TimeSpan.FromDays(1));
        var other = await own.ClientAsync(new Grant(Right.Read, "weir"));
        await other.PutJsonAsync("/v1/portfolios/weir/document", "{}", "*");
        var actor = (await (await other.ReadAsync("/v1/keys/self")).JsonAsync()).GetProperty("id").GetString();

        Assert.Equal(["document.put 403"], await ActionsAsync(client, $"actor={actor}"));
        Assert.Equal(["key.create 0", "key.create 0"], await ActionsAsync(client, "action=key"));
        Assert.Equal(["document.put 403", "document.put 428", "document.put 0"], await ActionsAsync(client, "portfolio=weir"));
        Assert.Equal(["document.put 412"], await ActionsAsync(client, "portfolio=weir-2"));
        Assert.Equal(2, (await ActionsAsync(client, "from=2027-01-05")).Count);
        Assert.Equal(4, (await ActionsAsync(client, "to=2027-01-04")).Count);
        Assert.Empty(await ActionsAsync(client, "from=2027-01-06&to=2027-01-06"));
        Assert.Equal(422, (int)(await client.ReadAsync("/v1/audit?from=yesterday")).StatusCode);

        var page = await (await client.ReadAsync("/v1/audit?limit=4&action=")).JsonAsync();
        Assert.Equal([6, 5, 4, 3], page.GetProperty("items").EnumerateArray().Select(Number));
        var rest = await (await client.ReadAsync($"/v1/audit?limit=4&cursor={page.GetProperty("next").GetString()}")).JsonAsync();
        Assert.Equal([2, 1], rest.GetProperty("items").EnumerateArray().Select(Number));
    }

    private static async Task<List<string>> ActionsAsync(HttpClient client, string query) =>
    [
        .. (await (await client.ReadAsync("/v1/audit?" + query)).JsonAsync()).GetProperty("items").EnumerateArray()
            .Select(entry => $"{Text(entry, "action")} {(entry.GetProperty("detail").TryGetProperty("status", out var status) ? status.GetInt32() : 0)}"),
    ];
}
