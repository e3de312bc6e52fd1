using System.Net;
using Microsoft.Extensions.DependencyInjection;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Tests.Parts;

public sealed class ProjectListTests(ServerFixture fixture) : IClassFixture<ServerFixture>
{
    private readonly HttpClient client = fixture.Server.Client();

    [Fact]
    public async Task ProjectsAreListedInDocumentOrderInPages()
    {
        var at = await client.PortfolioAsync("list") + "/projects";
        await client.PutJsonAsync(at + "/basin", """{"statusDate":"2027-01-04"}""");
        var first = await client.ReadAsync(at + "?limit=2");
        var page = await first.JsonAsync();
        var weir = page.GetProperty("items")[0];
        Assert.Equal(
            ("weir", "Weir", "river", 2, (await client.ReadAsync(at + "/weir")).Tag()),
            (weir.GetProperty("id").GetString(), weir.GetProperty("name").GetString(), weir.GetProperty("programme").GetString(), weir.GetProperty("activities").GetInt32(), weir.GetProperty("etag").GetString()));
        Assert.Equal("quay", page.GetProperty("items")[1].GetProperty("id").GetString());
        Assert.Equal(HttpStatusCode.NotModified, (await client.ReadAsync(at + "?limit=2", first.Tag())).StatusCode);

        var next = await (await client.ReadAsync(first.Headers.GetValues("Link").Single().Split('<', '>')[1])).JsonAsync();
        Assert.Equal("""{"items":[{"id":"basin","activities":0,""", next.ToString()[..39]);
        Assert.False(next.TryGetProperty("next", out _));
        Assert.Equal(["weir", "quay"], await IdsAsync(client, at + "?revision=1"));
        await (await client.ReadAsync(at + "?revision=9")).ProblemAsync(404, "not-found");
        await (await client.ReadAsync(at + "?limit=0")).ProblemAsync(422, "refused");
    }

    [Fact]
    public async Task AKeyLimitedToProjectsSeesThose()
    {
        var at = await client.PortfolioAsync("list-some") + "/projects";
        Assert.Equal(["quay"], await IdsAsync(await fixture.Server.ClientAsync(new Grant(Right.Read, "list-some", ["quay"])), at));
        Assert.Equal(["weir"], await IdsAsync(await fixture.Server.ClientAsync(new Grant(Right.Submit, "list-some", ["weir"])), at));
        await (await (await fixture.Server.ClientAsync(new Grant(Right.Finance, "list-some"))).ReadAsync(at)).ProblemAsync(403, "forbidden");
    }

    [Fact]
    public async Task OutlinesOutliveTheProcess()
    {
        var directory = Directory.CreateTempSubdirectory("portfolio-").FullName;
        await using (var server = new PortfolioServer(directory))
            await server.Client().PortfolioAsync("again");
        await using (var server = new PortfolioServer(directory))
        {
            var (again, at) = (server.Client(), "/v1/portfolios/again");
            Assert.Equal([("activity.unknown", "quay/B20", ""), ("activity.unknown", "weir/A20", "")], await (await again.RemoveAsync(at + "/projects/quay/activities/B10", "*")).RefusedAsync());
            Assert.Equal([("demand.never-fits", "weir/A10", "")], await (await again.PutJsonAsync(at + "/settings", PartCalls.Settings.Replace("\"capacity\":2", "\"capacity\":1"), "*")).RefusedAsync());
            await (await again.PutJsonAsync(at + "/settings", PartCalls.Settings.Replace("Harbour", "Works"), "*")).WrittenAsync(200, 2);
            var weir = (await (await again.ReadAsync(at + "/projects")).JsonAsync()).GetProperty("items")[0];
            Assert.Equal(("Weir", "river", 2), (weir.GetProperty("name").GetString(), weir.GetProperty("programme").GetString(), weir.GetProperty("activities").GetInt32()));
        }
        Directory.Delete(directory, recursive: true);
    }

    [Fact]
    public async Task WhatWasStoredWithoutOutlinesIsReadFromTheContent()
    {
        ProposedPart[] parts = [Part("", PartCalls.Settings), Part("weir", PartCalls.Weir), Part("quay", PartCalls.Quay)];
        await fixture.Server.Services.GetRequiredService<DocumentStore>().WriteAsync(
            Caller.System, new DocumentWrite { Portfolio = "old", Action = "document.put" },
            (_, _) => Task.FromResult<Proposal>(new Change(parts)), TestContext.Current.CancellationToken);
        Assert.Equal([("project.unknown", "weir/A20", "")], await (await client.RemoveAsync("/v1/portfolios/old/projects/quay", "*")).RefusedAsync());
        Assert.Equal(["weir", "quay"], await IdsAsync(client, "/v1/portfolios/old/projects"));
    }

    private static ProposedPart Part(string project, string json) => new(project, System.Text.Encoding.UTF8.GetBytes(json.Replace("Weir", "Old")));

    private static async Task<IReadOnlyList<string?>> IdsAsync(HttpClient who, string address) =>
        [.. (await (await who.ReadAsync(address)).JsonAsync()).GetProperty("items").EnumerateArray().Select(project => project.GetProperty("id").GetString())];
}
