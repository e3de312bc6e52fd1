using Portfolio.Model.Distributions;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules.OfDistributions;

/// <summary>Normal and lognormal. All numbers are finite here.</summary>
internal static class SpreadRule
{
    // Beyond eight standard deviations lies a probability of 6·10⁻¹⁶, less than the 2⁻⁵³ that separates two draws.
    private const double Reach = 8;

    public static IEnumerable<Flaw> Check(Normal n)
    {
        if (n.Sd < 0) yield return Spread(n.Sd);
        else if (n.Min >= n.Max)
            yield return new("", RuleCodes.DistributionTruncation,
                $"It is cut off below {n.Min} and above {n.Max}; the first must be the smaller.");
        else if (n.Min > n.Mean + (Reach * n.Sd) || n.Max < n.Mean - (Reach * n.Sd))
            yield return new("", RuleCodes.DistributionTruncation,
                $"Nothing is left of mean {n.Mean} and standard deviation {n.Sd} {Kept(n)}.");
    }

    public static IEnumerable<Flaw> Check(LognormalByMoments m)
    {
        if (m.Mean <= 0)
            yield return new("mean", RuleCodes.DistributionPositive, $"The mean of a lognormal must be above 0; it is {m.Mean}.");
        if (m.Sd < 0) yield return Spread(m.Sd);
    }

    public static IEnumerable<Flaw> Check(LognormalByPercentiles p)
    {
        if (p.Low <= 0)
            yield return new("low", RuleCodes.DistributionPositive, $"The low value of a lognormal must be above 0; it is {p.Low}.");
        if (p.Low >= p.High)
            yield return new("", RuleCodes.DistributionOrder, $"The low value {p.Low} must be below the high value {p.High}.");
        if (!(p.LowPercentile > 0 && p.LowPercentile < p.HighPercentile && p.HighPercentile < 100))
            yield return new("", RuleCodes.DistributionPercentile,
                $"The low value is stated at {p.LowPercentile} % and the high one at {p.HighPercentile} %; the first must be "
                + "below the second, both above 0 and below 100.");
    }

    private static Flaw Spread(double sd) => new("sd", RuleCodes.DistributionSpread,
        $"The standard deviation is {sd}; it cannot be negative.");

    private static string Kept(Normal n) => (n.Min, n.Max) switch
    {
        ({ } min, { } max) => $"between {min} and {max}",
        ({ } min, null) => $"above {min}",
        _ => $"below {n.Max}",
    };
}
