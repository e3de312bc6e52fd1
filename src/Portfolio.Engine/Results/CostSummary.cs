namespace Portfolio.Engine.Results;

/// <summary>The amount at a level with its 95 % sampling bounds.</summary>
public readonly record struct MoneyPercentile(Level Level, decimal Value, decimal? SamplingLow, decimal? SamplingHigh);

/// <summary>What a scope costs, in units of the portfolio's currency with at most the digits of its minor unit.</summary>
public sealed record CostSummary
{
    public required decimal Base { get; init; }

    /// <summary>Share of iterations that cost no more than the base, 0–1.</summary>
    public required double BaseProbability { get; init; }

    public required decimal Mean { get; init; }

    public required decimal Sd { get; init; }

    public required IReadOnlyList<MoneyPercentile> Percentiles { get; init; }

    /// <summary>The promised budget.</summary>
    public decimal? Commitment { get; init; }

    /// <summary>Share of iterations that cost no more than the budget, 0–1.</summary>
    public double? CommitmentProbability { get; init; }

    /// <summary>Reads a grid of costs at levels that it covers.</summary>
    /// <param name="grid">A grid of costs.</param>
    /// <param name="levels">Levels to report, in their order.</param>
    /// <param name="digits">Digits of the currency's minor unit, 0–4.</param>
    /// <exception cref="ArgumentException">The grid does not hold one of the levels.</exception>
    public static CostSummary Of(Grid grid, IReadOnlyList<Level> levels, int digits) => new()
    {
        Base = MinorUnits.ToMoney(grid.Base!.Value.Value, digits),
        BaseProbability = grid.Probability(grid.Base)!.Value,
        Mean = MinorUnits.ToMoney((long)grid.Mean, digits),
        Sd = MinorUnits.ToMoney((long)Math.Round(grid.Sd, MidpointRounding.AwayFromZero), digits),
        Percentiles =
            [.. levels.Select(level => At(grid, level, digits) ?? throw new ArgumentException($"The grid does not hold level {level}."))],
        Commitment = grid.Commitment is { } commitment ? MinorUnits.ToMoney(commitment.Value, digits) : null,
        CommitmentProbability = grid.Probability(grid.Commitment),
    };

    /// <summary>The amount at a level; null when the grid does not hold it.</summary>
    public static MoneyPercentile? At(Grid grid, Level level, int digits) => grid.At(level) is { } at
        ? new(level, MinorUnits.ToMoney(at.Value, digits), ToMoney(at.SamplingLow, digits), ToMoney(at.SamplingHigh, digits))
        : null;

    private static decimal? ToMoney(long? minor, int digits) => minor is { } known ? MinorUnits.ToMoney(known, digits) : null;
}
