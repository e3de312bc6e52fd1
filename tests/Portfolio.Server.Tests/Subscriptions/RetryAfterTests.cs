using System.Net;
using System.Text.Json;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Runs;
using Portfolio.Server.Tests.Webhooks;
using static Portfolio.Server.Tests.Subscriptions.SubscriptionScene;

namespace Portfolio.Server.Tests.Subscriptions;

/// <summary>Deliveries that the target puts off, and deliveries of a portfolio that is closed.</summary>
public sealed class RetryAfterTests
{
    private const string Revisions = """{"type":"revision.created"}""";

    // The clock stands at 12:00; a first wait of its own is ten seconds at most.
    [Theory]
    [InlineData(429, "600", "2027-01-04T12:10:00Z")]
    [InlineData(503, "Mon, 04 Jan 2027 13:30:00 GMT", "2027-01-04T13:30:00Z")]
    [InlineData(503, "1000000", "2027-01-05T12:00:00Z")]
    public async Task ATargetThatIsTooBusySaysWhenItIsAskedAgain(int status, string after, string next)
    {
        await using var server = SubscriptionScene.Server();
        await using var receiver = await Receiver.StartAsync();
        Answering(receiver, status, after);
        var client = server.Client();
        var waiting = await FailedOnceAsync(client, receiver.Url);
        Assert.Equal((next, status), (waiting.Text("nextAttemptAt"), waiting.GetProperty("lastStatus").GetInt32()));
        receiver.AnswerWith(200);
        server.Clock.SetUtcNow(waiting.GetProperty("nextAttemptAt").GetDateTimeOffset());
        Assert.Equal(2, (await StateAsync(client, "office", "delivered")).GetProperty("attempts").GetInt32());
    }

    [Theory]
    [InlineData(500, "600")]
    [InlineData(429, "soon")]
    [InlineData(503, "0")]
    public async Task WhatIsNoWishToWaitChangesNothing(int status, string after)
    {
        await using var server = SubscriptionScene.Server();
        await using var receiver = await Receiver.StartAsync();
        Answering(receiver, status, after);
        var client = server.Client();
        var waiting = await FailedOnceAsync(client, receiver.Url);
        Assert.InRange((waiting.GetProperty("nextAttemptAt").GetDateTimeOffset() - server.Clock.GetUtcNow()).TotalSeconds, 8, 10);
    }

    [Fact]
    public async Task NothingOfAnArchivedPortfolioIsSentAnyMore()
    {
        await using var server = SubscriptionScene.Server();
        await using var receiver = await Receiver.StartAsync();
        receiver.AnswerWith(500);
        var client = server.Client();
        await FailedOnceAsync(client, receiver.Url);
        Assert.Equal(HttpStatusCode.OK, (await client.RemoveAsync("/v1/portfolios/p")).StatusCode);
        var dead = await StateAsync(client, "office", "dead");
        Assert.Equal((1, "The portfolio was archived before it could be sent."), (dead.GetProperty("attempts").GetInt32(), dead.Text("lastError")));
        await (await client.PostJsonAsync($"{Address}/office/deliveries/{dead.Text("id")}/redeliver")).ProblemAsync(409, "archived");
        server.Clock.Advance(TimeSpan.FromHours(1));
        await server.SettledAsync();
        Assert.Single(receiver.All);
        Assert.Single(await client.DeliveriesAsync("office"));
    }

    // Whatever a target answers is recorded, and tried again only as other failures are.
    [Theory]
    [InlineData("999", null)]
    [InlineData("600", null)]
    [InlineData("099", null)]
    [InlineData("599", 599)]
    public async Task AStatusThatIsNoneIsAFailedAttempt(string status, int? recorded)
    {
        await using var server = SubscriptionScene.Server();
        await using var target = new RawTarget($"HTTP/1.1 {status} Unheard\r\nContent-Length: 0\r\nConnection: close\r\n\r\n");
        var client = server.Client();
        var waiting = await FailedOnceAsync(client, target.Url);
        Assert.StartsWith($"The target answered {status}", waiting.Text("lastError"), StringComparison.Ordinal);
        Assert.Equal(recorded, waiting.TryGetProperty("lastStatus", out var last) ? last.GetInt32() : null);
        server.Clock.Advance(TimeSpan.FromHours(25));
        Assert.Equal(2, (await StateAsync(client, "office", "dead")).GetProperty("attempts").GetInt32());
    }

    // The first delivery of a subscription, after its first attempt.
    private static async Task<JsonElement> FailedOnceAsync(HttpClient client, string url)
    {
        await client.PutDocumentAsync(Certain(5));
        await client.SubscribeAsync(url, Revisions, "office");
        await client.PutDocumentAsync(Certain(6));
        return await StateAsync(client, "office", "waiting", 1);
    }

    private static void Answering(Receiver receiver, int status, string after) => receiver.Answer = (http, _) =>
    {
        http.Response.StatusCode = status;
        http.Response.Headers.RetryAfter = after;
        return Task.CompletedTask;
    };
}
