using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Json;
using Portfolio.Server.Http;
using Portfolio.Server.Schedules;
using Portfolio.Server.Telemetry;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;
using Portfolio.Store.Runs;
using Portfolio.Store.Schedules;

namespace Portfolio.Server.Jobs;

/// <summary>
/// Makes the runs that have become due: for each enabled schedule the one of its latest due date, if there is none yet. Earlier dates that
/// were missed stay missing. Safe to run at any time and by several at once: the store keeps one run per due date.
/// </summary>
public sealed class Nightly(
    ScheduleStore schedules, DocumentStore documents, RunStore runs, RunRequests requests, TimeProvider clock, ILogger<Nightly> log)
{
    /// <summary>Looks at every schedule; one that fails does not keep the others waiting.</summary>
    public async Task MakeDueAsync(CancellationToken cancellation)
    {
        foreach (var schedule in await schedules.ListEnabledAsync(Caller.System, cancellation))
        {
            try
            {
                await MakeDueAsync(schedule, cancellation);
            }
            catch (Exception failure) when (!cancellation.IsCancellationRequested)
            {
                RunLog.DueFailed(log, schedule.Portfolio, failure);
            }
        }
    }

    private async Task MakeDueAsync(StoredSchedule schedule, CancellationToken cancellation)
    {
        var settings = await SettingsAsync(schedule.Portfolio, null, cancellation);
        var zone = TimeZoneInfo.FindSystemTimeZoneById(settings.TimeZone);
        var cron = DueTimes.Parse(schedule.Cron) ?? throw new InvalidOperationException($"The schedule '{schedule.Cron}' cannot be read.");
        var times = new DueTimes(cron, zone);
        var made = await runs.ListDueAsync(Caller.System, schedule.Portfolio, 1, cancellation);
        if (times.Latest(schedule.ChangedAt, clock.GetUtcNow(), made.Count > 0 ? made[0].DueDate : null) is not { } due)
            return;
        using var span = ServerTelemetry.Spans.StartActivity("schedule.due");
        var revision = await documents.FindRevisionAtAsync(Caller.System, schedule.Portfolio, due.At, cancellation)
            ?? throw new InvalidOperationException("The portfolio had no revision when it became due.");
        var result = await requests.CreateDueAsync(
            Caller.System, await RunOfAsync(schedule, due.Date, revision.Number, zone, cancellation), due.Date, cancellation);
        if (result is { Outcome: RunRequestOutcome.Created, Run: { } queued })
            RunLog.Due(log, schedule.Portfolio, queued.Id, due.Date);
    }

    private async Task<NewRun> RunOfAsync(
        StoredSchedule schedule, DateOnly date, long revision, TimeZoneInfo zone, CancellationToken cancellation)
    {
        var settings = await SettingsAsync(schedule.Portfolio, revision, cancellation);
        return new NewRun
        {
            Portfolio = schedule.Portfolio,
            AsOf = date,
            DateEndsAt = LocalDates.StartOf(date.AddDays(1), zone),
            Revision = revision,
            Seed = settings.Seed,
            Iterations = schedule.Iterations ?? settings.Iterations,
            // The schedule is what the series is made by, with as many iterations as it says.
            Recorded = true,
            TraceParent = ServerTelemetry.TraceParent,
        };
    }

    private async Task<Settings> SettingsAsync(string portfolio, long? revision, CancellationToken cancellation)
    {
        var part = await documents.ReadPartAsync(Caller.System, portfolio, PartNames.Settings, revision, cancellation)
            ?? throw new InvalidOperationException($"Portfolio '{portfolio}' has no settings.");
        return DocumentReader.OfStored.ReadSettings(part.Bytes).ToModel(new Reading(), "/settings");
    }
}
