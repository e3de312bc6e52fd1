using System.Net.Http.Headers;
using System.Text;
using Portfolio.Server.Tests.Hosting;

namespace Portfolio.Server.Tests.Parts;

/// <summary>
/// Names and texts that are not UTF-8 or hold half a surrogate pair, where JSON is kept as it came and not read into a type.
/// </summary>
public sealed class BrokenTextTests(ServerFixture fixture) : IClassFixture<ServerFixture>
{
    private const string Patch = "application/merge-patch+json";

    private readonly HttpClient client = fixture.Server.Client();

    // In Latin-1, é is a byte that begins a longer character in UTF-8.
    [Theory]
    [InlineData("PATCH", "settings", Patch, """{"nam\ud800e":null}""", "", 15)]
    [InlineData("PATCH", "settings", Patch, """{"name":"\udc00"}""", "/name", 17)]
    [InlineData("PATCH", "settings", Patch, """{"namé":null}""", "", 9)]
    [InlineData("PATCH", "projects/weir", Patch, """{"tags":{"é":"a"}}""", "/tags", 14)]
    [InlineData("PATCH", "projects/weir/activities/A10", Patch, """{"name":"é"}""", "/name", 12)]
    [InlineData("POST", "updates", "application/json", """{"updates":[{"project":"weir","tags":{"é":"a"}}]}""", "/updates/0/tags", 43)]
    public async Task TheyAreRefusedWithTheirPlace(string method, string part, string type, string body, string path, int column)
    {
        await client.PortfolioAsync($"broken-{column}");
        var request = new HttpRequestMessage(new HttpMethod(method), $"/v1/portfolios/broken-{column}/{part}")
        {
            Content = new ByteArrayContent(Encoding.Latin1.GetBytes(body)) { Headers = { ContentType = new MediaTypeHeaderValue(type) } },
        };
        var problem = await (await client.SendAsync(request, TestContext.Current.CancellationToken)).ProblemAsync(400, "malformed");
        Assert.Equal((path, "json.malformed"), Assert.Single(problem.Faults()));
        Assert.Contains($"line 1, column {column}.", problem.GetProperty("errors")[0].GetProperty("message").GetString());
    }
}
