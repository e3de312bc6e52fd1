using System.Net;
using System.Text;
using System.Text.RegularExpressions;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Runs;
using Portfolio.Server.Tests.Subscriptions;
using Portfolio.Store.Access;

namespace Portfolio.Server.Tests.Idempotency;

/// <summary>One accepted write of every route that writes; <c>{run}</c> stands for a run that waits or works.</summary>
internal sealed record Write(string Operation, HttpMethod Method, string Address, string? Body = null, string? IfMatch = null)
{
    private const string Patch = "application/merge-patch+json";

    public string MediaType { get; init; } = "application/json";

    public static IReadOnlyDictionary<string, Write> All { get; } = new Write[]
    {
        new("putDocument", HttpMethod.Put, "document?note=second", Samples.Document("Other"), "*"),
        new("putProject", HttpMethod.Put, "projects/quay?note=new", """{"statusDate":"2027-01-04"}"""),
        new("patchProject", HttpMethod.Patch, "projects/weir", """{"name":"Weir"}""") { MediaType = Patch },
        new("putSettings", HttpMethod.Put, "settings", """{"name":"Renamed","currency":"EUR"}""", "*"),
        new("patchSettings", HttpMethod.Patch, "settings", """{"name":"Renamed"}""") { MediaType = Patch },
        new("putActivity", HttpMethod.Put, "projects/weir/activities/B", """{"duration":3}"""),
        new("patchActivity", HttpMethod.Patch, "projects/weir/activities/A", """{"duration":3}""") { MediaType = Patch },
        new("deleteActivity", HttpMethod.Delete, "projects/weir/activities/A", IfMatch: "*"),
        new("deleteProject", HttpMethod.Delete, "projects/weir", IfMatch: "*"),
        new("postUpdates", HttpMethod.Post, "updates", """{"updates":[{"project":"weir","name":"Weir"}]}"""),
        new("postRun", HttpMethod.Post, "runs", """{"iterations":10}"""),
        new("cancelRun", HttpMethod.Delete, "runs/{run}"),
        new("archivePortfolio", HttpMethod.Delete, "/v1/portfolios/p"),
        new("createKey", HttpMethod.Post, "/v1/keys", """{"name":"new","grants":[{"right":"read","portfolio":"p"}]}"""),
        new("patchKey", HttpMethod.Patch, "/v1/keys/{key}", """{"name":"renamed"}""") { MediaType = Patch },
        new("rotateKey", HttpMethod.Post, "/v1/keys/{key}/rotate", """{"overlapHours":1}"""),
        new("revokeKey", HttpMethod.Delete, "/v1/keys/{key}"),
        new("putSchedule", HttpMethod.Put, "schedule", """{"cron":"30 2 * * *","iterations":20,"enabled":true}"""),
        new("postSubscription", HttpMethod.Post, "subscriptions", """{"id":"other","url":"https://hooks.harbour.example/","events":[{"type":"run.failed"}]}"""),
        new("putSubscription", HttpMethod.Put, "subscriptions/office", """{"url":"https://hooks.harbour.example/","events":[{"type":"run.failed"}]}""", "*"),
        new("deleteSubscription", HttpMethod.Delete, "subscriptions/office", IfMatch: "*"),
        new("postSubscriptionSecret", HttpMethod.Post, "subscriptions/office/secret", """{"overlapHours":1}"""),
        new("redeliverDelivery", HttpMethod.Post, "subscriptions/office/deliveries/{delivery}/redeliver"),
    }.ToDictionary(write => write.Operation);

    /// <summary>Sends it to a portfolio.</summary>
    /// <param name="key">The key of its own; null: without.</param>
    public async Task<Said> SendAsync(HttpClient client, string portfolio, string? key, string run = "")
    {
        var address = Address.StartsWith('/') ? Address : $"/v1/portfolios/{portfolio}/{Address.Replace("{run}", run)}";
        if (address.Contains("{key}", StringComparison.Ordinal))
            address = address.Replace("{key}", await OldestOtherKeyAsync(client), StringComparison.Ordinal);
        if (address.Contains("{delivery}", StringComparison.Ordinal))
            address = address.Replace("{delivery}", (await client.DeliveriesAsync("office"))[0].Text("id"));
        using var request = new HttpRequestMessage(Method, address);
        if (Body is not null)
            request.Content = new StringContent(Body, Encoding.UTF8, MediaType);
        if (IfMatch is not null)
            request.Headers.TryAddWithoutValidation("If-Match", IfMatch);
        if (key is not null)
            request.Headers.TryAddWithoutValidation("Idempotency-Key", key);
        return await Said.OfAsync(await client.SendAsync(request, TestContext.Current.CancellationToken));
    }

    private static async Task<string> OldestOtherKeyAsync(HttpClient client) =>
        (await (await client.ReadAsync("/v1/keys")).JsonAsync()).GetProperty("items").EnumerateArray()
            .Single(key => key.Text("name") is "of a test" or "renamed").Text("id");

    /// <summary>A server on which every write finds what it needs in the portfolio <c>p</c>; its runs wait for ever.</summary>
    public static async Task<(PortfolioServer Server, HttpClient Client, string Run)> PrepareAsync()
    {
        var server = new PortfolioServer(null, ("Roles", "api"));
        var client = server.Client();
        await client.PutJsonAsync("/v1/portfolios/p/document", Samples.Document());
        await server.ClientAsync(new Grant(Right.Read, "p"));
        await client.SubscribeAsync("https://hooks.harbour.example/risk", """{"type":"run.cancelled"}""", "office");
        var run = await client.RunAsync("p");
        await server.DeliverAsync("office");
        return (server, client, run);
    }
}

/// <summary>What makes two answers the same.</summary>
internal sealed record Said(HttpStatusCode Status, string Body, string? Tag, string? Location, string? RetryAfter, string? Type)
{
    public bool Again { get; private init; }

    /// <summary>Without whether it was said before, and without the text of a key, which is said once.</summary>
    public Said Words() => this with { Again = false, Body = Regex.Replace(Body, ",\"secret\":\"[^\"]*\"", "") };

    public static async Task<Said> OfAsync(HttpResponseMessage answer) => new(
        answer.StatusCode, await answer.TextAsync(), answer.Tag(), answer.Headers.Location?.ToString(),
        answer.Headers.RetryAfter?.ToString(), answer.Content.Headers.ContentType?.ToString())
    {
        Again = answer.Headers.TryGetValues("Idempotent-Replay", out var values) && values.Single() == "true",
    };
}
