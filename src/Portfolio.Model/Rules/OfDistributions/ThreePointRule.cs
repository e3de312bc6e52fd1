using Portfolio.Model.Distributions;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules.OfDistributions;

/// <summary>Uniform, triangular and PERT: order of the values, meaning of the ends, weight. All numbers are finite here.</summary>
internal static class ThreePointRule
{
    public static IEnumerable<Flaw> Check(Uniform u) => u.Low <= u.High
        ? Flaw.None
        : [new("", RuleCodes.DistributionOrder, $"The low value {u.Low} is above the high value {u.High}.")];

    public static IEnumerable<Flaw> Check(Triangular t) => Ends(t.Low, t.Mode, t.High, t.LowPercentile, t.HighPercentile);

    public static IEnumerable<Flaw> Check(Pert p)
    {
        var ends = Ends(p.Low, p.Mode, p.High, p.LowPercentile, p.HighPercentile);
        return p.Weight is >= 0 and <= Bounds.PertWeight ? ends : ends.Append(new("weight", RuleCodes.DistributionWeight,
            $"The weight is {p.Weight}; it must lie between 0 and {Bounds.PertWeight:0}."));
    }

    private static IEnumerable<Flaw> Ends(double low, double mode, double high, double lowPercentile, double highPercentile) =>
        low <= mode && mode <= high && lowPercentile >= 0 && highPercentile <= 100 && lowPercentile < highPercentile
            ? Flaw.None
            : WrongEnds(low, mode, high, lowPercentile, highPercentile);

    private static IEnumerable<Flaw> WrongEnds(double low, double mode, double high, double lowPercentile, double highPercentile)
    {
        if (!(low <= mode && mode <= high))
            yield return new("", RuleCodes.DistributionOrder,
                $"The values must rise: low {low}, most likely {mode}, high {high} do not.");
        // The ends stand for outer limits or for percentiles on either side of the mode; 0 % and 100 % at the wrong end mean nothing.
        if (!(lowPercentile >= 0 && highPercentile <= 100 && lowPercentile < highPercentile))
            yield return new("", RuleCodes.DistributionPercentile,
                $"The low value is stated at {lowPercentile} % and the high one at {highPercentile} %; the first must be below "
                + "the second, both within 0 to 100.");
    }
}
