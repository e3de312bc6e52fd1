using System.Net;
using System.Text.Json;
using Microsoft.Extensions.DependencyInjection;
using Portfolio.Server.Jobs;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Runs;
using Portfolio.Server.Tests.Webhooks;
using static Portfolio.Server.Tests.Subscriptions.SubscriptionScene;

namespace Portfolio.Server.Tests.Subscriptions;

/// <summary>From an event to its target, with a target on this machine that the operator allows by name.</summary>
public sealed class DeliveryTests : IAsyncDisposable
{
    private const string Revisions = """{"type":"revision.created"}""";

    private readonly PortfolioServer server = SubscriptionScene.Server();

    private async Task<HttpClient> StartAsync()
    {
        var client = server.Client();
        await client.PutDocumentAsync(Certain(5));
        return client;
    }

    [Fact]
    public async Task ARunThatSucceededArrivesSignedAsACloudEventOnce()
    {
        await using var receiver = await Receiver.StartAsync();
        var client = await StartAsync();
        var made = await client.SubscribeAsync(receiver.Url + "?token=mine", """{"type":"run.succeeded"},{"type":"run.failed"}""", "office");
        var run = await client.SucceedAsync("p");
        var told = (await receiver.UntilAsync(1))[0].Verified(made.Text("secret"));
        Assert.Equal(
            ("portfolio.run.succeeded", "/v1/portfolios/p", run.Text("id"), server.Clock.GetUtcNow()),
            (told.Type, told.Source!.OriginalString, told.Subject, told.Time));
        Assert.Equal("2027-01-04", ((JsonElement)told.Data!).Text("asOf"));
        var listed = Assert.Single(await client.EventsAsync("portfolio.run.succeeded"));
        Assert.Equal(
            (told.Id, ((JsonElement)told.Data!).GetRawText()), (listed.Text("id"), listed.GetProperty("data").GetRawText()));
        var delivery = await DeliveredAsync(client, "office");
        Assert.Equal((told.Id, 1, 204), (delivery.Text("event"), delivery.GetProperty("attempts").GetInt32(), delivery.GetProperty("lastStatus").GetInt32()));
        await server.SettledAsync();
        Assert.Single(receiver.All);
        Assert.Equal("/risk", receiver.All[0].Path);
        Assert.DoesNotContain("traceparent", receiver.All[0].Headers.Keys, StringComparer.OrdinalIgnoreCase);
        Assert.DoesNotContain("cookie", receiver.All[0].Headers.Keys, StringComparer.OrdinalIgnoreCase);
    }

    [Fact]
    public async Task WhileASecretIsReplacedBothSign()
    {
        await using var receiver = await Receiver.StartAsync();
        var client = await StartAsync();
        var first = (await client.SubscribeAsync(receiver.Url, Revisions, "office")).Text("secret");
        var second = (await (await client.PostJsonAsync(Address + "/office/secret", """{"overlapHours":1}""")).JsonAsync()).Text("secret");
        await client.PutDocumentAsync(Certain(6));
        (await receiver.UntilAsync(1))[0].Verified(second, first);
        server.Clock.Advance(TimeSpan.FromHours(1));
        await client.PutDocumentAsync(Certain(7));
        (await receiver.UntilAsync(2))[1].Verified(second);
    }

    [Fact]
    public async Task AFailedAttemptIsMadeAgainLaterAndLaterUntilItSucceeds()
    {
        await using var receiver = await Receiver.StartAsync();
        var client = await StartAsync();
        var secret = (await client.SubscribeAsync(receiver.Url, Revisions, "office")).Text("secret");
        receiver.AnswerWith(503);
        await client.PutDocumentAsync(Certain(6));
        foreach (var (attempt, most) in new[] { (1, 10), (2, 20), (3, 40) })
        {
            var waiting = await StateAsync(client, "office", "waiting", attempt);
            Assert.Equal((503, "The target answered 503."), (waiting.GetProperty("lastStatus").GetInt32(), waiting.Text("lastError")));
            var wait = (waiting.GetProperty("nextAttemptAt").GetDateTimeOffset() - server.Clock.GetUtcNow()).TotalSeconds;
            Assert.InRange(wait, 0.8 * most, most);
            Assert.Equal(attempt, receiver.All.Count);
            server.Clock.Advance(TimeSpan.FromSeconds(most));
        }
        receiver.AnswerWith(200);
        var delivered = await StateAsync(client, "office", "delivered");
        Assert.InRange(delivered.GetProperty("attempts").GetInt32(), 4, 5);
        Assert.Single(receiver.All.Select(arrived => arrived.Id).Distinct());
        Assert.True(receiver.All.Select(arrived => arrived.Headers["webhook-timestamp"]).Distinct().Count() >= 4);
        receiver.All[^1].Verified(secret);
        Assert.Equal(0, (await (await client.ReadAsync(Address + "/office")).JsonAsync()).GetProperty("failures").GetInt32());
    }

    [Fact]
    public async Task AfterADayADeliveryIsDeadAndCanBeHadAgain()
    {
        await using var receiver = await Receiver.StartAsync();
        var client = await StartAsync();
        await client.SubscribeAsync(receiver.Url, Revisions, "office");
        receiver.AnswerWith(500);
        await client.PutDocumentAsync(Certain(6));
        await StateAsync(client, "office", "waiting", 1);
        server.Clock.Advance(TimeSpan.FromHours(24));
        var dead = await StateAsync(client, "office", "dead");
        Assert.Equal((2, 500), (dead.GetProperty("attempts").GetInt32(), dead.GetProperty("lastStatus").GetInt32()));
        Assert.Single(await client.DeliveriesAsync("office", "?state=dead"));
        Assert.Empty(await client.DeliveriesAsync("office", "?state=waiting"));
        receiver.AnswerWith(200);
        var again = await client.PostJsonAsync($"{Address}/office/deliveries/{dead.Text("id")}/redeliver");
        Assert.Equal((HttpStatusCode.Accepted, "waiting"), (again.StatusCode, (await again.JsonAsync()).State()));
        await StateAsync(client, "office", "delivered");
        Assert.Equal("delivered", (await (await client.ReadAsync(again.Headers.Location!.OriginalString)).JsonAsync()).State());
        Assert.Equal(3, receiver.All.Count);
        Assert.Contains("delivery.redeliver", await server.AuditTextAsync(), StringComparison.Ordinal);
        await (await client.PostJsonAsync($"{Address}/office/deliveries/none/redeliver")).ProblemAsync(404, "not-found");
    }

    [Fact]
    public async Task ATargetThatIsGoneEndsItsSubscription()
    {
        await using var receiver = await Receiver.StartAsync();
        var client = await StartAsync();
        await client.SubscribeAsync(receiver.Url, Revisions, "office");
        receiver.AnswerWith(500);
        await client.PutDocumentAsync(Certain(6));
        await StateAsync(client, "office", "waiting", 1);
        receiver.AnswerWith(410);
        await client.PutDocumentAsync(Certain(7));
        var ended = await UntilAsync(
            async () => await (await client.ReadAsync(Address + "/office")).JsonAsync(), found => !found.GetProperty("active").GetBoolean());
        Assert.Equal("gone", ended.Text("ended"));
        var dead = await client.DeliveriesAsync("office", "?state=dead");
        Assert.Equal(["3", "2"], dead.Select(delivery => delivery.Text("subject")));
        await client.PutDocumentAsync(Certain(8));
        await server.SettledAsync();
        Assert.Equal(2, (await client.DeliveriesAsync("office")).Count);
        var redeliver = $"{Address}/office/deliveries/{dead[0].Text("id")}/redeliver";
        await (await client.PostJsonAsync(redeliver)).ProblemAsync(409, "subscription-inactive");

        receiver.AnswerWith(200);
        var back = $$"""{"url":"{{receiver.Url}}","events":[{{Revisions}}]}""";
        var active = await (await client.PutJsonAsync(Address + "/office", back, "*")).JsonAsync();
        Assert.True(active.GetProperty("active").GetBoolean() && !active.TryGetProperty("ended", out _));
        Assert.Equal(HttpStatusCode.Accepted, (await client.PostJsonAsync(redeliver)).StatusCode);
        await StateAsync(client, "office", "delivered");
    }

    [Fact]
    public async Task ARedirectIsAFailureAndIsNotFollowed()
    {
        await using var receiver = await Receiver.StartAsync();
        await using var elsewhere = await Receiver.StartAsync();
        receiver.Answer = (http, _) =>
        {
            http.Response.StatusCode = 307;
            http.Response.Headers.Location = elsewhere.Url;
            http.Response.Headers.SetCookie = "a=b";
            return Task.CompletedTask;
        };
        var client = await StartAsync();
        await client.SubscribeAsync(receiver.Url, Revisions, "office");
        await client.PutDocumentAsync(Certain(6));
        var waiting = await StateAsync(client, "office", "waiting", 1);
        Assert.Equal("The target answered 307; redirects are not followed.", waiting.Text("lastError"));
        Assert.Empty(elsewhere.All);
    }

    [Fact]
    public async Task WhatIsNotWantedIsNotSentAndAnInactiveSubscriptionMissesIt()
    {
        await using var receiver = await Receiver.StartAsync();
        var client = await StartAsync();
        await client.SubscribeAsync(receiver.Url, """{"type":"run.failed"}""", "failures");
        var off = $$"""{"id":"off","url":"{{receiver.Url}}","events":[{{Revisions}}],"active":false}""";
        await client.PostJsonAsync(Address, off);
        await client.PutDocumentAsync(Certain(6));
        await client.SucceedAsync("p");
        await server.SettledAsync();
        Assert.Equal(HttpStatusCode.OK, (await client.PutJsonAsync(Address + "/off", off.Replace("false", "true"), "*")).StatusCode);
        await client.PutDocumentAsync(Certain(7));
        Assert.Equal("3", Assert.Single(await UntilAsync(() => client.DeliveriesAsync("off"), found => found.Count > 0)).Text("subject"));
        Assert.Empty(await client.DeliveriesAsync("failures"));
    }

    [Fact]
    public async Task TheRecordIsPagedNewestFirst()
    {
        var client = await StartAsync();
        await client.SubscribeAsync("http://localhost:1/", Revisions, "office");
        for (var days = 6; days < 11; days++)
            await client.PutDocumentAsync(Certain(days));
        await server.SettledAsync();
        var page = await (await client.ReadAsync(Address + "/office/deliveries?limit=3")).JsonAsync();
        Assert.Equal(["6", "5", "4"], page.GetProperty("items").EnumerateArray().Select(delivery => delivery.Text("subject")));
        var rest = await client.DeliveriesAsync("office", $"?limit=3&cursor={page.Text("next")}");
        Assert.Equal(["3", "2"], rest.Select(delivery => delivery.Text("subject")));
        var faults = (await (await client.ReadAsync(Address + "/office/deliveries?state=lost")).ProblemAsync(422, "refused")).Faults();
        Assert.Equal([("", "parameter.invalid")], faults);
        await (await client.ReadAsync(Address + "/none/deliveries")).ProblemAsync(404, "not-found");
    }

    private static Task<JsonElement> DeliveredAsync(HttpClient client, string subscription) => StateAsync(client, subscription, "delivered");

    public ValueTask DisposeAsync() => server.DisposeAsync();
}
