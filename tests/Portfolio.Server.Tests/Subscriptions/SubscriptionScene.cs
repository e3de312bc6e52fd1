using System.Globalization;
using System.Text.Json;
using System.Text.Json.Nodes;
using CloudNative.CloudEvents;
using CloudNative.CloudEvents.SystemTextJson;
using Microsoft.Extensions.DependencyInjection;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Runs;
using Portfolio.Server.Tests.Webhooks;
using Portfolio.Server.Webhooks;
using Portfolio.Store.Deliveries;

namespace Portfolio.Server.Tests.Subscriptions;

/// <summary>Subscriptions, events and deliveries of portfolio p in the words of the tests.</summary>
internal static class SubscriptionScene
{
    public const string Address = "/v1/portfolios/p/subscriptions";

    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    /// <summary>A server that may call this machine by name.</summary>
    public static PortfolioServer Server(params (string Key, string? Value)[] settings) =>
        new(null, [("Webhooks:AllowedHosts", "localhost"), .. settings]);

    /// <summary>Makes a subscription; returns the answer, which shows the secret.</summary>
    /// <param name="events">Items of the list.</param>
    public static async Task<JsonElement> SubscribeAsync(this HttpClient client, string url, string events, string? id = null)
    {
        var json = $$"""{ {{(id is null ? "" : $"\"id\": \"{id}\", ")}}"url": "{{url}}", "events": [ {{events}} ] }""";
        var answer = await client.PostJsonAsync(Address, json);
        Assert.True((int)answer.StatusCode == 201, await answer.TextAsync());
        return await answer.JsonAsync();
    }

    public static async Task<IReadOnlyList<JsonElement>> ItemsAsync(this HttpClient client, string address) =>
        [.. (await (await client.ReadAsync(address)).JsonAsync()).GetProperty("items").EnumerateArray()];

    public static Task<IReadOnlyList<JsonElement>> DeliveriesAsync(this HttpClient client, string subscription, string query = "") =>
        client.ItemsAsync($"{Address}/{subscription}/deliveries{query}");

    /// <summary>Events of one type in the feed.</summary>
    public static async Task<IReadOnlyList<JsonElement>> EventsAsync(this HttpClient client, string type) =>
        [.. (await client.ItemsAsync("/v1/portfolios/p/events?limit=1000")).Where(told => told.Text("type") == type)];

    /// <summary>Waits until what is read passes; the whole suite's timeout is the only limit.</summary>
    public static async Task<T> UntilAsync<T>(Func<Task<T>> read, Func<T, bool> passes)
    {
        while (true)
        {
            var now = await read();
            if (passes(now))
                return now;
            await Task.Delay(50, Cancellation);
        }
    }

    /// <summary>Waits for a delivery in this state after so many attempts.</summary>
    public static async Task<JsonElement> StateAsync(HttpClient client, string subscription, string state, int attempts = 0)
    {
        var found = await UntilAsync(
            () => client.DeliveriesAsync(subscription, $"?state={state}"),
            some => some.Any(delivery => delivery.GetProperty("attempts").GetInt32() >= attempts));
        return found.First(delivery => delivery.GetProperty("attempts").GetInt32() >= attempts);
    }

    /// <summary>Waits until everything that has happened was handed on.</summary>
    public static Task SettledAsync(this PortfolioServer server) => UntilAsync(
        () => server.Services.GetRequiredService<Store.Outbox.EventDistribution>().ListNextAsync(Store.Access.Caller.System, 1, Cancellation),
        left => left.Count == 0);

    /// <summary>On a server that sends nothing: the newest event is handed on to a subscription and counts as delivered.</summary>
    public static async Task DeliverAsync(this PortfolioServer server, string subscription)
    {
        var distribution = server.Services.GetRequiredService<Store.Outbox.EventDistribution>();
        var told = (await distribution.ListNextAsync(Store.Access.Caller.System, 1000, Cancellation))[^1];
        await distribution.HandOnAsync(told, [], [subscription], TimeSpan.FromHours(1), Cancellation);
        var held = await server.Services.GetRequiredService<DeliveryClaims>()
            .ClaimAsync(Store.Access.Caller.System, "test", TimeSpan.FromMinutes(1), true, Cancellation);
        Assert.True(await server.Services.GetRequiredService<DeliveryEndings>().DeliveredAsync(held!, new(204, null), Cancellation));
    }

    /// <summary>Asserts that the request is signed with the secret and holds a CloudEvent, and returns that.</summary>
    public static CloudEvent Verified(this Received received, string secret, params string[] others)
    {
        var timestamp = long.Parse(received.Headers["webhook-timestamp"], CultureInfo.InvariantCulture);
        IEnumerable<string> expected = [secret, .. others];
        Assert.Equal(
            string.Join(' ', expected.Select(key => WebhookSecrets.Sign(new SigningSecrets(key, null), received.Id, timestamp, received.Body))),
            received.Headers["webhook-signature"]);
        Assert.StartsWith("application/cloudevents+json", received.Headers["content-type"]);
        var told = new JsonEventFormatter().DecodeStructuredModeMessage(received.Body, new("application/cloudevents+json"), null);
        Assert.True(told.IsValid);
        Assert.Equal(received.Id, told.Id);
        return told;
    }

    /// <summary>Two dependent projects of a certain length in days, so that every level lies on the same known date.</summary>
    public static string Certain(double days, string statusDate = "2027-01-04", string commitments = "{}") =>
        new JsonObject
        {
            ["settings"] = JsonNode.Parse("""{"name":"Harbour","currency":"EUR","iterations":10,"defaultCalendar":"every-day","confidence":[80]}"""),
            ["projects"] = new JsonArray(
                JsonNode.Parse(FormattableString.Invariant(
                    $$"""{"id":"weir-lock","statusDate":"{{statusDate}}","commitments":{{commitments}},"activities":[{"id":"A","duration":{{days}},"cost":{"perDay":100} }]}""")),
                JsonNode.Parse($$"""{"id":"quay","statusDate":"{{statusDate}}","activities":[{"id":"A","duration":1}]}""")),
        }.ToJsonString();

    /// <summary>Puts the document of p, whether there is one or not.</summary>
    public static async Task PutDocumentAsync(this HttpClient client, string json)
    {
        var answer = await client.PutJsonAsync("/v1/portfolios/p/document", json, "*");
        if ((int)answer.StatusCode == 412)
            answer = await client.PutJsonAsync("/v1/portfolios/p/document", json);
        Assert.True(answer.IsSuccessStatusCode, await answer.TextAsync());
    }
}
