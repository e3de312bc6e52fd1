using Portfolio.Model.Faults;
using Portfolio.Server.Contracts.Json;
using Portfolio.Server.Contracts.Schedules;
using Portfolio.Server.Runs;

namespace Portfolio.Server.Schedules;

/// <summary>A schedule that was sent, read and checked.</summary>
/// <param name="Faults">What is wrong with it; the rest is of use only when there are none.</param>
internal sealed record ScheduleRequest(string Cron, int? Iterations, bool Enabled, IReadOnlyList<Fault> Faults)
{
    private static readonly Place Body = new("", "schedule");

    public static ScheduleRequest Of(ScheduleJson sent, int mostIterations)
    {
        var reading = new Reading();
        var cron = reading.Required(Body, "cron", sent.Cron);
        if (sent.Cron is not null && DueTimes.Parse(cron) is null)
        {
            reading.Refuse(
                Body, "cron", RunFaultCodes.CronFormat,
                "'cron' must be five fields (minute, hour, day of month, month, weekday) and name a time that comes: 30 2 * * *.");
        }
        var iterations = (int?)reading.Whole(Body, "iterations", sent.Iterations, RunOrder.FewestIterations - 1, mostIterations + 1L);
        if (iterations < RunOrder.FewestIterations || iterations > mostIterations)
        {
            reading.Refuse(
                Body, "iterations", RunFaultCodes.OutOfRange,
                $"'iterations' must be from {RunOrder.FewestIterations} to {mostIterations}.");
        }
        return new ScheduleRequest(cron, iterations, sent.Enabled ?? true, reading.Faults);
    }
}
