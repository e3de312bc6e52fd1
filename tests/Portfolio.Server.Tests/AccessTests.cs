using System.Net;
using System.Net.Http.Headers;
using System.Text;
using Microsoft.AspNetCore.Authorization;
using Microsoft.AspNetCore.Routing;
using Microsoft.Extensions.DependencyInjection;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Store.Access;

namespace Portfolio.Server.Tests;

public sealed class AccessTests(ServerFixture fixture) : IClassFixture<ServerFixture>
{
    private readonly PortfolioServer server = fixture.Server;

    [Theory]
    [InlineData(null)]
    [InlineData("Bearer wrong")]
    [InlineData("Basic !!!")]
    [InlineData("Basic bm9jb2xvbg==")]
    [InlineData("Digest x")]
    public async Task WithoutAValidKeyEverythingIs401(string? authorization)
    {
        var client = server.Client(key: null);
        if (authorization is not null)
            client.DefaultRequestHeaders.TryAddWithoutValidation("Authorization", authorization);
        foreach (var address in new[] { "/v1/portfolios", "/v1/portfolios/x/document", "/v1/portfolios/x/revisions", "/v1/portfolios/x/revisions/1" })
        {
            var response = await client.ReadAsync(address);
            await response.ProblemAsync(401, "unauthorized");
            Assert.Equal(["Bearer", "Basic"], response.Headers.WwwAuthenticate.Select(challenge => challenge.Scheme));
        }
    }

    // What a browser says of a write without a body that another site's page asks for; it sends along the password that it remembers.
    [Theory]
    [InlineData("Sec-Fetch-Site", "cross-site", false)]
    [InlineData("Sec-Fetch-Site", "same-site", false)]
    [InlineData("Sec-Fetch-Site", "same-origin", true)]
    [InlineData("Sec-Fetch-Site", "none", true)]
    [InlineData("Origin", "https://elsewhere.example", false)]
    [InlineData("Origin", "http://localhost:1", false)]
    [InlineData("Origin", "null", false)]
    [InlineData("Origin", "http://localhost", true)]
    public async Task APageOfAnotherSiteCannotWrite(string header, string value, bool taken)
    {
        var client = server.Client();
        var portfolio = $"/v1/portfolios/{Guid.NewGuid()}";
        await client.PutJsonAsync($"{portfolio}/document", Samples.Document());
        client.DefaultRequestHeaders.TryAddWithoutValidation(header, value);
        var answer = await client.PostAsync($"{portfolio}/runs", null, TestContext.Current.CancellationToken);
        if (!taken)
            await answer.ProblemAsync(403, "other-site");
        Assert.Equal(taken ? HttpStatusCode.Accepted : HttpStatusCode.Forbidden, answer.StatusCode);
        Assert.Equal(HttpStatusCode.OK, (await client.ReadAsync($"{portfolio}/document")).StatusCode);
    }

    [Fact]
    public async Task TheKeyIsTakenAsBasicPassword()
    {
        var client = server.Client(key: null);
        var credentials = Convert.ToBase64String(Encoding.UTF8.GetBytes("anyone:" + PortfolioServer.AdminKey));
        client.DefaultRequestHeaders.Authorization = new AuthenticationHeaderValue("Basic", credentials);
        Assert.Equal(HttpStatusCode.OK, (await client.ReadAsync("/v1/portfolios")).StatusCode);
    }

    [Theory]
    [InlineData(Right.Read, "mine", 200, 200, 403)]
    [InlineData(Right.Read, "*", 200, 200, 403)]
    [InlineData(Right.Submit, "mine", 403, 403, 403)]
    [InlineData(Right.Finance, "mine", 403, 403, 403)]
    [InlineData(Right.Manage, "mine", 200, 200, 200)]
    [InlineData(Right.Admin, "mine", 200, 200, 200)]
    [InlineData(Right.Manage, "yours", 404, 404, 404)]
    [InlineData(Right.Admin, "yours", 404, 404, 404)]
    public async Task RightsOpenExactlyTheirRoutes(Right right, string portfolio, int document, int revisions, int put)
    {
        await server.Client().PutJsonAsync("/v1/portfolios/mine/document", Samples.Document(), "*");
        await server.Client().PutJsonAsync("/v1/portfolios/mine/document", Samples.Document());
        var client = await server.ClientAsync(new Grant(right, portfolio));
        Assert.Equal(document, (int)(await client.ReadAsync("/v1/portfolios/mine/document")).StatusCode);
        Assert.Equal(revisions, (int)(await client.ReadAsync("/v1/portfolios/mine/revisions")).StatusCode);
        Assert.Equal(put, (int)(await client.PutJsonAsync("/v1/portfolios/mine/document", Samples.Document(), "*")).StatusCode);
    }

    [Fact]
    public async Task OnlyAdministratorsMakePortfolios()
    {
        var manager = await server.ClientAsync(new Grant(Right.Manage, "*"));
        await (await manager.PutJsonAsync("/v1/portfolios/unmade/document", Samples.Document())).ProblemAsync(403, "forbidden");
        var admin = await server.ClientAsync(new Grant(Right.Admin, "made"));
        Assert.Equal(HttpStatusCode.Created, (await admin.PutJsonAsync("/v1/portfolios/made/document", Samples.Document())).StatusCode);
    }

    [Fact]
    public async Task TheListShowsOnlyWhatIsGranted()
    {
        foreach (var id in new[] { "seen", "unseen" })
            await server.Client().PutJsonAsync($"/v1/portfolios/{id}/document", Samples.Document());
        var client = await server.ClientAsync(new Grant(Right.Submit, "seen"));
        var list = await (await client.ReadAsync("/v1/portfolios")).JsonAsync();
        Assert.Equal(["seen"], list.GetProperty("items").EnumerateArray().Select(item => item.GetProperty("portfolio").GetString()));
    }

    [Fact]
    public async Task AReaderOfSomeProjectsSeesTheirPartsAlone()
    {
        await server.Client().PutJsonAsync("/v1/portfolios/partly/document", """
            {"settings":{"name":"n","currency":"EUR"},"projects":[{"id":"a","statusDate":"2027-01-04"},{"id":"b","statusDate":"2027-01-04"}]}
            """);
        var client = await server.ClientAsync(new Grant(Right.Read, "partly", ["b"]));
        Assert.Equal("""{"projects":[{"id":"b","statusDate":"2027-01-04"}]}""", await (await client.ReadAsync("/v1/portfolios/partly/document")).TextAsync());
    }

    [Fact]
    public void EveryRouteButTheOpenOnesNeedsAKey()
    {
        string[] open = ["/docs", "/docs/style.css", "/health/live", "/health/ready", "/openapi.json", "/problems", "/problems/{slug}"];
        var unguarded = server.Services.GetRequiredService<EndpointDataSource>().Endpoints.OfType<RouteEndpoint>()
            .Where(route => route.Metadata.GetMetadata<IAllowAnonymous>() is not null)
            .Select(route => "/" + route.RoutePattern.RawText!.TrimStart('/'));
        Assert.Equal(open, unguarded.Order(StringComparer.Ordinal));
    }

    [Fact]
    public async Task EveryPortfolioRouteAsksForARight()
    {
        foreach (var route in server.Services.GetRequiredService<EndpointDataSource>().Endpoints.OfType<RouteEndpoint>())
            if (route.RoutePattern.RawText!.Contains("{portfolio}", StringComparison.Ordinal))
                Assert.NotEmpty(route.Metadata.GetOrderedMetadata<AuthorizationPolicy>());
        var stranger = await server.ClientAsync(new Grant(Right.Read, "elsewhere"));
        await (await stranger.ReadAsync("/v1/portfolios/never-made/document")).ProblemAsync(404, "not-found");
    }
}
