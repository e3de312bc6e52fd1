using Portfolio.Engine.Results;

namespace Portfolio.Server.Contracts.Results;

/// <summary>When a scope is done. Probabilities are 0–1, <c>sdDays</c> calendar days.</summary>
public sealed record FinishJson
{
    /// <summary>Absent when it does not happen in the base plan.</summary>
    public DateOnly? Base { get; init; }

    public double? BaseProbability { get; init; }

    public DateOnly? Mean { get; init; }

    public double? SdDays { get; init; }

    public required IReadOnlyList<DatePercentileJson> Percentiles { get; init; }

    public DateCommitmentJson? Commitment { get; init; }

    internal static FinishJson From(FinishSummary finish) => new()
    {
        Base = finish.Base,
        BaseProbability = finish.BaseProbability,
        Mean = finish.Mean,
        SdDays = finish.SdDays is { } days ? Math.Round(days, 3) : null,
        Percentiles = [.. finish.Percentiles.Select(DatePercentileJson.From)],
        Commitment = finish.Commitment is { } date ? new(date, finish.CommitmentProbability) : null,
    };
}

/// <summary>The date of a confidence level (percent), with its 95 % sampling interval; a bound that does not exist is absent.</summary>
public sealed record DatePercentileJson(decimal P, DateOnly Value, DateOnly? SamplingLow = null, DateOnly? SamplingHigh = null)
{
    internal static DatePercentileJson From(DatePercentile at) => new(at.Level.Percent, at.Value, at.SamplingLow, at.SamplingHigh);
}

/// <summary>The promised date and the probability, 0–1, of being done by it.</summary>
public sealed record DateCommitmentJson(DateOnly Date, double? Probability = null);
