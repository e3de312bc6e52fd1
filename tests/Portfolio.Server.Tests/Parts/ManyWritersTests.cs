using System.Net;
using Portfolio.Server.Tests.Hosting;

namespace Portfolio.Server.Tests.Parts;

/// <summary>Writers at the same time: none overwrites another unseen, and nothing accepted is lost.</summary>
public sealed class ManyWritersTests(ServerFixture fixture) : IClassFixture<ServerFixture>
{
    private readonly HttpClient client = fixture.Server.Client();

    [Fact]
    public async Task OfFiftyWritersWithOneTagOneWins()
    {
        var at = await client.PortfolioAsync("one-tag");
        var tag = (await client.ReadAsync(at + "/projects/weir")).Tag();
        var answers = await Task.WhenAll(Enumerable.Range(1, 50).Select(
            i => client.PutJsonAsync(at + "/projects/weir", PartCalls.Weir.Replace("Weir", $"Weir {i}"), tag)));
        Assert.Single(answers, answer => answer.StatusCode == HttpStatusCode.OK);
        Assert.Equal(49, answers.Count(answer => answer.StatusCode == HttpStatusCode.PreconditionFailed));
        Assert.Equal(2, (await (await client.ReadAsync(at + "/revisions?limit=1")).JsonAsync()).GetProperty("items")[0].GetProperty("revision").GetInt32());
    }

    [Fact]
    public async Task FiftyNewProjectsAtOnceMakeFiftyRevisions()
    {
        var at = await client.PortfolioAsync("fifty");
        var answers = await Task.WhenAll(Enumerable.Range(1, 50).Select(i => client.PutJsonAsync(
            $"{at}/projects/p{i}", $$"""{"statusDate":"2027-01-04","activities":[{"id":"A","duration":{{i}},"predecessors":["quay/B10"]}]}""")));
        Assert.All(answers, answer => Assert.Equal(HttpStatusCode.Created, answer.StatusCode));
        var revisions = await Task.WhenAll(answers.Select(async answer => (await answer.JsonAsync()).GetProperty("revision").GetInt32()));
        Assert.Equal(Enumerable.Range(2, 50), revisions.Order());

        var projects = (await (await client.ReadAsync(at + "/document")).JsonAsync()).GetProperty("projects").EnumerateArray().ToList();
        Assert.Equal(52, projects.Count);
        Assert.All(Enumerable.Range(1, 50), i => Assert.Equal(i, Assert.Single(projects, project => project.GetProperty("id").GetString() == $"p{i}")
            .GetProperty("activities")[0].GetProperty("duration").GetInt32()));
    }
}
