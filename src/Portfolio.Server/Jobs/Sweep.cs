using Portfolio.Server.Telemetry;
using Portfolio.Store.Access;
using Portfolio.Store.Idempotency;
using Portfolio.Store.Runs;
using Portfolio.Store.Schedules;

namespace Portfolio.Server.Jobs;

/// <summary>
/// What is done every minute whatever signals were lost: due runs are made, the standing is measured, answers kept long enough are
/// forgotten. Working what is there comes after it.
/// </summary>
public sealed class Sweep(Nightly nightly, RunStore runs, ScheduleStore schedules, AnswerStore answers, RunMeasures measures)
{
    // A run older than these many due dates is no longer looked for.
    private const int DueDatesBack = 30;

    public async Task RunAsync(CancellationToken cancellation)
    {
        await nightly.MakeDueAsync(cancellation);
        await answers.ForgetAsync(cancellation);
        measures.Swept(await runs.CountQueuedAsync(Caller.System, cancellation), await OldestLastGoodAsync(cancellation));
    }

    private async Task<DateTimeOffset?> OldestLastGoodAsync(CancellationToken cancellation)
    {
        DateTimeOffset? oldest = null;
        foreach (var schedule in await schedules.ListEnabledAsync(Caller.System, cancellation))
        {
            var due = await runs.ListDueAsync(Caller.System, schedule.Portfolio, DueDatesBack, cancellation);
            if (due.FirstOrDefault(run => run.State == RunState.Succeeded)?.FinishedAt is { } ended && !(ended > oldest))
                oldest = ended;
        }
        return oldest;
    }
}
