namespace Portfolio.Engine.Results;

/// <summary>The date at a level with its 95 % sampling bounds.</summary>
public readonly record struct DatePercentile(Level Level, DateOnly Value, DateOnly? SamplingLow, DateOnly? SamplingHigh);

/// <summary>
/// When a scope is done, in dates. Probabilities are over the iterations in which it happens; without one, all but those of the base and
/// the commitment's date are null or empty.
/// </summary>
public sealed record FinishSummary
{
    public DateOnly? Base { get; init; }

    /// <summary>Share of iterations no later than the base date, 0–1.</summary>
    public double? BaseProbability { get; init; }

    /// <summary>The date of the mean instant.</summary>
    public DateOnly? Mean { get; init; }

    /// <summary>Standard deviation in calendar days.</summary>
    public double? SdDays { get; init; }

    public IReadOnlyList<DatePercentile> Percentiles { get; init; } = [];

    public DateOnly? Commitment { get; init; }

    /// <summary>Share of iterations no later than the commitment, 0–1.</summary>
    public double? CommitmentProbability { get; init; }

    /// <summary>Share of iterations in which it happens, 0–1.</summary>
    public double Happens { get; init; }

    /// <summary>Reads a grid of finishes at levels that it covers.</summary>
    /// <exception cref="ArgumentException">The grid does not hold one of the levels.</exception>
    public static FinishSummary Of(Grid grid, IReadOnlyList<Level> levels)
    {
        var happens = grid.Happening > 0;
        return new()
        {
            Base = DateOf(grid.Base),
            BaseProbability = grid.Probability(grid.Base),
            Mean = happens ? grid.Dates.Date(grid.Mean) : null,
            SdDays = happens ? grid.Sd / Instants.MinutesPerDay : null,
            Percentiles = happens
                ? [.. levels.Select(level => At(grid, level) ?? throw new ArgumentException($"The grid does not hold level {level}."))]
                : [],
            Commitment = DateOf(grid.Commitment),
            CommitmentProbability = grid.Probability(grid.Commitment),
            Happens = grid.Happens,
        };
    }

    /// <summary>The date at a level; null when the grid does not hold it.</summary>
    public static DatePercentile? At(Grid grid, Level level) => grid.At(level) is { } at
        ? new(level, grid.Dates.Date(at.Value), DateOf(grid, at.SamplingLow), DateOf(grid, at.SamplingHigh))
        : null;

    private static DateOnly? DateOf(Grid grid, long? minutes) => minutes is { } known ? grid.Dates.Date(known) : null;

    private static DateOnly? DateOf(Reference? reference) => reference is { } known ? Instants.ToDate((int)known.Value) : null;
}
