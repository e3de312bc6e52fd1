using System.Net;
using Microsoft.Extensions.DependencyInjection;
using Portfolio.Server.Jobs;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Runs;
using Portfolio.Store.Access;

namespace Portfolio.Server.Tests.Schedules;

public sealed class ScheduleEndpointTests
{
    private const string Address = "/v1/portfolios/p/schedule";

    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    [Fact]
    public async Task AScheduleIsSetAndRead()
    {
        await using var server = new PortfolioServer();
        var client = await StartAsync(server, "Europe/Berlin");
        await (await client.ReadAsync(Address)).ProblemAsync(404, "not-found");
        Assert.Equal(HttpStatusCode.OK, (await client.PutJsonAsync(Address, """{"cron":"30 2 * * *","iterations":500}""")).StatusCode);
        Assert.Equal(
            """{"cron":"30 2 * * *","iterations":500,"enabled":true,"status":{"nextDue":"2027-01-05T01:30:00+00:00","lastRuns":[]}}""",
            (await (await client.ReadAsync(Address)).TextAsync()).Replace("00:00Z", "00:00+00:00", StringComparison.Ordinal).Replace("30:00Z", "30:00+00:00", StringComparison.Ordinal));
        await client.PutJsonAsync(Address, """{"cron":"30 2 * * *","enabled":false}""");
        Assert.Equal("""{"cron":"30 2 * * *","enabled":false,"status":{"lastRuns":[]}}""", await (await client.ReadAsync(Address)).TextAsync());
    }

    [Theory]
    [InlineData("""{}""", "", "member.missing")]
    [InlineData("""{"cron":"every night"}""", "/cron", "cron.format")]
    [InlineData("""{"cron":"0 30 2 * * *"}""", "/cron", "cron.format")]
    [InlineData("""{"cron":"0 0 30 2 *"}""", "/cron", "cron.format")]
    [InlineData("""{"cron":"0 2 * * *","iterations":9}""", "/iterations", "number.range")]
    public async Task AWrongScheduleIsRefused(string json, string path, string code)
    {
        await using var server = new PortfolioServer(null, ("Roles", "api"));
        var client = await StartAsync(server);
        Assert.Equal([(path, code)], (await (await client.PutJsonAsync(Address, json)).ProblemAsync(422, "refused")).Faults());
    }

    [Fact]
    public async Task SettingAScheduleNeedsTheRight()
    {
        await using var server = new PortfolioServer(null, ("Roles", "api"));
        await StartAsync(server);
        var reader = await server.ClientAsync(new Grant(Right.Read, "p"));
        await (await reader.PutJsonAsync(Address, """{"cron":"0 2 * * *"}""")).ProblemAsync(403, "forbidden");
        var stranger = await server.ClientAsync(new Grant(Right.Manage, "q"));
        await (await stranger.ReadAsync(Address)).ProblemAsync(404, "not-found");
    }

    [Fact]
    public async Task ADueInstantMakesOneRunHoweverManySweepsRace()
    {
        await using var server = new PortfolioServer();
        var client = await StartAsync(server);
        await client.PutJsonAsync(Address, """{"cron":"0 2 * * *","iterations":50}""");
        await SweepAsync(server, 1);
        Assert.Empty(await RunsAsync(client));

        server.Clock.SetUtcNow(new DateTimeOffset(2027, 1, 5, 2, 0, 0, TimeSpan.Zero));
        await SweepAsync(server, 8);
        var run = Assert.Single(await RunsAsync(client));
        await server.Services.GetRequiredService<RunWorker>().WorkAsync(Cancellation);
        var done = await client.UntilAsync("p", run, "succeeded");
        Assert.Equal(("schedule", "2027-01-05", true, 50), (done.Text("trigger"), done.Text("asOf"), done.GetProperty("recorded").GetBoolean(), done.GetProperty("iterations").GetInt32()));
        Assert.Equal(run, (await client.ReadRunAsync("p", "latest")).Text("id"));
        server.Clock.Advance(TimeSpan.FromHours(10));
        await SweepAsync(server, 1);
        Assert.Single(await RunsAsync(client));
    }

    [Fact]
    public async Task AfterDowntimeTheLatestDateIsRunWithTheRevisionOfItsInstant()
    {
        var directory = Directory.CreateTempSubdirectory("portfolio-");
        try
        {
            await using (var server = new PortfolioServer(directory.FullName, ("Roles", "api")))
            {
                var client = await StartAsync(server);
                await client.PutJsonAsync(Address, """{"cron":"0 2 * * *","iterations":50}""");
                // The due instant passes without a worker; what is written later does not reach its run.
                server.Clock.SetUtcNow(new DateTimeOffset(2027, 1, 8, 3, 0, 0, TimeSpan.Zero));
                await client.PutJsonAsync("/v1/portfolios/p/document", RunSamples.Uncertain(activities: 4), "*");
            }
            await using var again = new PortfolioServer(directory.FullName);
            again.Clock.SetUtcNow(new DateTimeOffset(2027, 1, 8, 4, 0, 0, TimeSpan.Zero));
            var later = again.Client();
            await SweepAsync(again, 1);
            var run = await later.ReadRunAsync("p", Assert.Single(await RunsAsync(later)));
            Assert.Equal(("2027-01-08", 1), (run.Text("asOf"), run.GetProperty("revision").GetInt32()));
            var last = (await (await later.ReadAsync(Address)).JsonAsync()).GetProperty("status").GetProperty("lastRuns").EnumerateArray().ToList();
            Assert.Equal(["2027-01-08", "2027-01-07", "2027-01-06", "2027-01-05"], last.Select(due => due.Text("asOf")));
            Assert.All(last.Skip(1), due => Assert.Equal("missed", due.State()));
        }
        finally
        {
            directory.Delete(recursive: true);
        }
    }

    private static async Task<HttpClient> StartAsync(PortfolioServer server, string timeZone = "UTC")
    {
        var client = server.Client();
        await client.PutJsonAsync("/v1/portfolios/p/document", RunSamples.Uncertain(timeZone: timeZone));
        return client;
    }

    private static Task SweepAsync(PortfolioServer server, int times) =>
        Task.WhenAll(Enumerable.Range(0, times).Select(_ => Task.Run(() => server.Services.GetRequiredService<Nightly>().MakeDueAsync(Cancellation))));

    private static async Task<IReadOnlyList<string>> RunsAsync(HttpClient client) =>
        [.. (await (await client.ReadAsync("/v1/portfolios/p/runs")).JsonAsync()).GetProperty("items").EnumerateArray().Select(run => run.Text("id"))];
}
