namespace Portfolio.Engine.Results;

/// <summary>What a grid measures, and so what its numbers are.</summary>
public enum Metric
{
    /// <summary>Minutes since 1970; base and commitment are days.</summary>
    Finish = 1,

    /// <summary>Whole minor units of the portfolio's currency.</summary>
    Cost = 2,
}

/// <summary>The value at a level with its 95 % sampling bounds; a bound that does not exist is null.</summary>
public readonly record struct Percentile(Level Level, long Value, long? SamplingLow, long? SamplingHigh);

/// <summary>A value to compare the iterations with, and in how many of them it is kept.</summary>
/// <param name="Value">A day for a finish, minor units for a cost.</param>
/// <param name="Kept">Iterations with a date no later, or a cost no greater.</param>
public readonly record struct Reference(long Value, int Kept);

/// <summary>
/// All that is kept for ever of one scope and metric of a run: percentiles, mean, spread, base and commitment. Immutable.
/// Made by <see cref="Grids"/>; as bytes by <see cref="GridBytes"/>.
/// </summary>
public sealed class Grid
{
    private readonly Percentile[] percentiles;

    internal Grid(Percentile[] percentiles) => this.percentiles = percentiles;

    public required Metric Metric { get; init; }

    /// <summary>How its instants become dates; the default for costs.</summary>
    public DateRule Dates { get; init; }

    /// <summary>Iterations of the run, at least 1.</summary>
    public required int Iterations { get; init; }

    /// <summary>Iterations in which it happens; all statistics are over these, and there are none when it is 0.</summary>
    public required int Happening { get; init; }

    /// <summary>Minutes, or whole minor units; 0 when nothing happens.</summary>
    public required double Mean { get; init; }

    /// <summary>Minutes, or minor units; 0 when nothing happens.</summary>
    public required double Sd { get; init; }

    /// <summary>Null when it does not happen in the base plan.</summary>
    public Reference? Base { get; init; }

    /// <summary>Null when nothing was promised.</summary>
    public Reference? Commitment { get; init; }

    /// <summary>By rising level; empty when nothing happens.</summary>
    public IReadOnlyList<Percentile> Percentiles => percentiles;

    /// <summary>Share of the iterations in which it happens, 0–1.</summary>
    public double Happens => (double)Happening / Iterations;

    /// <summary>The value at a level; null when the grid does not hold the level.</summary>
    public Percentile? At(Level level)
    {
        var (low, high) = (0, percentiles.Length - 1);
        while (low <= high)
        {
            var middle = (low + high) >>> 1;
            var order = percentiles[middle].Level.CompareTo(level);
            if (order == 0) return percentiles[middle];
            if (order < 0) low = middle + 1;
            else high = middle - 1;
        }
        return null;
    }

    /// <summary>True when every one of the levels can be read here, or there is nothing to read because nothing happens.</summary>
    public bool Covers(IEnumerable<Level> levels) => Happening == 0 || levels.All(level => At(level) is not null);

    /// <summary>Probability that a reference is kept, 0–1, over the iterations in which it happens; null when there is none.</summary>
    public double? Probability(Reference? reference) => reference is { } known && Happening > 0 ? (double)known.Kept / Happening : null;
}
