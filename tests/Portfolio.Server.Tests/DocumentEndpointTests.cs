using System.Net;
using Portfolio.Server.Tests.Hosting;

namespace Portfolio.Server.Tests;

public sealed class DocumentEndpointTests(ServerFixture fixture) : IClassFixture<ServerFixture>
{
    private readonly HttpClient client = fixture.Server.Client();

    [Fact]
    public async Task ANewDocumentIsCreatedAndReadBackByteForByte()
    {
        var created = await client.PutJsonAsync("/v1/portfolios/created/document?note=first", Samples.Document());
        Assert.Equal(HttpStatusCode.Created, created.StatusCode);
        Assert.Equal("""{"portfolio":"created","revision":1,"changed":true}""", await created.TextAsync());
        Assert.Equal("/v1/portfolios/created/document", created.Headers.Location?.ToString());

        var read = await client.ReadAsync("/v1/portfolios/created/document");
        Assert.Equal(Samples.Document(), await read.TextAsync());
        Assert.Equal(created.Tag(), read.Tag());
        Assert.Equal("/v1/portfolios/created/document?revision=1", read.Content.Headers.ContentLocation?.ToString());
        Assert.Equal(HttpStatusCode.NotModified, (await client.ReadAsync("/v1/portfolios/created/document", read.Tag())).StatusCode);
    }

    [Fact]
    public async Task ReplacingNeedsTheTagOfWhatIsThere()
    {
        const string address = "/v1/portfolios/replaced/document";
        var first = await client.PutJsonAsync(address, Samples.Document());
        await (await client.PutJsonAsync(address, Samples.Document("Other"))).ProblemAsync(428, "precondition-required");
        await (await client.PutJsonAsync(address, Samples.Document("Other"), "\"0000\"")).ProblemAsync(412, "precondition-failed");
        await (await client.PutJsonAsync(address, Samples.Document("Other"), "W/" + first.Tag())).ProblemAsync(412, "precondition-failed");
        Assert.Equal(Samples.Document(), await (await client.ReadAsync(address)).TextAsync());

        var second = await client.PutJsonAsync(address, Samples.Document("Other"), first.Tag());
        Assert.Equal("""{"portfolio":"replaced","revision":2,"changed":true}""", await second.TextAsync());
        var same = await client.PutJsonAsync(address, Samples.Document("Other"), "*");
        Assert.Equal("""{"portfolio":"replaced","revision":2,"changed":false}""", await same.TextAsync());
        Assert.Equal(second.Tag(), same.Tag());
    }

    [Fact]
    public async Task IfMatchOnNothingIsAFailedPrecondition() =>
        await (await client.PutJsonAsync("/v1/portfolios/nothing/document", Samples.Document(), "*")).ProblemAsync(412, "precondition-failed");

    [Fact]
    public async Task CreateOnlyLeavesWhatIsThere()
    {
        const string address = "/v1/portfolios/once/document";
        foreach (var status in new[] { HttpStatusCode.Created, HttpStatusCode.PreconditionFailed })
        {
            var request = new HttpRequestMessage(HttpMethod.Put, address) { Content = new StringContent(Samples.Document(), null, "application/json") };
            request.Headers.TryAddWithoutValidation("If-None-Match", "*");
            Assert.Equal(status, (await client.SendAsync(request, TestContext.Current.CancellationToken)).StatusCode);
        }
    }

    [Fact]
    public async Task ThePastStaysReadableByRevisionAndByDate()
    {
        await using var server = new PortfolioServer();
        var admin = server.Client();
        const string address = "/v1/portfolios/past/document";
        await admin.PutJsonAsync(address, Samples.Document(days: 5));
        server.Clock.Advance(TimeSpan.FromDays(1));
        await admin.PutJsonAsync(address, Samples.Document(days: 6), "*");

        Assert.Equal(Samples.Document(days: 5), await (await admin.ReadAsync(address + "?revision=1")).TextAsync());
        Assert.Equal(Samples.Document(days: 5), await (await admin.ReadAsync(address + "?asOf=2027-01-04")).TextAsync());
        Assert.Equal(Samples.Document(days: 6), await (await admin.ReadAsync(address + "?asOf=2027-01-05")).TextAsync());
        await (await admin.ReadAsync(address + "?asOf=2027-01-03")).ProblemAsync(404, "not-found");
        await (await admin.ReadAsync(address + "?revision=3")).ProblemAsync(404, "not-found");
        await (await admin.ReadAsync(address + "?revision=1&asOf=2027-01-04")).ProblemAsync(422, "refused");
        await (await admin.ReadAsync(address + "?revision=one")).ProblemAsync(422, "refused");
    }

    [Fact]
    public async Task RevisionsAreListedNewestFirstInPages()
    {
        const string portfolio = "/v1/portfolios/paged";
        for (var days = 1; days <= 3; days++)
            await client.PutJsonAsync($"{portfolio}/document?note=day{days}", Samples.Document(days: days), days == 1 ? null : "*");

        var first = await client.ReadAsync(portfolio + "/revisions?limit=2");
        var page = await first.JsonAsync();
        Assert.Equal([3, 2], page.GetProperty("items").EnumerateArray().Select(item => item.GetProperty("revision").GetInt32()));
        Assert.Equal("day3", page.GetProperty("items")[0].GetProperty("note").GetString());
        var link = Assert.Single(first.Headers.GetValues("Link"));
        Assert.EndsWith("; rel=\"next\"", link);

        var next = await (await client.ReadAsync(link[1..link.IndexOf('>')])).JsonAsync();
        Assert.Equal(1, Assert.Single(next.GetProperty("items").EnumerateArray()).GetProperty("revision").GetInt32());
        Assert.False(next.TryGetProperty("next", out _));

        var single = await (await client.ReadAsync(portfolio + "/revisions/2")).JsonAsync();
        Assert.Equal("2027-01-04T12:00:00Z", single.GetProperty("recordedAt").GetString());
        await (await client.ReadAsync(portfolio + "/revisions/9")).ProblemAsync(404, "not-found");
        await (await client.ReadAsync(portfolio + "/revisions?limit=0")).ProblemAsync(422, "refused");
        await (await client.ReadAsync(portfolio + "/revisions?cursor=x")).ProblemAsync(422, "refused");
    }

    [Fact]
    public async Task PortfoliosAreListedById()
    {
        await using var server = new PortfolioServer();
        foreach (var id in new[] { "b", "a", "c" })
            await server.Client().PutJsonAsync($"/v1/portfolios/{id}/document", Samples.Document());
        var first = await (await server.Client().ReadAsync("/v1/portfolios?limit=2")).JsonAsync();
        Assert.Equal(["a", "b"], first.GetProperty("items").EnumerateArray().Select(item => item.GetProperty("portfolio").GetString()));
        var second = await (await server.Client().ReadAsync($"/v1/portfolios?limit=2&cursor={first.GetProperty("next")}")).JsonAsync();
        Assert.Equal("c", Assert.Single(second.GetProperty("items").EnumerateArray()).GetProperty("portfolio").GetString());
    }

    [Fact]
    public async Task SizeMediaTypeAndMethodAreHeldTo()
    {
        await using var server = new PortfolioServer(null, ("Limits:DocumentBody", "2000"));
        var small = server.Client();
        const string address = "/v1/portfolios/limits/document";
        await (await small.PutJsonAsync(address, Samples.Document(name: new string('x', 2000)))).ProblemAsync(413, "too-large");
        var text = await small.PutAsync(address, new StringContent("id,name"), TestContext.Current.CancellationToken);
        await text.ProblemAsync(415, "unsupported-media-type");
        var deleted = await small.DeleteAsync("/v1/portfolios", TestContext.Current.CancellationToken);
        await deleted.ProblemAsync(405, "method-not-allowed");
        Assert.Contains("GET", deleted.Content.Headers.Allow);
        await (await small.ReadAsync("/v1/nowhere")).ProblemAsync(404, "not-found");
        await (await small.PutJsonAsync(address + "?note=" + new string('n', 501), Samples.Document())).ProblemAsync(422, "refused");
    }
}
