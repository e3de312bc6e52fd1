using Portfolio.Server.Contracts.Runs;
using Portfolio.Server.Contracts.Schedules;
using Portfolio.Server.Documents;
using Portfolio.Store.Access;
using Portfolio.Store.Runs;
using Portfolio.Store.Schedules;

namespace Portfolio.Server.Schedules;

/// <summary>A schedule with its next due instant and what became of the last due dates.</summary>
internal sealed class ScheduleStanding(ScheduleStore schedules, RunStore runs, RevisionOfDate dates, TimeProvider clock)
{
    private const int Shown = 14;

    /// <summary>Null when none is set, or not for this caller.</summary>
    public async Task<ScheduleStandingJson?> ReadAsync(Caller caller, string portfolio, CancellationToken cancellation) =>
        await schedules.FindAsync(caller, portfolio, cancellation) is { } schedule ? await OfAsync(caller, schedule, cancellation) : null;

    /// <summary>The standing of a schedule that perhaps is only being set.</summary>
    public async Task<ScheduleStandingJson> OfAsync(Caller caller, StoredSchedule schedule, CancellationToken cancellation)
    {
        var due = await runs.ListDueAsync(caller, schedule.Portfolio, Shown, cancellation);
        var times = new DueTimes(DueTimes.Parse(schedule.Cron)!, await dates.ZoneAsync(schedule.Portfolio, cancellation));
        return new ScheduleStandingJson
        {
            Cron = schedule.Cron,
            Iterations = schedule.Iterations,
            Enabled = schedule.Enabled,
            Status = new ScheduleStatusJson
            {
                NextDue = schedule.Enabled ? times.Next(clock.GetUtcNow(), due.Count > 0 ? due[0].DueDate : null) : null,
                LastRuns = [.. Missed(schedule, times, due).Concat(due.Select(Made)).OrderByDescending(run => run.AsOf).Take(Shown)],
            },
        };
    }

    // Only dates since the schedule was last set: before that it may have been another.
    private IEnumerable<DueRunJson> Missed(StoredSchedule schedule, DueTimes times, IReadOnlyList<StoredRun> due)
    {
        if (!schedule.Enabled)
            return [];
        var made = due.Select(run => run.DueDate).ToHashSet();
        return times.Between(schedule.ChangedAt, clock.GetUtcNow()).Take(Shown)
            .Where(missing => !made.Contains(missing.Date))
            .Select(missing => new DueRunJson { AsOf = missing.Date, State = "missed" });
    }

    private static DueRunJson Made(StoredRun run) =>
        new() { AsOf = run.AsOf, State = RunWords.State(run.State), Run = run.Id, FinishedAt = run.FinishedAt };
}
