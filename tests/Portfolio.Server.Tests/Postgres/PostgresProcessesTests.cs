using System.Net;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Jobs;
using Portfolio.Server.Tests.Runs;

namespace Portfolio.Server.Tests.Postgres;

/// <summary>Several processes on one PostgreSQL database.</summary>
public sealed class PostgresProcessesTests : IAsyncLifetime
{
    // Twenty blocks.
    private const string LongRun = """{"iterations":81920}""";

    private readonly DirectoryInfo directory = Directory.CreateTempSubdirectory("portfolio-");
    private TestPostgres database = null!;

    public async ValueTask InitializeAsync() => database = await TestPostgres.MakeAsync();

    public async ValueTask DisposeAsync()
    {
        directory.Delete(recursive: true);
        if (database is not null)
            await database.DisposeAsync();
    }

    [Fact]
    public async Task ARunOfAProcessThatIsKilledGoesOnInAnotherAndGivesTheSameBits()
    {
        using var killed = await StartAsync();
        await killed.Client.PutJsonAsync("/v1/portfolios/p/document", RunSamples.Uncertain(projects: 10, activities: 30));
        var run = await killed.Client.RunAsync("p", LongRun);
        await killed.Client.UntilSomeBlocksAreStoredAsync("p", run);
        await killed.KillAsync();

        using var other = await StartAsync();
        var resumed = await other.Client.UntilAsync("p", run, "succeeded");
        Assert.Equal(2, resumed.GetProperty("attempt").GetInt32());
        var undisturbed = await other.Client.SucceedAsync("p", LongRun);
        Assert.Equal(undisturbed.Text("resultDigest"), resumed.Text("resultDigest"));
        Assert.Equal(0, await other.StopAsync());
    }

    [Fact]
    public async Task ProcessesThatStartTogetherShareTheRunsAndEachRunIsFinishedOnce()
    {
        var both = await Task.WhenAll(StartAsync(), StartAsync());
        using var one = both[0];
        using var other = both[1];
        await one.Client.PutJsonAsync("/v1/portfolios/p/document", RunSamples.Uncertain(projects: 10, activities: 30));
        var runs = new List<string>();
        for (var number = 0; number < 10; number++)
            runs.Add(await both[number % 2].Client.RunAsync("p", """{"iterations":20000}"""));
        foreach (var run in runs)
            Assert.Equal(1, (await one.Client.UntilAsync("p", run, "succeeded")).GetProperty("attempt").GetInt32());
        Assert.Equal(10, await database.CountAsync("select count(*) from outbox where kind = 'run.succeeded'"));
        Assert.Equal(10, await database.CountAsync("select count(distinct subject) from outbox where kind = 'run.succeeded'"));
        Assert.All(both, process => Assert.Contains(process.Said, line => line.Contains(": succeeded.", StringComparison.Ordinal)));
    }

    [Fact]
    public async Task OfFiftyWritersOnOneTagOneWinsWhateverProcessItAsks()
    {
        var both = await Task.WhenAll(StartAsync("api"), StartAsync("api"));
        using var one = both[0];
        using var other = both[1];
        await one.Client.PutJsonAsync("/v1/portfolios/p/document", RunSamples.Uncertain());
        var tag = (await other.Client.ReadAsync("/v1/portfolios/p/document")).Tag();
        var answers = await Task.WhenAll(Enumerable.Range(0, 50).Select(number => both[number % 2].Client.PutJsonAsync(
            "/v1/portfolios/p/document", RunSamples.Uncertain(activities: 4 + number), tag)));
        Assert.Equal(1, answers.Count(answer => answer.StatusCode == HttpStatusCode.OK));
        Assert.Equal(49, answers.Count(answer => answer.StatusCode == HttpStatusCode.PreconditionFailed));
        Assert.Equal(2, await database.CountAsync("select count(*) from revision"));
    }

    private Task<ServerProcess> StartAsync(string roles = "all") => ServerProcess.StartAsync(
        directory.FullName, ("Storage__Postgres", database.ConnectionString), ("Engine__LeaseSeconds", "3"), ("Roles", roles));
}
