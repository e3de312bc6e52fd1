using System.Net;
using System.Text.Json;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Runs;

namespace Portfolio.Server.Tests.Access;

public sealed class TokenTests : IAsyncDisposable
{
    private readonly FakeIssuer issuer = new();
    private readonly PortfolioServer server;

    public TokenTests() => server = new PortfolioServer(null, FakeIssuer.Settings) { Outside = issuer.Join };

    // The server's clock: 2027-01-04T12:00Z.
    private const long Now = 1_799_064_000;

    private static string Claims(
        string rights = """["read:works"]""", string sub = "jane", long issued = Now, long expires = Now + 3600, string iss = FakeIssuer.Address,
        string aud = FakeIssuer.Audience, string more = "") =>
        $$"""{"iss":"{{iss}}","aud":"{{aud}}","sub":"{{sub}}","iat":{{issued}},"exp":{{expires}},"portfolio_rights":{{rights}}{{more}}}""";

    private async Task<HttpStatusCode> StatusAsync(string token, string address = "/v1/keys/self") =>
        (await server.Client(token).ReadAsync(address)).StatusCode;

    private async Task<JsonElement> SelfAsync(string token) => await (await server.Client(token).ReadAsync("/v1/keys/self")).JsonAsync();

    [Theory]
    [InlineData("\"read:works\"", """[{"right":"read","portfolio":"works"}]""")]
    [InlineData("""["manage:*","read:works","openid"]""", """[{"right":"manage","portfolio":"*"},{"right":"read","portfolio":"works"}]""")]
    [InlineData("\"submit:works/lock submit:works/quay\"", """[{"right":"submit","portfolio":"works","projects":["lock","quay"]}]""")]
    [InlineData("""["write:works","read:no!good","admin:*/a","Admin:*","admin:","read:a/b/c",":*"]""", "[]")]
    public async Task RightsAreExactlyThoseOfTheClaim(string rights, string grants)
    {
        var self = await SelfAsync(issuer.Sign(Claims(rights, more: ",\"name\":\"Jane Doe\"")));
        Assert.Equal(grants, self.GetProperty("grants").GetRawText());
        Assert.Equal(
            ("oidc:jane", "person", "Jane Doe", "2027-01-04T13:00:00Z"), (self.Text("id"), self.Text("kind"), self.Text("name"), self.Text("expiresAt")));
    }

    [Fact]
    public async Task ThePersonStandsWhereKeysStand()
    {
        var client = server.Client(issuer.Sign(Claims("\"admin:works\"")));
        Assert.Equal(HttpStatusCode.Created, (await client.PutJsonAsync("/v1/portfolios/works/document", Samples.Document())).StatusCode);
        var run = await client.RunAsync("works");
        Assert.Equal("oidc:jane", (await client.ReadRunAsync("works", run)).Text("requestedBy"));
        await client.PutJsonAsync("/v1/portfolios/works/document", "{}", "*");
        var told = (await (await server.Client().ReadAsync("/v1/audit?actor=oidc:jane")).JsonAsync()).GetProperty("items");
        Assert.Equal(
            ["person.claim", "document.put", "run.queued", "document.put"], told.EnumerateArray().Reverse().Select(entry => entry.Text("action")).Where(action => action != "run.succeeded"));
        await (await client.PutJsonAsync("/v1/portfolios/others/document", Samples.Document())).ProblemAsync(404, "not-found");
        await (await client.ReadAsync("/v1/keys")).ProblemAsync(403, "forbidden");
    }

    [Fact]
    public async Task WhereNoneIsNeededATokenIsNotLookedAt()
    {
        foreach (var address in new[] { "/health/live", "/openapi.json" })
            Assert.Equal(HttpStatusCode.OK, await StatusAsync(issuer.Sign(Claims()), address));
        var known = (await (await server.Client().ReadAsync("/v1/keys")).JsonAsync()).GetProperty("items");
        Assert.Equal("key", Assert.Single(known.EnumerateArray()).Text("kind"));
    }

    [Fact]
    public async Task ATokenThatIsNotGoodIs401()
    {
        string[] bad =
        [
            issuer.Sign(Claims(iss: "https://another.invalid")),
            issuer.Sign(Claims(aud: "another")),
            issuer.Sign(Claims(expires: Now)),
            issuer.Sign(Claims(more: $",\"nbf\":{Now + 61}")),
            issuer.Sign(Claims(issued: Now + 61)),
            issuer.Sign(Claims(sub: "")),
            issuer.Sign(Claims(sub: new string('x', 256))),
            issuer.Sign(Claims().Replace($"\"exp\":{Now + 3600},", "", StringComparison.Ordinal)),
            issuer.Sign(Claims().Replace($"\"iat\":{Now},", "", StringComparison.Ordinal)),
            issuer.Sign(Claims(), """{"alg":"RS512","typ":"JWT","kid":"one"}"""),
            issuer.Sign(Claims(), """{"alg":"none","typ":"JWT"}"""),
            issuer.SignByAnother(Claims()),
            issuer.SignWithPublicKey(Claims()),
            FakeIssuer.Unsigned(Claims()),
            FakeIssuer.Unsigned(Claims(), """{"alg":"RS256","typ":"JWT","kid":"one"}"""),
            issuer.Sign(Claims())[..^8] + "AAAAAAAA",
            "eyJhbGciOiJSUzI1NiJ9.e30.",
            "ey..",
        ];
        foreach (var token in bad)
        {
            var response = await server.Client(token).ReadAsync("/v1/keys/self");
            await response.ProblemAsync(401, "unauthorized");
            Assert.Equal(["Bearer", "Basic"], response.Headers.WwwAuthenticate.Select(challenge => challenge.Scheme));
        }
        Assert.Equal(HttpStatusCode.OK, await StatusAsync(issuer.Sign(Claims())));
        Assert.Equal(HttpStatusCode.OK, await StatusAsync(PortfolioServer.AdminKey));
    }

    [Fact]
    public async Task ATokenEndsWhenItSays()
    {
        var token = issuer.Sign(Claims("\"read:*\""));
        Assert.Equal(HttpStatusCode.OK, await StatusAsync(token));
        server.Clock.Advance(TimeSpan.FromHours(1) - TimeSpan.FromMilliseconds(1));
        Assert.Equal(HttpStatusCode.OK, await StatusAsync(token, "/v1/portfolios"));
        server.Clock.Advance(TimeSpan.FromMilliseconds(1));
        Assert.Equal(HttpStatusCode.Unauthorized, await StatusAsync(token));
    }

    [Fact]
    public async Task TheNewestTokenDecides()
    {
        await server.Client().PutJsonAsync("/v1/portfolios/works/document", Samples.Document());
        var wide = issuer.Sign(Claims("\"admin:*\"", expires: Now + 7200));
        var narrow = issuer.Sign(Claims("\"read:works\"", issued: Now + 10));
        Assert.Equal(HttpStatusCode.OK, await StatusAsync(wide, "/v1/keys"));
        Assert.Equal(HttpStatusCode.OK, await StatusAsync(narrow, "/v1/portfolios/works/document"));
        Assert.Equal(HttpStatusCode.Forbidden, await StatusAsync(narrow, "/v1/keys"));
        Assert.Equal(HttpStatusCode.Unauthorized, await StatusAsync(wide, "/v1/keys"));
        var again = issuer.Sign(Claims("\"admin:*\"", issued: Now + 20));
        Assert.Equal(HttpStatusCode.OK, await StatusAsync(again, "/v1/keys"));
        Assert.Equal(HttpStatusCode.OK, await StatusAsync(wide, "/v1/keys"));
    }

    [Fact]
    public async Task APersonIsShutOutAndOtherwiseLeftToTheIssuer()
    {
        var token = issuer.Sign(Claims(sub: "a/b"));
        Assert.Equal("oidc:a/b", (await SelfAsync(token)).Text("id"));
        const string Address = "/v1/keys/oidc:a%2Fb";
        await (await server.Client().MergeAsync(Address, """{"name":"x"}""")).ProblemAsync(409, "key-of-person");
        await (await server.Client().PostJsonAsync(Address + "/rotate")).ProblemAsync(409, "key-of-person");
        Assert.Equal(HttpStatusCode.OK, (await server.Client().RemoveAsync(Address)).StatusCode);
        Assert.Equal(HttpStatusCode.Unauthorized, await StatusAsync(token));
        Assert.Equal(HttpStatusCode.Unauthorized, await StatusAsync(issuer.Sign(Claims("\"admin:*\"", sub: "a/b", issued: Now + 5))));
        Assert.Equal(HttpStatusCode.OK, await StatusAsync(issuer.Sign(Claims(sub: "another"))));
    }

    [Fact]
    public async Task APersonIsNoAdministratorOnWhomTheServerCounts()
    {
        Assert.Equal(HttpStatusCode.OK, await StatusAsync(issuer.Sign(Claims("\"admin:*\"")), "/v1/keys"));
        var own = (await SelfAsync(PortfolioServer.AdminKey)).Text("id");
        await (await server.Client(issuer.Sign(Claims("\"admin:*\""))).RemoveAsync("/v1/keys/" + own)).ProblemAsync(409, "last-administrator");
    }

    [Fact]
    public async Task WithoutAnIssuerATokenIsAKeyThatNobodyKnows()
    {
        await using var plain = new PortfolioServer();
        await (await plain.Client(issuer.Sign(Claims("\"admin:*\""))).ReadAsync("/v1/keys/self")).ProblemAsync(401, "unauthorized");
    }

    public async ValueTask DisposeAsync()
    {
        await server.DisposeAsync();
        issuer.Dispose();
    }
}
