using Portfolio.Model.Distributions;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules.OfDistributions;

/// <summary>Discrete outcomes and cumulative curves. All numbers are finite here.</summary>
internal static class TableRule
{
    public static IEnumerable<Flaw> Check(Discrete d, ModelLimits limits)
    {
        var outcomes = d.Outcomes;
        if (Size(outcomes.Count, 1, limits, "outcomes") is { } size)
        {
            yield return size;
            yield break;
        }

        var sound = true;
        for (var i = 0; i < outcomes.Count; i++)
        {
            if (outcomes[i].Probability is >= 0 and <= 1) continue;
            sound = false;
            yield return new($"outcomes/{i}/probability", RuleCodes.ProbabilityRange,
                $"The probability of {outcomes[i].Value} is {outcomes[i].Probability}; it must lie between 0 and 1.");
        }

        var sum = outcomes.Sum(o => o.Probability);
        if (sound && Math.Abs(sum - 1) > Bounds.ProbabilityTolerance)
            yield return new("outcomes", RuleCodes.ProbabilitySum,
                $"The probabilities of the outcomes add up to {sum}; they must add up to 1.");
    }

    public static IEnumerable<Flaw> Check(Percentiles table, ModelLimits limits)
    {
        var points = table.Points;
        if (Size(points.Count, 2, limits, "points") is { } size)
        {
            yield return size;
            yield break;
        }

        if (points[0].P != 0)
            yield return new("points/0/p", RuleCodes.DistributionPoints,
                $"The first point stands at {points[0].P} %; it must stand at 0 %.");
        if (points[^1].P != 100)
            yield return new($"points/{points.Count - 1}/p", RuleCodes.DistributionPoints,
                $"The last point stands at {points[^1].P} %; it must stand at 100 %.");
        for (var i = 1; i < points.Count; i++)
        {
            if (points[i].P <= points[i - 1].P)
                yield return new($"points/{i}/p", RuleCodes.DistributionPoints,
                    $"The percentages must rise from point to point; {points[i].P} % follows {points[i - 1].P} %.");
            if (points[i].Value < points[i - 1].Value)
                yield return new($"points/{i}/value", RuleCodes.DistributionOrder,
                    $"The values must not fall from point to point; {points[i].Value} follows {points[i - 1].Value}.");
        }
    }

    private static Flaw? Size(int count, int least, ModelLimits limits, string list) =>
        count > limits.Points ? new Flaw(list, RuleCodes.LimitExceeded, $"There are {count} {list}; at most {limits.Points} are allowed.")
        : count < least ? new Flaw(list, RuleCodes.DistributionPoints, $"There are {count} {list}; at least {least} are needed.")
        : null;
}
