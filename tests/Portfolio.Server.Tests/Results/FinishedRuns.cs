using Microsoft.Extensions.DependencyInjection;
using Portfolio.Engine;
using Portfolio.Server.Results;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;
using Portfolio.Store.Runs;
using Portfolio.Store.Samples;

namespace Portfolio.Server.Tests.Results;

/// <summary>Puts the small portfolio and finished runs of it into a server, for the tests of what is read back.</summary>
internal static class FinishedRuns
{
    public static readonly string Document = $$"""{"settings":{{SmallPortfolio.Settings}},"projects":[{{string.Join(',', SmallPortfolio.Projects)}}]}""";

    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    /// <summary>A server that works no runs itself, so that the tests decide what a run leaves.</summary>
    public static PortfolioServer Server() => new(null, ("Roles", "api"));

    public static async Task PutAsync(PortfolioServer server, string portfolio) =>
        Assert.True((await server.Client().PutJsonAsync($"/v1/portfolios/{portfolio}/document", Document, "*")).IsSuccessStatusCode
            || (await server.Client().PutJsonAsync($"/v1/portfolios/{portfolio}/document", Document)).IsSuccessStatusCode);

    /// <summary>Makes a run that stands for a date, works it and stores what it leaves.</summary>
    /// <param name="projects">What is simulated instead of the stored document, so that runs differ.</param>
    public static async Task<string> MakeAsync(
        PortfolioServer server, string portfolio, DateOnly asOf, bool keepSamples = true, params string[] projects)
    {
        var run = await QueueAsync(server, portfolio, asOf);
        var claims = server.Services.GetRequiredService<RunClaims>();
        var held = await claims.ClaimAsync(Caller.System, "test", "1", TimeSpan.FromMinutes(5), Cancellation);
        Assert.Equal(run, held!.Run.Id);
        var plan = SmallPortfolio.Plan(SmallPortfolio.Settings, projects);
        var facts = SmallPortfolio.Facts(run) with { AsOf = asOf, Revision = 1 };
        var samples = SmallPortfolio.Samples(plan, facts);
        if (keepSamples)
        {
            var store = server.Services.GetRequiredService<SampleStore>();
            Assert.True(await store.WriteBlockAsync(held, 0, facts.Iterations, [.. Series(plan, samples)], Cancellation));
        }
        var result = FinishedRun.Build(plan, samples, facts, Cancellation);
        Assert.True(await server.Services.GetRequiredService<RunEndings>().SucceedAsync(held, result, Cancellation));
        return run;
    }

    private static IEnumerable<SeriesBlock> Series(Plan plan, SampleReader samples)
    {
        foreach (var project in plan.Document.Projects)
        {
            yield return SeriesBlock.OfMinutes(SeriesNames.Finish(project.Id), samples.Minutes(SeriesNames.Finish(project.Id)));
            yield return SeriesBlock.OfMoney(SeriesNames.Cost(project.Id), samples.Money(SeriesNames.Cost(project.Id)));
        }
        foreach (var milestone in plan.Milestones)
        {
            var series = SeriesNames.Milestone(plan.Document.Projects[milestone.Project].Id, milestone.Activity.Id);
            yield return SeriesBlock.OfMinutes(series, samples.Minutes(series));
        }
    }

    public static async Task<string> QueueAsync(PortfolioServer server, string portfolio, DateOnly asOf)
    {
        var documents = server.Services.GetRequiredService<DocumentStore>();
        var revision = await documents.FindRevisionAsync(Caller.System, portfolio, null, Cancellation);
        var asked = new NewRun
        {
            Portfolio = portfolio,
            AsOf = asOf,
            DateEndsAt = new DateTimeOffset(asOf.AddDays(1), TimeOnly.MinValue, TimeSpan.Zero),
            Revision = revision!.Number,
            Seed = 1,
            Iterations = SmallPortfolio.Iterations,
            Recorded = true,
        };
        var answer = await server.Services.GetRequiredService<RunRequests>().CreateAsync(Caller.System, asked, null, Cancellation);
        Assert.Equal(RunRequestOutcome.Created, answer.Outcome);
        return answer.Run!.Id;
    }
}

/// <summary>A server with one finished run of the small portfolio, <c>works</c>, for 2027-01-03.</summary>
public sealed class FinishedRunFixture : IAsyncLifetime
{
    internal PortfolioServer Server { get; } = FinishedRuns.Server();

    internal string Run { get; private set; } = "";

    public async ValueTask InitializeAsync()
    {
        await FinishedRuns.PutAsync(Server, "works");
        Run = await FinishedRuns.MakeAsync(Server, "works", new(2027, 1, 3));
    }

    public ValueTask DisposeAsync() => Server.DisposeAsync();
}
