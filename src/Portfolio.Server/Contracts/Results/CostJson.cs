using Portfolio.Engine.Results;

namespace Portfolio.Server.Contracts.Results;

/// <summary>What a scope costs, in the portfolio's currency. Probabilities are 0–1.</summary>
public sealed record CostJson
{
    public required decimal Base { get; init; }

    public required double BaseProbability { get; init; }

    public required decimal Mean { get; init; }

    public required decimal Sd { get; init; }

    public required IReadOnlyList<MoneyPercentileJson> Percentiles { get; init; }

    public BudgetCommitmentJson? Commitment { get; init; }

    internal static CostJson From(CostSummary cost) => new()
    {
        Base = cost.Base,
        BaseProbability = cost.BaseProbability,
        Mean = cost.Mean,
        Sd = cost.Sd,
        Percentiles = [.. cost.Percentiles.Select(MoneyPercentileJson.From)],
        Commitment = cost.Commitment is { } budget ? new(budget, cost.CommitmentProbability ?? 0) : null,
    };
}

/// <summary>The amount at a confidence level (percent), with its 95 % sampling interval; a bound that does not exist is absent.</summary>
public sealed record MoneyPercentileJson(decimal P, decimal Value, decimal? SamplingLow = null, decimal? SamplingHigh = null)
{
    internal static MoneyPercentileJson From(MoneyPercentile at) => new(at.Level.Percent, at.Value, at.SamplingLow, at.SamplingHigh);
}

/// <summary>The promised budget and the probability, 0–1, of keeping it.</summary>
public sealed record BudgetCommitmentJson(decimal Budget, double Probability);
