using System.Diagnostics.Metrics;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Telemetry;

/// <summary>The instruments of the jobs (units in UCUM). Attributes are outcome and trigger alone. Thread safe.</summary>
public sealed class RunMeasures
{
    private readonly Histogram<double> duration;
    private readonly Counter<long> iterations;
    private readonly Histogram<double> rate;
    private readonly TimeProvider clock;
    private volatile Standing? standing;

    public RunMeasures(IMeterFactory meters, TimeProvider clock)
    {
        this.clock = clock;
        var meter = meters.Create(ServerTelemetry.Name);
        duration = meter.CreateHistogram<double>("run.duration", "s", "One attempt at a run, from claim to end.");
        iterations = meter.CreateCounter<long>("run.iterations", "{iteration}", "Iterations worked.");
        rate = meter.CreateHistogram<double>("run.rate", "{iteration}/s", "Iterations worked in a second of an attempt.");
        meter.CreateObservableGauge("run.age", Age, "s", "Time since the oldest last good nightly run of all enabled schedules.");
        meter.CreateObservableGauge("queue.length", Queue, "{run}", "Runs that wait.");
    }

    /// <summary>An attempt has ended.</summary>
    internal void Ended(StoredRun run, string outcome, TimeSpan took)
    {
        var trigger = run.Kind == RunKind.Nightly ? "schedule" : "request";
        KeyValuePair<string, object?>[] attributes = [new("outcome", outcome), new("trigger", trigger)];
        duration.Record(took.TotalSeconds, attributes);
        if (outcome != "succeeded")
            return;
        var worked = run.Iterations - run.IterationsDone;
        iterations.Add(worked, attributes);
        if (worked > 0 && took > TimeSpan.Zero)
            rate.Record(worked / took.TotalSeconds, attributes);
    }

    /// <summary>What a sweep has seen.</summary>
    /// <param name="queued">Runs that wait.</param>
    /// <param name="lastGood">When the one longest ago of the last good nightly runs ended; null when there is none.</param>
    internal void Swept(int queued, DateTimeOffset? lastGood) => standing = new Standing(queued, lastGood);

    private IEnumerable<Measurement<int>> Queue() => standing is { } seen ? [new(seen.Queued)] : [];

    private IEnumerable<Measurement<double>> Age() =>
        standing is { LastGood: { } ended } ? [new((clock.GetUtcNow() - ended).TotalSeconds)] : [];

    private sealed record Standing(int Queued, DateTimeOffset? LastGood);
}
