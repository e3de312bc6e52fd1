using System.Net;
using System.Text.Json;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Store.Access;

namespace Portfolio.Server.Tests.Access;

public sealed class KeyEndpointTests(ServerFixture fixture) : IClassFixture<ServerFixture>
{
    private const string Sound = """{"name":"weir team","grants":[{"right":"submit","portfolio":"not-made-yet","projects":["weir-lock"]}]}""";

    private readonly PortfolioServer server = fixture.Server;
    private readonly HttpClient admin = fixture.Server.Client();

    private async Task<JsonElement> MakeAsync(string json = Sound)
    {
        var response = await admin.PostJsonAsync("/v1/keys", json);
        Assert.Equal(HttpStatusCode.Created, response.StatusCode);
        Assert.True(response.Headers.CacheControl!.NoStore);
        var key = await response.JsonAsync();
        Assert.Equal("/v1/keys/" + Id(key), response.Headers.Location!.ToString());
        return key;
    }

    private static string Id(JsonElement key) => key.GetProperty("id").GetString()!;

    private static string Secret(JsonElement key) => key.GetProperty("secret").GetString()!;

    private async Task<HttpStatusCode> StatusAsync(string secret) =>
        (await server.Client(secret).ReadAsync("/v1/keys/self")).StatusCode;

    [Fact]
    public async Task AKeyIsMadeShownOnceAndOpensWhatItGrants()
    {
        var key = await MakeAsync();
        Assert.Matches("^pfk_[0-9a-f]{16}_[A-Za-z0-9_-]{43}$", Secret(key));
        var shown = await (await admin.ReadAsync("/v1/keys/" + Id(key))).TextAsync();
        Assert.DoesNotContain("secret", shown, StringComparison.OrdinalIgnoreCase);
        Assert.Contains("""
            "grants":[{"right":"submit","portfolio":"not-made-yet","projects":["weir-lock"]}],"createdAt":"2027-01-04T12:00:00Z"
            """.Trim(), shown, StringComparison.Ordinal);
        var self = await (await server.Client(Secret(key)).ReadAsync("/v1/keys/self")).JsonAsync();
        Assert.Equal((Id(key), "weir team", "2027-01-04T12:00:00Z"), (Id(self), self.GetProperty("name").GetString(), self.GetProperty("lastUsedAt").GetString()));
        await (await server.Client(Secret(key)).ReadAsync("/v1/keys")).ProblemAsync(403, "forbidden");
    }

    [Fact]
    public async Task AllFaultsOfAKeyComeAtOnce()
    {
        var problem = await (await admin.PostJsonAsync("/v1/keys", """
            {"name":"a\nb","expiresAt":"2027-01-04T12:00:00Z",
             "grants":[{"right":"write","portfolio":"*"},{"right":"read","portfolio":"no good"},{"portfolio":"p","projects":[]},
                       {"right":"read","portfolio":"p","projects":["ok","../x"]},{"right":"manage","portfolio":"q"},{"right":"manage","portfolio":"q"}]}
            """)).ProblemAsync(422, "refused");
        Assert.Equal(
            [
                ("/name", "text.control"), ("/grants/0/right", "value.unknown"), ("/grants/1/portfolio", "id.format"),
                ("/grants/2", "member.missing"), ("/grants/2/projects", "grant.projects-empty"), ("/grants/3/projects/1", "id.format"),
                ("/grants/5", "grant.repeated"), ("/expiresAt", "expiry.past"),
            ],
            problem.Faults());
    }

    [Theory]
    [InlineData("{}", "", "member.missing", "", "member.missing")]
    [InlineData("""{"name":"x","grants":[],"expiresAt":"tomorrow"}""", "/grants", "grants.empty", "/expiresAt", "instant.format")]
    public async Task WhatIsMissingOrEmptyIsNamed(string json, string path, string code, string path2, string code2) =>
        Assert.Equal([(path, code), (path2, code2)], (await (await admin.PostJsonAsync("/v1/keys", json)).ProblemAsync(422, "refused")).Faults());

    [Fact]
    public async Task AnUnknownMemberIsRefused() =>
        Assert.Equal([("/secret", "member.unknown")], (await (await admin.PostJsonAsync("/v1/keys", """{"secret":"mine"}""")).ProblemAsync(400, "malformed")).Faults());

    [Fact]
    public async Task APatchChangesWhatItNames()
    {
        var key = await MakeAsync();
        var address = "/v1/keys/" + Id(key);
        var ending = await (await admin.MergeAsync(address, """{"expiresAt":"2027-01-04T12:00:01Z"}""")).JsonAsync();
        Assert.Equal(("weir team", "2027-01-04T12:00:01Z"), (ending.GetProperty("name").GetString(), ending.GetProperty("expiresAt").GetString()));
        Assert.Equal(HttpStatusCode.OK, await StatusAsync(Secret(key)));
        var wider = await (await admin.MergeAsync(address, """{"expiresAt":null,"grants":[{"right":"admin","portfolio":"*"}]}""")).JsonAsync();
        Assert.False(wider.TryGetProperty("expiresAt", out _));
        Assert.Equal(HttpStatusCode.OK, (await server.Client(Secret(key)).ReadAsync("/v1/keys")).StatusCode);
        Assert.Equal([("", "member.missing")], (await (await admin.MergeAsync(address, """{"name":null}""")).ProblemAsync(422, "refused")).Faults());
        await (await admin.MergeAsync("/v1/keys/0123456789abcdef", """{"name":"x"}""")).ProblemAsync(404, "not-found");
    }

    [Fact]
    public async Task ARotatedKeyOpensWithBothTextsForAWhile()
    {
        await using var own = new PortfolioServer();
        var client = own.Client();
        var key = await (await client.PostJsonAsync("/v1/keys", Sound)).JsonAsync();
        var response = await client.PostJsonAsync($"/v1/keys/{Id(key)}/rotate", """{"overlapHours":2}""");
        Assert.True(response.Headers.CacheControl!.NoStore);
        var rotated = await response.JsonAsync();
        Assert.Equal((Id(key), "2027-01-04T14:00:00Z"), (Id(rotated), rotated.GetProperty("oldSecretUntil").GetString()));
        Assert.NotEqual(Secret(key), Secret(rotated));
        foreach (var (minutes, old) in new[] { (119, HttpStatusCode.OK), (1, HttpStatusCode.Unauthorized) })
        {
            own.Clock.Advance(TimeSpan.FromMinutes(minutes));
            Assert.Equal(old, (await own.Client(Secret(key)).ReadAsync("/v1/keys/self")).StatusCode);
            Assert.Equal(HttpStatusCode.OK, (await own.Client(Secret(rotated)).ReadAsync("/v1/keys/self")).StatusCode);
        }
        var third = await (await client.PostJsonAsync($"/v1/keys/{Id(key)}/rotate", """{"overlapHours":0}""")).JsonAsync();
        Assert.Equal(HttpStatusCode.Unauthorized, (await own.Client(Secret(rotated)).ReadAsync("/v1/keys/self")).StatusCode);
        Assert.Equal(HttpStatusCode.OK, (await own.Client(Secret(third)).ReadAsync("/v1/keys/self")).StatusCode);
    }

    [Fact]
    public async Task TheFirstAdministratorsOwnTextCanBeRotatedAway()
    {
        await using var own = new PortfolioServer();
        var first = await (await own.Client().ReadAsync("/v1/keys/self")).JsonAsync();
        var rotated = await (await own.Client().PostJsonAsync($"/v1/keys/{Id(first)}/rotate")).JsonAsync();
        own.Clock.Advance(TimeSpan.FromHours(23));
        Assert.Equal(HttpStatusCode.OK, (await own.Client().ReadAsync("/v1/keys/self")).StatusCode);
        own.Clock.Advance(TimeSpan.FromHours(1));
        Assert.Equal(HttpStatusCode.Unauthorized, (await own.Client().ReadAsync("/v1/keys/self")).StatusCode);
        Assert.Equal(HttpStatusCode.OK, (await own.Client(Secret(rotated)).ReadAsync("/v1/keys/self")).StatusCode);
    }

    [Theory]
    [InlineData("-1")]
    [InlineData("720.5")]
    [InlineData("1e999")]
    public async Task AnOverlapHasLimits(string hours)
    {
        var key = await MakeAsync();
        var problem = await (await admin.PostJsonAsync($"/v1/keys/{Id(key)}/rotate", $$"""{"overlapHours":{{hours}}}""")).ProblemAsync(422, "refused");
        Assert.Equal([("/overlapHours", "overlap.range")], problem.Faults());
        Assert.Equal(HttpStatusCode.OK, await StatusAsync(Secret(key)));
    }

    [Fact]
    public async Task ARevokedKeyOpensNothingAndIsNotBroughtBack()
    {
        var key = await MakeAsync();
        var address = "/v1/keys/" + Id(key);
        Assert.Equal("2027-01-04T12:00:00Z", (await (await admin.RemoveAsync(address)).JsonAsync()).GetProperty("revokedAt").GetString());
        Assert.Equal(HttpStatusCode.Unauthorized, await StatusAsync(Secret(key)));
        await (await admin.PostJsonAsync(address + "/rotate")).ProblemAsync(409, "key-ended");
        await (await admin.MergeAsync(address, """{"name":"x"}""")).ProblemAsync(409, "key-ended");
        Assert.Equal(HttpStatusCode.OK, (await admin.RemoveAsync(address)).StatusCode);
        await (await admin.RemoveAsync("/v1/keys/nobody")).ProblemAsync(404, "not-found");
    }

    [Fact]
    public async Task TheLastAdministratorStays()
    {
        await using var own = new PortfolioServer();
        var client = own.Client();
        var address = "/v1/keys/" + Id(await (await client.ReadAsync("/v1/keys/self")).JsonAsync());
        const string Admin = """{"name":"second","grants":[{"right":"admin","portfolio":"*"}]}""";
        var second = await (await client.PostJsonAsync("/v1/keys", Admin.Replace("}]", "}],\"expiresAt\":\"2028-01-01T00:00:00Z\"", StringComparison.Ordinal))).JsonAsync();
        // One that will end by itself does not count.
        await (await client.RemoveAsync(address)).ProblemAsync(409, "last-administrator");
        await (await client.MergeAsync(address, """{"expiresAt":"2030-01-01T00:00:00Z"}""")).ProblemAsync(409, "last-administrator");
        await (await client.MergeAsync(address, """{"grants":[{"right":"admin","portfolio":"one"}]}""")).ProblemAsync(409, "last-administrator");
        await (await client.MergeAsync(address, """{"grants":[{"right":"admin","portfolio":"*","projects":["a"]}]}""")).ProblemAsync(409, "last-administrator");
        Assert.Equal(HttpStatusCode.OK, (await client.MergeAsync("/v1/keys/" + Id(second), """{"expiresAt":null}""")).StatusCode);
        Assert.Equal(HttpStatusCode.OK, (await client.RemoveAsync(address)).StatusCode);
        await (await own.Client(Secret(second)).RemoveAsync("/v1/keys/" + Id(second))).ProblemAsync(409, "last-administrator");
    }

    [Fact]
    public async Task KeysComeInPages()
    {
        await using var own = new PortfolioServer();
        for (var i = 0; i < 4; i++)
            await own.Client().PostJsonAsync("/v1/keys", Sound);
        var (seen, address) = (new List<string>(), "/v1/keys?limit=2");
        while (address is not null)
        {
            var page = await (await own.Client().ReadAsync(address)).JsonAsync();
            seen.AddRange(page.GetProperty("items").EnumerateArray().Select(Id));
            address = page.TryGetProperty("next", out var next) ? $"/v1/keys?limit=2&cursor={next.GetString()}" : null;
        }
        Assert.Equal((5, 5), (seen.Count, seen.Distinct().Count()));
    }

    [Theory]
    [InlineData(Right.Admin, "one-portfolio", null)]
    [InlineData(Right.Manage, "*", null)]
    [InlineData(Right.Admin, "*", "weir")]
    public async Task OnlyAdministratorsOfEverythingManageKeys(Right right, string portfolio, string? project)
    {
        var client = await server.ClientAsync(new Grant(right, portfolio, project is null ? null : [project]));
        await (await client.ReadAsync("/v1/keys")).ProblemAsync(403, "forbidden");
        await (await client.PostJsonAsync("/v1/keys", Sound)).ProblemAsync(403, "forbidden");
        await (await client.ReadAsync("/v1/audit")).ProblemAsync(403, "forbidden");
        Assert.Equal(HttpStatusCode.OK, (await client.ReadAsync("/v1/keys/self")).StatusCode);
    }
}
