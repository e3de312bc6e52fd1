using Portfolio.Model.Documents;
using Portfolio.Model.Faults;
using Portfolio.Server.Contracts.Json;
using Portfolio.Server.Contracts.Runs;
using Portfolio.Server.Http;
using Portfolio.Server.Telemetry;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Runs;

/// <summary>
/// What a run is asked for with, settled against the settings: what was left out is filled in, what cannot be is refused.
/// </summary>
/// <param name="settings">Those of the revision that is run.</param>
/// <param name="zone">The portfolio's zone of local dates, today.</param>
/// <param name="mostIterations">The largest number of iterations that is taken.</param>
internal sealed class RunOrder(Settings settings, TimeZoneInfo zone, DateTimeOffset now, int mostIterations)
{
    public const int FewestIterations = 10;
    private const long LargestSeed = (1L << 53) - 1;

    private static readonly Place Body = new("", "run");

    private readonly Reading reading = new();

    public IReadOnlyList<Fault> Faults => reading.Faults;

    /// <summary>The run; of use only when there are no <see cref="Faults"/>.</summary>
    public NewRun Of(string portfolio, long revision, RunRequestJson asked)
    {
        var iterations = (int)InRange("iterations", asked.Iterations, FewestIterations, mostIterations, settings.Iterations);
        var seed = InRange("seed", asked.Seed, 0, LargestSeed, settings.Seed);
        var asOf = AsOf(asked.AsOf);
        return new NewRun
        {
            Portfolio = portfolio,
            AsOf = asOf,
            DateEndsAt = LocalDates.StartOf(asOf.AddDays(1), zone),
            Revision = revision,
            Seed = seed,
            Iterations = iterations,
            Recorded = Recorded(asked, seed, iterations),
            Replaces = asked.Replaces,
            TraceParent = ServerTelemetry.TraceParent,
        };
    }

    private DateOnly AsOf(string? asked)
    {
        var today = LocalDates.Of(now, zone);
        if (reading.Date(Body, "asOf", asked) is not { } date || date == DateOnly.MinValue)
            return today;
        if (date > today)
            reading.Refuse(Body, "asOf", RunFaultCodes.DateInFuture, $"'asOf' is in the future: today is {today:yyyy-MM-dd} in {zone.Id}.");
        else if (date < EarliestDate)
            reading.Refuse(Body, "asOf", RunFaultCodes.OutOfRange, $"'asOf' lies before {EarliestDate:yyyy-MM-dd}.");
        else
            return date;
        return today;
    }

    private static readonly DateOnly EarliestDate = new(1970, 1, 1);

    // A series is one comparison: points drawn with another seed would move by chance.
    private bool Recorded(RunRequestJson asked, long seed, int iterations)
    {
        if (asked.Recorded == true && seed != settings.Seed)
            reading.Refuse(Body, "recorded", RunFaultCodes.RecordedSeed, $"A recorded run has the seed of the settings, {settings.Seed}.");
        // No id holds it, and PostgreSQL does not even look for one that does.
        if (asked.Replaces?.Contains('\0', StringComparison.Ordinal) == true)
            reading.Refuse(Body, "replaces", RunFaultCodes.ReplacesUnknown, "'replaces' must name a recorded run of the same date.");
        if (asked.Recorded == false && asked.Replaces is not null)
            reading.Refuse(Body, "replaces", RunFaultCodes.ReplacesUnrecorded, "Only a recorded run can replace another.");
        return asked.Recorded ?? (seed == settings.Seed && iterations == settings.Iterations);
    }

    private long InRange(string member, double? value, long least, long most, long otherwise)
    {
        // One beyond either end still shows that it is out of range.
        if (reading.Whole(Body, member, value, least - 1, most + 1) is not { } number)
            return otherwise;
        if (number < least || number > most)
            reading.Refuse(Body, member, RunFaultCodes.OutOfRange, $"'{member}' must be from {least} to {most}.");
        return number;
    }
}
