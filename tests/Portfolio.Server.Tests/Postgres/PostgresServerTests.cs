using System.Diagnostics;
using System.Net;
using Microsoft.Extensions.DependencyInjection;
using Portfolio.Server.Jobs;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Runs;

namespace Portfolio.Server.Tests.Postgres;

/// <summary>The server on PostgreSQL.</summary>
public sealed class PostgresServerTests : IAsyncLifetime
{
    private const string Address = "/v1/portfolios/p";

    private TestPostgres database = null!;

    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    public async ValueTask InitializeAsync() => database = await TestPostgres.MakeAsync();

    public ValueTask DisposeAsync() => database is null ? ValueTask.CompletedTask : database.DisposeAsync();

    [Fact]
    public async Task TheMainJobGivesWhatItGivesOnTheEmbeddedDatabase()
    {
        await using var embedded = new PortfolioServer();
        await using var shared = OnPostgres();
        var expected = await MainJobAsync(embedded);
        Assert.Equal(expected, await MainJobAsync(shared));
        Assert.Contains("percentiles", expected, StringComparison.Ordinal);
        Assert.False(File.Exists(Path.Combine(shared.Directory, "portfolio.db")));
    }

    private static async Task<string> MainJobAsync(PortfolioServer server)
    {
        var client = server.Client();
        var written = await client.PutJsonAsync($"{Address}/document", RunSamples.Uncertain(projects: 4, activities: 6));
        Assert.True(written.StatusCode == HttpStatusCode.Created, await written.TextAsync());
        var run = await client.SucceedAsync("p", "{}");
        var told = new List<string> { run.Text("resultDigest"), run.Text("inputsDigest") };
        string[] reads =
        [
            "document", "runs/latest/results", "runs/latest/results?format=csv", "runs/latest/results/project/P1?levels=5,99.5",
            "runs/latest/distribution?scope=portfolio&metric=cost", "series?scope=portfolio&metric=finish&level=80", "contingency?level=80",
        ];
        foreach (var read in reads)
        {
            var answer = await client.ReadAsync($"{Address}/{read}");
            Assert.True(answer.StatusCode == HttpStatusCode.OK, $"{read}: {await answer.TextAsync()}");
            told.Add((await answer.TextAsync()).Replace(run.Text("id"), "the run", StringComparison.Ordinal));
        }
        return string.Join('\n', told);
    }

    [Fact]
    public async Task ADueInstantMakesOneRunHoweverManyProcessesSweep()
    {
        await using var one = OnPostgres(("Roles", "api"));
        await using var other = OnPostgres(("Roles", "api"));
        var client = one.Client();
        await client.PutJsonAsync($"{Address}/document", RunSamples.Uncertain());
        await client.PutJsonAsync($"{Address}/schedule", """{"cron":"0 2 * * *","iterations":50}""");
        PortfolioServer[] both = [one, other];
        foreach (var server in both)
            server.Clock.SetUtcNow(new DateTimeOffset(2027, 1, 5, 2, 0, 0, TimeSpan.Zero));
        await Task.WhenAll(Enumerable.Range(0, 8).Select(number => Task.Run(
            () => both[number % 2].Services.GetRequiredService<Nightly>().MakeDueAsync(Cancellation))));
        var runs = (await (await other.Client().ReadAsync($"{Address}/runs")).JsonAsync()).GetProperty("items");
        Assert.Equal("2027-01-05", Assert.Single(runs.EnumerateArray()).Text("asOf"));
    }

    [Theory]
    [InlineData("/v1/audit?actor=%00")]
    [InlineData("/v1/keys?cursor=a%00")]
    [InlineData("/v1/portfolios/p/events?after=%00")]
    [InlineData("/v1/portfolios/p/subscriptions?cursor=%00")]
    [InlineData("/v1/portfolios/p/calendar.ics?run=%00")]
    [InlineData("/v1/portfolios/p/series?scope=project/%00&metric=finish")]
    public async Task ACharacterThatNoTextHoldsIsRefused(string address)
    {
        await using var server = OnPostgres();
        var client = server.Client();
        await client.PutJsonAsync($"{Address}/document", RunSamples.Uncertain());
        await (await client.ReadAsync(address)).ProblemAsync(400, "bad-request");
        await (await client.PostJsonAsync($"{Address}/runs", """{"replaces":"\u0000"}""")).ProblemAsync(422, "refused");
    }

    [Fact]
    public async Task WhileTheDatabaseIsAwayItIsSaidAndAfterwardsEverythingGoesOn()
    {
        await using var server = OnPostgres(("Engine:Threads", "1"), ("Engine:LeaseSeconds", "3"));
        var client = server.Client();
        await client.PutJsonAsync($"{Address}/document", RunSamples.Uncertain());
        var before = await client.ReadAsync($"{Address}/document");
        await client.SucceedAsync("p", """{"iterations":50}""");

        await database.CutAsync();
        Assert.Equal(HttpStatusCode.OK, (await client.ReadAsync("/health/live")).StatusCode);
        Assert.Equal(HttpStatusCode.ServiceUnavailable, (await client.ReadAsync("/health/ready")).StatusCode);
        foreach (var refused in new[]
        {
            await client.ReadAsync($"{Address}/document"),
            await client.PutJsonAsync($"{Address}/document", RunSamples.Uncertain(activities: 4), before.Tag()),
            await client.PostRunAsync("p"),
        })
        {
            var problem = await refused.ProblemAsync(503, "storage-unavailable");
            Assert.StartsWith("Nothing was kept.", problem.Text("detail"), StringComparison.Ordinal);
            Assert.NotNull(refused.Headers.RetryAfter);
        }

        await database.LetInAsync();
        var waited = Stopwatch.StartNew();
        while ((await client.ReadAsync("/health/ready")).StatusCode != HttpStatusCode.OK)
            await Task.Delay(100, Cancellation);
        Assert.InRange(waited.Elapsed.TotalSeconds, 0, 30);
        Assert.Equal(before.Tag(), (await client.ReadAsync($"{Address}/document")).Tag());
        await client.SucceedAsync("p", """{"iterations":50}""");
        Assert.Equal(2, await database.CountAsync("select count(*) from run where state = 'succeeded'"));
    }

    private PortfolioServer OnPostgres(params (string Key, string? Value)[] settings) =>
        new(null, [("Storage:Postgres", database.ConnectionString), .. settings]);
}
