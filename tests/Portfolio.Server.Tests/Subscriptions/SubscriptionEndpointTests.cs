using System.Net;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Runs;
using Portfolio.Store.Access;
using static Portfolio.Server.Tests.Subscriptions.SubscriptionScene;

namespace Portfolio.Server.Tests.Subscriptions;

public sealed class SubscriptionEndpointTests : IAsyncDisposable
{
    private const string Sound = """{"id":"office","url":"https://hooks.harbour.example/risk","events":[{"type":"run.failed"}]}""";

    private readonly PortfolioServer server = SubscriptionScene.Server(("Roles", "api"), ("Webhooks:Subscriptions", "2"));

    private async Task<HttpClient> StartAsync()
    {
        var client = server.Client();
        await client.PutJsonAsync("/v1/portfolios/p/document", Samples.Document());
        return client;
    }

    [Fact]
    public async Task ASubscriptionIsMadeReadListedReplacedAndRemoved()
    {
        var client = await StartAsync();
        var made = await client.PostJsonAsync(Address, Sound);
        Assert.Equal((HttpStatusCode.Created, Address + "/office"), (made.StatusCode, made.Headers.Location!.OriginalString));
        var one = await client.ReadAsync(Address + "/office");
        Assert.Equal(made.Tag(), one.Tag());
        Assert.Equal(
            """{"id":"office","url":"https://hooks.harbour.example/risk","events":[{"type":"run.failed"}],"active":true,"failures":0,"createdAt":"2027-01-04T12:00:00Z","changedAt":"2027-01-04T12:00:00Z"}""",
            await one.TextAsync());
        Assert.Equal(HttpStatusCode.NotModified, (await client.ReadAsync(Address + "/office", made.Tag())).StatusCode);
        Assert.Equal(["office"], (await client.ItemsAsync(Address)).Select(item => item.Text("id")));

        const string other = """{"url":"https://hooks.harbour.example/other","events":[{"type":"post.refused"}],"active":false}""";
        await (await client.PutJsonAsync(Address + "/office", other)).ProblemAsync(428, "precondition-required");
        await (await client.PutJsonAsync(Address + "/office", other, "\"x\"")).ProblemAsync(412, "precondition-failed");
        var replaced = await client.PutJsonAsync(Address + "/office", other, made.Tag());
        Assert.Equal((HttpStatusCode.OK, false), (replaced.StatusCode, (await replaced.JsonAsync()).GetProperty("active").GetBoolean()));
        Assert.NotEqual(made.Tag(), replaced.Tag());

        await (await DeleteAsync(client, null)).ProblemAsync(428, "precondition-required");
        await (await DeleteAsync(client, made.Tag())).ProblemAsync(412, "precondition-failed");
        Assert.Equal(HttpStatusCode.NoContent, (await DeleteAsync(client, replaced.Tag())).StatusCode);
        await (await client.ReadAsync(Address + "/office")).ProblemAsync(404, "not-found");
        await (await client.PutJsonAsync(Address + "/office", other, "*")).ProblemAsync(404, "not-found");
    }

    [Fact]
    public async Task TheSecretIsShownWhenItIsMadeAndNeverAgain()
    {
        var client = await StartAsync();
        var first = (await (await client.PostJsonAsync(Address, Sound)).JsonAsync()).Text("secret");
        Assert.Matches("^whsec_[A-Za-z0-9+/]{43}=$", first);
        var rotated = await (await client.PostJsonAsync(Address + "/office/secret", """{"overlapHours":2}""")).JsonAsync();
        var second = rotated.Text("secret");
        Assert.NotEqual(first, second);
        Assert.Equal("2027-01-04T14:00:00Z", rotated.Text("previousSecretUntil"));
        var (one, all) = (await client.ReadAsync(Address + "/office"), await client.ReadAsync(Address));
        var audit = await server.AuditTextAsync();
        foreach (var text in new[] { await one.TextAsync(), await all.TextAsync(), audit })
            Assert.All([first, second, "whsec_"], secret => Assert.DoesNotContain(secret, text, StringComparison.Ordinal));
        Assert.Contains("subscription.rotate", audit, StringComparison.Ordinal);
        Assert.DoesNotContain("/risk", audit, StringComparison.Ordinal);
        server.Clock.Advance(TimeSpan.FromHours(2));
        Assert.DoesNotContain("previousSecretUntil", await (await client.ReadAsync(Address + "/office")).TextAsync(), StringComparison.Ordinal);
        var faults = (await (await client.PostJsonAsync(Address + "/office/secret", """{"overlapHours":169}""")).ProblemAsync(422, "refused")).Faults();
        Assert.Equal([("/overlapHours", "number.range")], faults);
    }

    [Fact]
    public async Task WhatIsLeftOutIsFilledIn()
    {
        var client = await StartAsync();
        var made = await client.SubscribeAsync(
            "http://localhost:1/", """{"type":"level.moved","days":7},{"type":"level.moved","metric":"cost","amount":1000.5,"level":99.5,"every":"month","scope":"project/weir"},{"type":"commitment.belowProbability","probability":0.5},{"type":"estimates.stale","days":35}""");
        Assert.Equal(
            """[{"type":"level.moved","scope":"portfolio","metric":"finish","level":80,"days":7,"every":"week"},{"type":"level.moved","scope":"project/weir","metric":"cost","level":99.5,"amount":1000.5,"every":"month"},{"type":"commitment.belowProbability","scope":"portfolio","metric":"finish","probability":0.5},{"type":"estimates.stale","days":35}]""",
            made.GetProperty("events").GetRawText());
        Assert.True(Guid.TryParse(made.Text("id"), out _));
    }

    [Fact]
    public async Task EveryFaultIsNamedAtOnce()
    {
        var client = await StartAsync();
        const string wrong = """
            { "id": "an id", "url": "http://u@quay.example:81/#x", "events": [
              { }, { "type": "run.ended" }, { "type": "run.failed", "days": 3 },
              { "type": "level.moved" }, { "type": "level.moved", "days": 0, "amount": 5, "level": 80.25, "every": "year", "scope": "weir" },
              { "type": "level.moved", "metric": "cost", "days": 5, "level": 100, "scope": "milestone/weir/M" },
              { "type": "commitment.belowProbability", "metric": "contingency", "probability": 1.1 }, { "type": "commitment.belowProbability" },
              { "type": "estimates.stale", "days": 1.5, "scope": "portfolio" }, { "type": "post.refused" }, { "type": "post.refused" } ] }
            """;
        var faults = (await (await client.PostJsonAsync(Address, wrong)).ProblemAsync(422, "refused")).Faults();
        Assert.Equal(
            [
                ("/id", "id.format"),
                ("/url", "url.scheme"), ("/url", "url.userinfo"), ("/url", "url.fragment"), ("/url", "url.port"),
                ("/events/0", "member.missing"), ("/events/1/type", "type.unknown"), ("/events/2/days", "member.unknown"),
                ("/events/3", "member.missing"), ("/events/4/days", "number.range"), ("/events/4/amount", "member.unknown"),
                ("/events/4/scope", "scope.format"), ("/events/4/level", "level.not-kept"), ("/events/4/every", "value.unknown"),
                ("/events/5", "member.missing"), ("/events/5/days", "member.unknown"), ("/events/5/metric", "metric.milestone"),
                ("/events/5/level", "number.range"), ("/events/6/metric", "value.unknown"), ("/events/6/probability", "number.range"),
                ("/events/7", "member.missing"), ("/events/8/scope", "member.unknown"), ("/events/8/days", "number.not-whole"),
                ("/events/10", "events.duplicate"),
            ],
            faults);
        Assert.Empty(await client.ItemsAsync(Address));
    }

    [Theory]
    [InlineData("{}", "|member.missing |member.missing")]
    [InlineData("""{"url":"https://hooks.harbour.example/","events":[]}""", "/events|events.none")]
    public async Task SomethingMustBeWanted(string json, string faults)
    {
        var client = await StartAsync();
        var found = (await (await client.PostJsonAsync(Address, json)).ProblemAsync(422, "refused")).Faults();
        Assert.Equal(faults, string.Join(' ', found.Select(fault => $"{fault.Path}|{fault.Code}")));
    }

    [Fact]
    public async Task IdsAreTakenOnceAndThereIsALimit()
    {
        var client = await StartAsync();
        await client.PostJsonAsync(Address, Sound);
        await (await client.PostJsonAsync(Address, Sound)).ProblemAsync(409, "exists");
        var renamed = (await (await client.PutJsonAsync(Address + "/office", Sound.Replace("office", "other"), "*")).ProblemAsync(422, "refused")).Faults();
        Assert.Equal([("/id", "id.fixed")], renamed);
        await client.PostJsonAsync(Address, Sound.Replace("office", "other"));
        await (await client.PostJsonAsync(Address, Sound.Replace("office", "third"))).ProblemAsync(409, "too-many-subscriptions");
    }

    [Fact]
    public async Task OnlyWhoManagesTheWholePortfolioHasSubscriptions()
    {
        var client = await StartAsync();
        await client.PostJsonAsync(Address, Sound);
        string[] addresses = [Address, Address + "/office", Address + "/office/deliveries"];
        foreach (var (key, status, slug) in new[]
        {
            (await server.ClientAsync(new Grant(Right.Read, "p")), 403, "forbidden"),
            (await server.ClientAsync(new Grant(Right.Manage, "p", ["weir"])), 403, "forbidden"),
            (await server.ClientAsync(new Grant(Right.Manage, "q")), 404, "not-found"),
        })
        {
            foreach (var address in addresses)
                await (await key.ReadAsync(address)).ProblemAsync(status, slug);
            await (await key.PostJsonAsync(Address, Sound)).ProblemAsync(status, slug);
            await (await key.PutJsonAsync(Address + "/office", Sound, "*")).ProblemAsync(status, slug);
            await (await key.PostJsonAsync(Address + "/office/secret")).ProblemAsync(status, slug);
            await (await DeleteAsync(key, "*")).ProblemAsync(status, slug);
            await (await key.PostJsonAsync(Address + "/office/deliveries/x/redeliver")).ProblemAsync(status, slug);
        }
        var manager = await server.ClientAsync(new Grant(Right.Manage, "p"));
        Assert.Single(await manager.ItemsAsync(Address));
    }

    private static Task<HttpResponseMessage> DeleteAsync(HttpClient client, string? ifMatch)
    {
        var request = new HttpRequestMessage(HttpMethod.Delete, Address + "/office");
        if (ifMatch is not null)
            request.Headers.TryAddWithoutValidation("If-Match", ifMatch);
        return client.SendAsync(request, TestContext.Current.CancellationToken);
    }

    public ValueTask DisposeAsync() => server.DisposeAsync();
}
