namespace Portfolio.Engine.Results;

/// <summary>Makes grids from the iterations of one scope. Pure; the order of the iterations does not matter.</summary>
public static class Grids
{
    /// <summary>The grid of a finish.</summary>
    /// <param name="finishes">Minutes, one for each iteration; <see cref="Instants.Never"/> where it does not happen.</param>
    /// <param name="levels">Rising levels with their ranks.</param>
    /// <param name="dates">How instants become dates.</param>
    /// <param name="baseFinish">Minutes in the base plan; <see cref="Instants.Never"/> when it does not happen there.</param>
    /// <param name="commitment">The promised date.</param>
    public static Grid OfFinish(ReadOnlySpan<int> finishes, RankTable levels, DateRule dates, int baseFinish, DateOnly? commitment)
    {
        using var sorted = SortedSamples.Of(finishes);
        var mean = sorted.Count > 0 ? (double)sorted.Sum() / sorted.Count : 0;
        return new Grid(Percentiles(sorted, levels))
        {
            Metric = Metric.Finish,
            Dates = dates,
            Iterations = finishes.Length,
            Happening = sorted.Count,
            Mean = mean,
            Sd = sorted.Count > 0 ? sorted.Sd(mean) : 0,
            Base = baseFinish == Instants.Never ? null : KeptDay(sorted, dates, dates.Day(baseFinish)),
            Commitment = commitment is { } date ? KeptDay(sorted, dates, Instants.ToDay(date)) : null,
        };
    }

    /// <summary>The grid of a cost.</summary>
    /// <param name="costs">Whole minor units, one for each iteration.</param>
    /// <param name="levels">Rising levels with their ranks.</param>
    /// <param name="baseCost">Minor units in the base plan.</param>
    /// <param name="commitment">The promised budget in minor units.</param>
    /// <param name="meanOfParts">
    /// Of a programme, tag or portfolio: the sum of its projects' rounded means, which is what it reports, so that means add up.
    /// Null for a project: its mean is rounded half away from zero.
    /// </param>
    public static Grid OfCost(ReadOnlySpan<double> costs, RankTable levels, long baseCost, long? commitment, long? meanOfParts = null)
    {
        using var sorted = SortedSamples.Of(costs);
        var sum = sorted.Sum();
        return new Grid(Percentiles(sorted, levels))
        {
            Metric = Metric.Cost,
            Iterations = costs.Length,
            Happening = costs.Length,
            Mean = meanOfParts ?? RoundedMean(sum, costs.Length),
            Sd = sorted.Sd((double)sum / costs.Length),
            Base = KeptCost(sorted, baseCost),
            Commitment = commitment is { } budget ? KeptCost(sorted, budget) : null,
        };
    }

    private static Percentile[] Percentiles(SortedSamples sorted, RankTable levels)
    {
        if (sorted.Count == 0) return [];
        var ranks = levels.For(sorted.Count);
        var percentiles = new Percentile[ranks.Count];
        for (var i = 0; i < percentiles.Length; i++)
        {
            var (level, rank, sampling) = ranks[i];
            percentiles[i] = new(level, sorted.Values[rank - 1], Value(sorted, sampling.Low), Value(sorted, sampling.High));
        }
        return percentiles;
    }

    private static long? Value(SortedSamples sorted, int? rank) => rank is { } known ? sorted.Values[known - 1] : null;

    private static Reference KeptDay(SortedSamples sorted, DateRule dates, int day) =>
        new(day, sorted.CountWhile(instant => dates.Day(instant) <= day));

    private static Reference KeptCost(SortedSamples sorted, long cost) => new(cost, sorted.CountWhile(value => value <= cost));

    private static long RoundedMean(Int128 sum, int n)
    {
        var twice = 2 * Int128.Abs(sum) + n; // half away from zero: ⌊|sum|/n + ½⌋ with the sign put back
        var rounded = (long)(twice / (2 * (Int128)n));
        return sum < 0 ? -rounded : rounded;
    }
}
