using System.Globalization;
using System.Text.Json;
using Microsoft.Extensions.DependencyInjection;
using Portfolio.Server.Events;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Runs;
using Portfolio.Server.Tests.Subscriptions;
using Portfolio.Store.Access;
using static Portfolio.Server.Tests.Subscriptions.SubscriptionScene;

namespace Portfolio.Server.Tests.Events;

/// <summary>What follows from runs, estimates and refused posts for those who asked to be told. Nothing is sent: the feed shows it.</summary>
public sealed class ConditionTests : IAsyncDisposable
{
    private readonly PortfolioServer server = SubscriptionScene.Server();

    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    /// <summary>Two subscriptions with the same wishes: what follows is told once.</summary>
    private async Task<HttpClient> WishAsync(string wishes, string document)
    {
        var client = server.Client();
        await client.PutDocumentAsync(document);
        await client.SubscribeAsync("http://localhost:1/", wishes, "one");
        await client.SubscribeAsync("http://localhost:1/", wishes, "two");
        return client;
    }

    /// <summary>A run for a later day, of a document in which the work takes so long.</summary>
    private async Task RunAsync(HttpClient client, string day, double days, string commitments = "{}")
    {
        server.Clock.SetUtcNow(new DateTimeOffset(DateOnly.Parse(day, CultureInfo.InvariantCulture), new(12, 0), TimeSpan.Zero));
        await client.PutDocumentAsync(Certain(days, commitments: commitments));
        await client.SucceedAsync("p");
        await server.SettledAsync();
    }

    [Fact]
    public async Task ALevelThatMovedSinceLastWeekIsToldOncePerWeekAndDirection()
    {
        var client = await WishAsync("""{"type":"level.moved","days":7}""", Certain(10));
        await RunAsync(client, "2027-01-04", 10);
        await RunAsync(client, "2027-01-06", 40);
        Assert.Empty(await MovedAsync(client));
        // The week that ends on Sunday the 10th ended at 40 days: 47 are not more than 7 later, 48 are, and once is enough.
        await RunAsync(client, "2027-01-11", 47);
        Assert.Empty(await MovedAsync(client));
        await RunAsync(client, "2027-01-12", 48);
        await RunAsync(client, "2027-01-13", 60);
        var later = Assert.Single(await MovedAsync(client));
        var data = later.GetProperty("data");
        Assert.Equal(
            ("portfolio", "2027-01-12", 8, "2027-02-20", "2027-01-06", "2027-02-12"),
            (later.Text("subject"), data.Text("asOf"), data.GetProperty("changeDays").GetInt32(), data.Text("value"),
                data.GetProperty("previous").Text("asOf"), data.GetProperty("previous").Text("value")));
        Assert.Equal(
            """{"type":"level.moved","scope":"portfolio","metric":"finish","level":80,"days":7,"every":"week"}""",
            data.GetProperty("wish").GetRawText());
        await RunAsync(client, "2027-01-14", 20);
        Assert.Equal([8, -20], (await MovedAsync(client)).Select(told => told.GetProperty("data").GetProperty("changeDays").GetInt32()));
        await RunAsync(client, "2027-01-18", 28);
        Assert.Equal(3, (await MovedAsync(client)).Count);
        foreach (var subscription in new[] { "one", "two" })
            Assert.Equal(3, (await client.DeliveriesAsync(subscription)).Count);
    }

    [Fact]
    public async Task MoneyMovesByAmountsAndAPartTellsOfItsProject()
    {
        var client = await WishAsync(
            """{"type":"level.moved","scope":"project/weir-lock","metric":"cost","amount":250,"every":"run"}""", Certain(10));
        await RunAsync(client, "2027-01-04", 10);
        await RunAsync(client, "2027-01-05", 12.5);
        Assert.Empty(await MovedAsync(client));
        await RunAsync(client, "2027-01-06", 9);
        var told = Assert.Single(await MovedAsync(client));
        Assert.Equal(
            ("project/weir-lock", -350m, 900m),
            (told.Text("subject"), told.GetProperty("data").GetProperty("change").GetDecimal(), told.GetProperty("data").GetProperty("value").GetDecimal()));
    }

    [Fact]
    public async Task FillingInThePastMovesNothing()
    {
        var client = await WishAsync("""{"type":"level.moved","days":1,"every":"run"}""", Certain(10));
        server.Clock.SetUtcNow(new(2027, 1, 4, 12, 0, 0, TimeSpan.Zero));
        await client.SucceedAsync("p", """{"asOf":"2027-01-02"}""");
        server.Clock.Advance(TimeSpan.FromDays(1));
        await client.SucceedAsync("p");
        await client.PutDocumentAsync(Certain(50));
        await client.SucceedAsync("p", """{"asOf":"2027-01-03"}""");
        await server.SettledAsync();
        Assert.Empty(await MovedAsync(client));
    }

    [Fact]
    public async Task ACommitmentIsToldOfWhenItsProbabilityFallsBelowTheLineAndNotEveryNight()
    {
        const string promise = """{"finish":"2027-01-20","budget":1500}""";
        const string wishes = """
            {"type":"commitment.belowProbability","scope":"project/weir-lock","probability":0.5},
            {"type":"commitment.belowProbability","scope":"project/weir-lock","metric":"cost","probability":1},
            {"type":"commitment.belowProbability","probability":0.5}
            """;
        var client = await WishAsync(wishes, Certain(10, commitments: promise));
        await RunAsync(client, "2027-01-04", 10, promise);
        Assert.Empty(await BelowAsync(client));
        await RunAsync(client, "2027-01-05", 16.5, promise);
        Assert.Equal(["cost"], await BelowAsync(client));
        await RunAsync(client, "2027-01-06", 30, promise);
        await RunAsync(client, "2027-01-07", 30, promise);
        Assert.Equal(["cost", "finish"], await BelowAsync(client));
        await RunAsync(client, "2027-01-08", 10, promise);
        await RunAsync(client, "2027-01-09", 30, promise);
        Assert.Equal(["cost", "finish", "finish", "cost"], await BelowAsync(client));
        var told = (await client.EventsAsync("portfolio.commitment.belowProbability"))[1].GetProperty("data");
        Assert.Equal(
            ("2027-01-20", 0.0, 1.0),
            (told.Text("commitment"), told.GetProperty("probability").GetDouble(), told.GetProperty("previous").GetProperty("probability").GetDouble()));
    }

    [Fact]
    public async Task ACommitmentThatIsUnlikelyFromTheBeginningIsToldOf()
    {
        const string promise = """{"finish":"2027-01-06"}""";
        var client = await WishAsync(
            """{"type":"commitment.belowProbability","scope":"project/weir-lock","probability":0.5}""", Certain(10, commitments: promise));
        await RunAsync(client, "2027-01-04", 10, promise);
        var told = Assert.Single(await client.EventsAsync("portfolio.commitment.belowProbability"));
        Assert.False(told.GetProperty("data").TryGetProperty("previous", out _));
    }

    [Fact]
    public async Task AnOldEstimateIsToldOfOnceUntilItIsRenewed()
    {
        var client = await WishAsync("""{"type":"estimates.stale","days":30}""", Certain(10, statusDate: "2027-01-04"));
        foreach (var (day, count) in new[] { ("2027-02-03", 0), ("2027-02-04", 2), ("2027-02-05", 2), ("2027-06-01", 2) })
            Assert.Equal((day, count), (day, await StaleAsync(client, day)));
        var data = (await client.EventsAsync("portfolio.estimates.stale"))[0].GetProperty("data");
        Assert.Equal(
            ("weir-lock", "2027-01-04", 31, "2027-02-04"),
            (data.Text("project"), data.Text("statusDate"), data.GetProperty("ageDays").GetInt32(), data.Text("asOf")));
        await client.PutDocumentAsync(Certain(10, statusDate: "2027-06-01"));
        Assert.Equal(2, await StaleAsync(client, "2027-07-01"));
        Assert.Equal(4, await StaleAsync(client, "2027-07-02"));
    }

    [Fact]
    public async Task AProjectIsToldOfWhateverItsId()
    {
        var client = await WishAsync(
            """{"type":"estimates.stale","days":30}""", Certain(10, statusDate: "2027-01-04").Replace("quay", "looked", StringComparison.Ordinal));
        Assert.Equal(0, await StaleAsync(client, "2027-01-04"));
        Assert.Equal(2, await StaleAsync(client, "2027-02-04"));
    }

    [Fact]
    public async Task APostThatIsRefusedIsToldOfWithoutItsContent()
    {
        var client = await WishAsync("""{"type":"post.refused"}""", Certain(10));
        var wrong = Certain(10, statusDate: "2027-13-01").Replace("\"duration\":1}", "\"duration\":-1}", StringComparison.Ordinal);
        await (await client.PutJsonAsync("/v1/portfolios/p/document", wrong, "*")).ProblemAsync(422, "refused");
        await (await client.PutJsonAsync("/v1/portfolios/p/document", Certain(11))).ProblemAsync(428, "precondition-required");
        var told = Assert.Single(await client.EventsAsync("portfolio.post.refused"));
        var data = told.GetProperty("data");
        Assert.Equal("document.put", data.Text("action"));
        Assert.Equal("first administrator", data.GetProperty("by").Text("name"));
        Assert.Equal(2, data.GetProperty("refused").GetProperty("codes").GetProperty("date.format").GetInt32());
        Assert.Equal(3, data.GetProperty("refused").GetProperty("faults").GetInt32());
        Assert.DoesNotContain("weir-lock", told.ToString(), StringComparison.Ordinal);
        await server.SettledAsync();
        Assert.Single(await client.DeliveriesAsync("one"));
    }

    [Fact]
    public async Task OfPostsThatAreRefusedWithoutEndEachKeyIsToldOfOnceAMinute()
    {
        var client = await WishAsync("""{"type":"post.refused"}""", Certain(10));
        var other = await server.ClientAsync(new Grant(Right.Manage, "p"));
        var wrong = Certain(10, statusDate: "2027-13-01");
        foreach (var (sender, told) in new[] { (client, 1), (client, 1), (other, 2), (client, 2), (other, 2) })
        {
            await (await sender.PutJsonAsync("/v1/portfolios/p/document", wrong, "*")).ProblemAsync(422, "refused");
            Assert.Equal(told, (await client.EventsAsync("portfolio.post.refused")).Count);
        }
        server.Clock.Advance(TimeSpan.FromMinutes(1));
        await (await client.PutJsonAsync("/v1/portfolios/p/document", wrong, "*")).ProblemAsync(422, "refused");
        Assert.Equal(3, (await client.EventsAsync("portfolio.post.refused")).Count);
        Assert.Equal(6, (await server.AuditTextAsync()).Split('\n').Count(line => line.Contains("\"problem\":\"refused\"", StringComparison.Ordinal)));
    }

    private async Task<int> StaleAsync(HttpClient client, string day)
    {
        server.Clock.SetUtcNow(new DateTimeOffset(DateOnly.Parse(day, CultureInfo.InvariantCulture), new(12, 0), TimeSpan.Zero));
        var ages = server.Services.GetRequiredService<EstimateAges>();
        await Task.WhenAll(ages.LookAsync(Cancellation), ages.LookAsync(Cancellation));
        return (await client.EventsAsync("portfolio.estimates.stale")).Count;
    }

    private static Task<IReadOnlyList<JsonElement>> MovedAsync(HttpClient client) => client.EventsAsync("portfolio.level.moved");

    private static async Task<IReadOnlyList<string>> BelowAsync(HttpClient client) =>
        [.. (await client.EventsAsync("portfolio.commitment.belowProbability")).Select(told => told.GetProperty("data").GetProperty("wish").Text("metric"))];

    public ValueTask DisposeAsync() => server.DisposeAsync();
}
