using Portfolio.Model.Distributions;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules.OfDistributions;

/// <summary>
/// One distribution, for the quantity it stands for. Whether the ends meant by stated percentiles exist is a numerical question and the
/// engine's.
/// </summary>
internal static class DistributionRule
{
    private static readonly Flaw[] None = Flaw.None;

    /// <summary>All flaws; none of a sound distribution, of a missing one and of an unreadable one.</summary>
    public static IReadOnlyList<Flaw> Flaws(Distribution? distribution, Quantity quantity, ModelLimits limits)
    {
        if (distribution is null or Unreadable) return None;
        if (NotFinite(distribution) is { } notFinite) return notFinite;
        var (shape, extent) = (OfShape(distribution, limits), OfExtent(distribution, quantity));
        // A large document has hundreds of thousands of sound ones, and they cost nothing.
        return shape == None && extent == None ? None : [.. shape, .. extent];
    }

    private static IEnumerable<Flaw> OfShape(Distribution distribution, ModelLimits limits) => distribution switch
    {
        Uniform u => ThreePointRule.Check(u),
        Triangular t => ThreePointRule.Check(t),
        Pert p => ThreePointRule.Check(p),
        Normal n => SpreadRule.Check(n),
        LognormalByMoments m => SpreadRule.Check(m),
        LognormalByPercentiles p => SpreadRule.Check(p),
        Discrete d => TableRule.Check(d, limits),
        Percentiles p => TableRule.Check(p, limits),
        _ => None,
    };

    private static IEnumerable<Flaw> OfExtent(Distribution distribution, Quantity quantity)
    {
        var (low, high) = Extent(distribution);
        var sound = (low >= 0 || quantity.NegativeAllowed) && Math.Max(high, -low) <= quantity.Bound;
        return sound ? None : TooFar(low, high, distribution, quantity);
    }

    private static IEnumerable<Flaw> TooFar(double low, double high, Distribution distribution, Quantity quantity)
    {
        if (low < 0 && !quantity.NegativeAllowed)
            yield return new("", RuleCodes.DistributionNegative, distribution is Normal
                ? $"This {quantity.Name} lies around {low}; a {quantity.Name} cannot be negative."
                : $"This {quantity.Name} can be {low}; a {quantity.Name} cannot be negative.");
        if (Math.Max(high, -low) is var largest && largest > quantity.Bound)
            yield return new("", RuleCodes.DistributionRange,
                $"This {quantity.Name} can be {largest}; more than {quantity.Bound:0} {quantity.Unit} are taken for a slip.");
    }

    /// <summary>
    /// Least and greatest value that is stated. A normal may reach below zero (such draws count as 0), so of it the middle counts:
    /// the mean, or the nearer bound when the mean has been cut off.
    /// </summary>
    private static (double Low, double High) Extent(Distribution distribution) => distribution switch
    {
        Constant c => (c.Value, c.Value),
        Uniform u => (u.Low, u.High),
        Triangular t => (t.Low, t.High),
        Pert p => (p.Low, p.High),
        Normal n => (Math.Min(Math.Max(n.Mean, n.Min ?? n.Mean), n.Max ?? double.MaxValue), Math.Max(n.Mean, n.Sd)),
        LognormalByMoments m => (0, Math.Max(m.Mean, m.Sd)),
        LognormalByPercentiles p => (0, p.High),
        Discrete { Outcomes.Count: > 0 } d => (d.Outcomes.Min(o => o.Value), d.Outcomes.Max(o => o.Value)),
        Percentiles { Points.Count: > 0 } p => (p.Points.Min(o => o.Value), p.Points.Max(o => o.Value)),
        _ => (0, 0),
    };

    private static List<Flaw>? NotFinite(Distribution distribution)
    {
        List<Flaw>? flaws = null;
        switch (distribution)
        {
            case Constant c: Look(c.Value, ""); break;
            case Uniform u: Look(u.Low, "low"); Look(u.High, "high"); break;
            case Triangular t: LookAtThree(t.Low, t.Mode, t.High, t.LowPercentile, t.HighPercentile); break;
            case Pert p: LookAtThree(p.Low, p.Mode, p.High, p.LowPercentile, p.HighPercentile); Look(p.Weight, "weight"); break;
            case Normal n: Look(n.Mean, "mean"); Look(n.Sd, "sd"); Look(n.Min ?? 0, "min"); Look(n.Max ?? 0, "max"); break;
            case LognormalByMoments m: Look(m.Mean, "mean"); Look(m.Sd, "sd"); break;
            case LognormalByPercentiles p: LookAtThree(p.Low, 0, p.High, p.LowPercentile, p.HighPercentile); break;
            case Discrete d: LookAtPairs(d.Outcomes.Select(o => (o.Value, o.Probability)), "outcomes", "probability"); break;
            case Percentiles p: LookAtPairs(p.Points.Select(o => (o.Value, o.P)), "points", "p"); break;
        }

        return flaws;

        void Look(double value, string member)
        {
            if (double.IsFinite(value)) return;
            (flaws ??= []).Add(new(member, FaultCodes.NumberNotFinite, "The number is not finite: it is too large to be read."));
        }

        void LookAtThree(double low, double mode, double high, double lowPercentile, double highPercentile)
        {
            Look(low, "low");
            Look(mode, "mode");
            Look(high, "high");
            Look(lowPercentile, "lowPercentile");
            Look(highPercentile, "highPercentile");
        }

        void LookAtPairs(IEnumerable<(double Value, double Chance)> pairs, string list, string chance)
        {
            foreach (var (i, pair) in pairs.Index())
            {
                if (!double.IsFinite(pair.Value)) Look(pair.Value, $"{list}/{i}/value");
                if (!double.IsFinite(pair.Chance)) Look(pair.Chance, $"{list}/{i}/{chance}");
            }
        }
    }
}
