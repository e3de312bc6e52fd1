using System.Text.Json;
using Portfolio.Server.Contracts.Results;
using Portfolio.Store.Access;
using Portfolio.Store.Results;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Demo.Start;

/// <summary>
/// The start with <c>--demo</c>: posts what is missing of the history, waits for its runs, prints the table. It talks to whoever sits at
/// the console and only asks for runs; they are worked like any others. Safe to stop at any point and to start again.
/// </summary>
/// <param name="wake">Asks the workers to look for runs.</param>
internal sealed class DemoStart(
    DemoPosting posting, RunStore runs, ResultStore results, TimeProvider clock, TextWriter console, Action wake,
    Func<DemoAddresses> addresses, IHostApplicationLifetime process) : BackgroundService
{
    private static readonly TimeSpan BetweenLooks = TimeSpan.FromMilliseconds(100);

    private readonly TaskCompletionSource serving = new();

    protected override async Task ExecuteAsync(CancellationToken cancellation)
    {
        using var started = process.ApplicationStarted.Register(serving.SetResult);
        await serving.Task.WaitAsync(cancellation);
        try
        {
            await TellAsync(cancellation);
        }
        catch (InvalidOperationException refused)
        {
            await console.WriteLineAsync($"The demo stops here: {refused.Message}");
        }
    }

    /// <summary>Everything from the first revision to the table.</summary>
    internal async Task TellAsync(CancellationToken cancellation)
    {
        var first = await posting.FirstWeekAsync(cancellation);
        var points = first is { } week ? await posting.PointsAsync(week, cancellation) : [];
        if (points.Count < DemoHistory.Length)
            points = await WorkAsync(first, cancellation);
        var table = new DemoTable(points[^1].AsOf, await RowsAsync(points[^1], cancellation), await RowsAsync(points[^2], cancellation));
        await console.WriteLineAsync($"\n{table.Render()}\n{addresses().Render()}");
    }

    private async Task<IReadOnlyList<StoredRun>> WorkAsync(DateOnly? first, CancellationToken cancellation)
    {
        // A history begun on another day is finished as it was begun.
        var today = first is { } week ? DemoHistory.DayAfter(week) : DateOnly.FromDateTime(clock.GetUtcNow().UtcDateTime);
        var weeks = DemoHistory.Weeks(today);
        await console.WriteLineAsync($"Demo portfolio '{DemoPosting.Id}': posting {weeks.Count} weeks and running each.");
        var runsOfWeeks = new List<StoredRun>(weeks.Count);
        var told = 0;
        await foreach (var run in posting.PostAsync(weeks, wake, cancellation))
        {
            runsOfWeeks.Add(run);
            // While later weeks are still being posted, those that are done already are told.
            while (told < runsOfWeeks.Count && await IsDoneAsync(weeks[told], runsOfWeeks[told], cancellation))
                await TellAsync(weeks[told], runsOfWeeks[told++]);
        }
        for (; told < weeks.Count; told++)
        {
            while (!await IsDoneAsync(weeks[told], runsOfWeeks[told], cancellation))
                await Task.Delay(BetweenLooks, clock, cancellation);
            await TellAsync(weeks[told], runsOfWeeks[told]);
        }
        return runsOfWeeks;
    }

    // What an earlier start has finished is not told again.
    private Task TellAsync(DemoWeek week, StoredRun posted) => posted.State == RunState.Succeeded
        ? Task.CompletedTask
        : console.WriteLineAsync($"week {week.Number,2} of {DemoHistory.Length}  {week.AsOf:yyyy-MM-dd}  {week.Note}");

    private async Task<bool> IsDoneAsync(DemoWeek week, StoredRun posted, CancellationToken cancellation)
    {
        var run = await runs.FindAsync(Caller.System, DemoPosting.Id, posted.Id, cancellation);
        return run?.State switch
        {
            RunState.Succeeded => true,
            RunState.Queued or RunState.Running => false,
            _ => throw new InvalidOperationException($"the run of week {week.Number} ended as {run?.State}. {run?.Error}"),
        };
    }

    private async Task<IReadOnlyList<ResultJson>> RowsAsync(StoredRun run, CancellationToken cancellation) =>
        [
            .. (await results.ListAsync(Caller.System, DemoPosting.Id, run.Id, 0, int.MaxValue, cancellation))
                .Select(row => JsonSerializer.Deserialize(row.Json, ResultsContext.Plain.ResultJson)!),
        ];
}
