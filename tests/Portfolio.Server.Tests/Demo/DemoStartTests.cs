using System.Text;
using System.Text.Json;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.Hosting;
using Portfolio.Server.Contracts.Results;
using Portfolio.Server.Demo.Start;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;
using Portfolio.Store.Results;
using Portfolio.Store.Runs;
using Portfolio.Store.Schedules;

namespace Portfolio.Server.Tests.Demo;

/// <summary>
/// The start with the demo on a real store. Runs are worked by a stand-in that ends each with made-up figures as soon as it is queued.
/// </summary>
public sealed class DemoStartTests : IAsyncDisposable
{
    private const int Weeks = 26;

    // Nobody but the stand-in works runs: a real worker that came first would leave the start waiting on a clock that stands.
    private readonly PortfolioServer server = new(null, ("Roles", "api"));
    private int worked;

    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    private DocumentStore Documents => server.Services.GetRequiredService<DocumentStore>();

    private RunStore Runs => server.Services.GetRequiredService<RunStore>();

    [Fact]
    public async Task The_first_start_posts_and_runs_every_week_and_prints_the_table()
    {
        var said = await StartAsync(() => Work());
        var points = await Runs.ListPointsAsync(Caller.System, DemoPosting.Id, null, null, Cancellation);
        // The server's day is Monday, 4 January 2027.
        var sundays = Enumerable.Range(0, Weeks).Select(week => new DateOnly(2027, 1, 3).AddDays(-7 * (Weeks - 1 - week)));
        Assert.Equal(sundays, points.Select(run => run.AsOf));
        Assert.Equal(Enumerable.Range(1, Weeks).Select(week => (long)week), points.Select(run => run.Revision));
        Assert.All(points, run => Assert.Equal((true, 10_000), (run.Recorded, run.Iterations)));
        var schedules = server.Services.GetRequiredService<ScheduleStore>();
        Assert.False((await schedules.FindAsync(Caller.System, DemoPosting.Id, Cancellation))!.Enabled);
        Assert.Contains("week  7 of 26  2026-08-23", said);
        Assert.Contains("week 26 of 26  2027-01-03", said);
        Assert.Contains("/v1/portfolios/harbour-water/runs/latest/results", said);
    }

    [Fact]
    public async Task A_second_start_weeks_later_posts_nothing_and_prints_the_same_table()
    {
        var first = await StartAsync(() => Work());
        server.Clock.Advance(TimeSpan.FromDays(23));
        var second = await StartAsync(() => Assert.Fail("Nothing may be queued."));
        Assert.Equal(Weeks, (await Documents.FindRevisionAsync(Caller.System, DemoPosting.Id, null, Cancellation))!.Number);
        Assert.DoesNotContain("week  7", second);
        Assert.EndsWith(second, first);
    }

    [Fact]
    public async Task A_start_that_was_interrupted_goes_on_where_it_stood()
    {
        await Assert.ThrowsAsync<OperationCanceledException>(() => StartAsync(() =>
        {
            if (worked == 5)
                throw new OperationCanceledException();
            Work();
        }));
        server.Clock.Advance(TimeSpan.FromDays(9));
        await StartAsync(() =>
        {
            // The run that was queued when the start was interrupted is older and comes first.
            while (Work())
            {
            }
        });
        var points = await Runs.ListPointsAsync(Caller.System, DemoPosting.Id, null, null, Cancellation);
        Assert.Equal(Enumerable.Range(1, Weeks).Select(week => (long)week), points.Select(run => run.Revision));
        Assert.Equal(Weeks, worked);
    }

    [Fact]
    public async Task A_portfolio_of_the_same_name_is_left_alone()
    {
        var client = server.Client();
        using var other = new StringContent(Samples.Document(), Encoding.UTF8, "application/json");
        await client.PutAsync($"/v1/portfolios/{DemoPosting.Id}/document", other, Cancellation);
        await Assert.ThrowsAsync<InvalidOperationException>(() => StartAsync(() => Work()));
        Assert.Equal(1, (await Documents.FindRevisionAsync(Caller.System, DemoPosting.Id, null, Cancellation))!.Number);
    }

    public ValueTask DisposeAsync() => server.DisposeAsync();

    private async Task<string> StartAsync(Action wake)
    {
        server.Client();
        var console = new StringWriter();
        using var start = new DemoStart(
            ActivatorUtilities.CreateInstance<DemoPosting>(server.Services), Runs, server.Services.GetRequiredService<ResultStore>(),
            server.Clock, console, wake, () => new DemoAddresses("http://127.0.0.1:5080", null),
            server.Services.GetRequiredService<IHostApplicationLifetime>());
        await start.TellAsync(Cancellation);
        return console.ToString();
    }

    /// <summary>Ends the next run; false when none waits.</summary>
    private bool Work()
    {
        var claim = server.Services.GetRequiredService<RunClaims>()
            .ClaimAsync(Caller.System, "stand-in", "1", TimeSpan.FromMinutes(1), Cancellation);
        if (claim.GetAwaiter().GetResult() is not { } held)
            return false;
        var document = Documents.ReadAsync(Caller.System, DemoPosting.Id, held.Run.Revision, Cancellation).GetAwaiter().GetResult()!;
        string[] projects = [.. document.Parts.Select(part => part.Project).Where(project => project.Length > 0)];
        var result = new RunResult
        {
            ResultDigest = new string('d', 64),
            InputsDigest = new string('d', 64),
            Warnings = "[]",
            Rows =
            [
                Row(held.Run, "portfolio", projects), Row(held.Run, "programme/all", projects),
                .. projects.Select(project => Row(held.Run, $"project/{project}", null)),
            ],
            Grids = [],
        };
        Assert.True(server.Services.GetRequiredService<RunEndings>().SucceedAsync(held, result, Cancellation).GetAwaiter().GetResult());
        worked++;
        return true;
    }

    private static ResultRow Row(StoredRun run, string scope, string[]? projects) =>
        new(scope, JsonSerializer.SerializeToUtf8Bytes(Result(run, scope, projects), ResultsContext.Plain.ResultJson));

    private static ResultJson Result(StoredRun run, string scope, string[]? projects) => new()
    {
        Scope = scope,
        Run = run.Id,
        AsOf = run.AsOf,
        Revision = run.Revision,
        Projects = projects,
        Finish = DemoTableTests.Finish(run.AsOf.AddDays(400)),
        Cost = DemoTableTests.Cost(300_000_000m, 345_500_000m),
    };
}
