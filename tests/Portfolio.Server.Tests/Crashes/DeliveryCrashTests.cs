using System.Text.Json;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Jobs;
using Portfolio.Server.Tests.Runs;
using Portfolio.Server.Tests.Webhooks;
using static Portfolio.Server.Tests.Subscriptions.SubscriptionScene;

namespace Portfolio.Server.Tests.Crashes;

/// <summary>The server is killed between what happens and those who are told of it.</summary>
public sealed class DeliveryCrashTests : IDisposable
{
    private readonly string directory = Directory.CreateTempSubdirectory("portfolio-").FullName;

    public void Dispose() => Directory.Delete(directory, recursive: true);

    [Fact]
    public async Task EveryEventArrivesAfterKillsAndWhatArrivesTwiceHasTheSameId()
    {
        Assert.SkipWhen(OperatingSystem.IsWindows(), "Signals of Unix are sent.");
        await using var receiver = await Receiver.StartAsync();
        string secret;
        // This one hands nothing on: everything is still to be told when it is killed.
        using (var first = await StartAsync(("Roles", "api")))
        {
            await first.Client.PutDocumentAsync(Certain(5));
            secret = (await first.Client.SubscribeAsync(receiver.Url, """{"type":"revision.created"}""", "office")).Text("secret");
            for (var days = 6; days < 12; days++)
                await first.Client.PutDocumentAsync(Certain(days));
            await first.KillAsync();
        }
        Assert.Empty(receiver.All);

        var told = new TaskCompletionSource();
        receiver.Answer = async (http, _) =>
        {
            // The third is told and not recorded as told.
            if (receiver.All.Count == 3)
                told.SetResult();
            if (receiver.All.Count >= 3)
                await Task.Delay(Timeout.Infinite, http.RequestAborted).ContinueWith(_ => { }, TaskScheduler.Default);
        };
        using (var second = await StartAsync())
        {
            await told.Task.WaitAsync(TimeSpan.FromMinutes(2), TestContext.Current.CancellationToken);
            await second.Client.PutDocumentAsync(Certain(12));
            await second.KillAsync();
        }

        receiver.AnswerWith(204);
        using var third = await StartAsync();
        var delivered = await UntilAsync(() => third.Client.DeliveriesAsync("office", "?state=delivered"), found => found.Count == 7);
        var happened = (await third.Client.EventsAsync("portfolio.revision.created")).Skip(1).ToList();
        Assert.Equal(["2", "3", "4", "5", "6", "7", "8"], happened.Select(each => each.Text("subject")));
        var arrived = receiver.All;
        Assert.All(arrived, each => each.Verified(secret));
        Assert.Equal(Ids(happened, "id"), arrived.Select(each => each.Id).Distinct());
        Assert.Equal(Ids(happened, "id"), Ids(delivered, "event").Reverse());
        // Told twice: the one that was under way.
        Assert.Equal([arrived[2].Id], arrived.CountBy(each => each.Id).Where(each => each.Value > 1).Select(each => each.Key));
        Assert.Equal(8, arrived.Count);
    }

    private Task<ServerProcess> StartAsync(params (string Key, string Value)[] settings) =>
        ServerProcess.StartAsync(directory, [("Webhooks__AllowedHosts", "localhost"), .. settings]);

    private static IEnumerable<string> Ids(IEnumerable<JsonElement> items, string member) => items.Select(each => each.Text(member));
}
