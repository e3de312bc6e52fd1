using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Runs;
using Portfolio.Server.Tests.Webhooks;
using static Portfolio.Server.Tests.Subscriptions.SubscriptionScene;

namespace Portfolio.Server.Tests.Subscriptions;

/// <summary>One event and many who want it.</summary>
public sealed class FanOutTests
{
    [Fact]
    public async Task FiftySubscriptionsAreAllToldOfOneRun()
    {
        await using var server = SubscriptionScene.Server();
        await using var receiver = await Receiver.StartAsync();
        var client = server.Client();
        await client.PutDocumentAsync(Certain(5));
        var secrets = new Dictionary<string, string>();
        for (var number = 1; number <= 50; number++)
        {
            var made = await client.SubscribeAsync($"{receiver.Url}/{number}", """{"type":"run.succeeded"}""", $"office-{number}");
            secrets.Add($"/risk/{number}", made.Text("secret"));
        }
        var run = await client.SucceedAsync("p");
        var arrived = await receiver.UntilAsync(50);
        Assert.Equal(secrets.Keys.Order(StringComparer.Ordinal), arrived.Select(each => each.Path).Order(StringComparer.Ordinal));
        Assert.All(arrived, each => Assert.Equal(run.Text("id"), each.Verified(secrets[each.Path]).Subject));
        Assert.Single(arrived.Select(each => each.Id).Distinct());
    }

    [Fact]
    public async Task TargetsThatHangKeepNobodyWaitingAndTheirAttemptsEnd()
    {
        const int seconds = 6;
        await using var server = SubscriptionScene.Server(("Webhooks:TimeoutSeconds", $"{seconds}"), ("Webhooks:Senders", "4"));
        await using var healthy = await Receiver.StartAsync();
        await using var hanging = await Receiver.StartAsync();
        var brokenOff = 0;
        hanging.Answer = async (http, _) =>
        {
            var over = new TaskCompletionSource();
            await using var gone = http.RequestAborted.Register(over.SetResult);
            await over.Task;
            Interlocked.Increment(ref brokenOff);
        };
        var client = server.Client();
        await client.PutDocumentAsync(Certain(5));
        for (var number = 1; number <= 3; number++)
            await client.SubscribeAsync(hanging.Url, """{"type":"revision.created"}""", $"hanging-{number}");
        for (var number = 1; number <= 10; number++)
            await client.SubscribeAsync(healthy.Url, """{"type":"post.refused"}""", $"healthy-{number}");
        await client.PutDocumentAsync(Certain(6));
        // They have taken all senders but one.
        await hanging.UntilAsync(3);
        await BeRefusedAsync(client);
        await healthy.UntilAsync(10);
        Assert.Equal(0, Volatile.Read(ref brokenOff));

        var waiting = await StateAsync(client, "hanging-1", "waiting", 1);
        Assert.Equal($"There was no whole answer within {seconds} seconds.", waiting.Text("lastError"));
        Assert.False(waiting.TryGetProperty("lastStatus", out _));
        // Known as failing they get half of the senders, however much waits for them.
        server.Clock.Advance(TimeSpan.FromMinutes(1));
        await client.PutDocumentAsync(Certain(7));
        await BeRefusedAsync(client);
        await healthy.UntilAsync(20);
    }

    private static async Task BeRefusedAsync(HttpClient client) =>
        await (await client.PutJsonAsync("/v1/portfolios/p/document", Certain(5, "2027-13-01"), "*")).ProblemAsync(422, "refused");
}
