using Portfolio.Model.Distributions;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Tests.Rules.Tables;

internal static class DistributionTable
{
    private const double Infinite = double.PositiveInfinity;

    public static IEnumerable<RuleCase> Cases => [.. ThreePoints, .. Spreads, .. Lists];

    private static IEnumerable<RuleCase> ThreePoints =>
    [
        Case(RuleCodes.DistributionNegative, "", new Constant(-1), new Constant(0)),
        Case(RuleCodes.DistributionRange, "", new Constant(100_001), new Constant(100_000)),
        Case(FaultCodes.NumberNotFinite, "", new Constant(Infinite)),
        Case(RuleCodes.DistributionOrder, "", new Uniform(3, 2), new Uniform(3, 3)),
        Case(RuleCodes.DistributionNegative, "", new Uniform(-1, 2), new Uniform(0, 2)),
        Case(FaultCodes.NumberNotFinite, "/high", new Uniform(1, Infinite)),
        Case(RuleCodes.DistributionOrder, "", new Triangular(3, 2, 5), new Triangular(2, 2, 5)),
        Case(RuleCodes.DistributionOrder, "", new Triangular(3, 6, 5), new Triangular(5, 5, 5)),
        Case(RuleCodes.DistributionPercentile, "", new Triangular(1, 2, 3, 90, 10), new Triangular(1, 2, 3, 10, 90)),
        Case(RuleCodes.DistributionPercentile, "", new Triangular(1, 2, 3, -1, 90), new Triangular(1, 2, 3, 0, 90)),
        Case(FaultCodes.NumberNotFinite, "/mode", new Triangular(1, Infinite, 3)),
        Case(RuleCodes.DistributionNegative, "", new Pert(-1, 2, 3), new Pert(0, 0, 0)),
        Case(RuleCodes.DistributionOrder, "", new Pert(1, 4, 3)),
        Case(RuleCodes.DistributionWeight, "/weight", new Pert(1, 2, 3, -1), new Pert(1, 2, 3, 0)),
        Case(RuleCodes.DistributionWeight, "/weight", new Pert(1, 2, 3, 10_001), new Pert(1, 2, 3, 10_000)),
        Case(RuleCodes.DistributionPercentile, "", new Pert(1, 2, 3, 4, 10, 101), new Pert(1, 2, 3, 4, 10, 100)),
        Case(FaultCodes.NumberNotFinite, "/weight", new Pert(1, 2, 3, Infinite)),
    ];

    private static IEnumerable<RuleCase> Spreads =>
    [
        Case(RuleCodes.DistributionSpread, "/sd", new Normal(5, -1), new Normal(5, 0)),
        Case(RuleCodes.DistributionNegative, "", new Normal(-1, 5), new Normal(-1, 5, 0)),
        Case(RuleCodes.DistributionNegative, "", new Normal(1, 5, null, -1), new Normal(1, 5, -3)),
        Case(RuleCodes.DistributionTruncation, "", new Normal(5, 1, 6, 6), new Normal(5, 1, 5.9, 6)),
        Case(RuleCodes.DistributionTruncation, "", new Normal(5, 1, 13.1), new Normal(5, 1, 12.9)),
        Case(RuleCodes.DistributionTruncation, "", new Normal(20, 1, null, 11.9), new Normal(20, 1, null, 12.1)),
        Case(RuleCodes.DistributionTruncation, "", new Normal(5, 0, 6, 7), new Normal(5, 0, 5, 7)),
        Case(FaultCodes.NumberNotFinite, "/min", new Normal(5, 1, double.NegativeInfinity)),
        Case(RuleCodes.DistributionPositive, "/mean", new LognormalByMoments(0, 1), new LognormalByMoments(0.001, 1)),
        Case(RuleCodes.DistributionSpread, "/sd", new LognormalByMoments(5, -1), new LognormalByMoments(5, 0)),
        Case(FaultCodes.NumberNotFinite, "/sd", new LognormalByMoments(5, Infinite)),
        Case(RuleCodes.DistributionPositive, "/low", new LognormalByPercentiles(0, 5, 10, 90), new LognormalByPercentiles(1, 5, 10, 90)),
        Case(RuleCodes.DistributionOrder, "", new LognormalByPercentiles(5, 5, 10, 90), new LognormalByPercentiles(4.9, 5, 10, 90)),
        Case(RuleCodes.DistributionPercentile, "", new LognormalByPercentiles(1, 5, 0, 90), new LognormalByPercentiles(1, 5, 0.1, 90)),
        Case(RuleCodes.DistributionPercentile, "", new LognormalByPercentiles(1, 5, 10, 100), new LognormalByPercentiles(1, 5, 10, 99.9)),
        Case(RuleCodes.DistributionPercentile, "", new LognormalByPercentiles(1, 5, 50, 50)),
    ];

    private static IEnumerable<RuleCase> Lists =>
    [
        Case(RuleCodes.DistributionPoints, "/outcomes", new Discrete([]), new Discrete([new(3, 1)])),
        Case(RuleCodes.LimitExceeded, "/outcomes", new Discrete(Outcomes(1_001)), new Discrete(Outcomes(1_000))),
        Case(RuleCodes.ProbabilityRange, "/outcomes/1/probability", new Discrete([new(3, 1), new(4, -0.1)]), new Discrete([new(3, 1), new(4, 0)])),
        Case(RuleCodes.ProbabilitySum, "/outcomes", new Discrete([new(3, 0.5), new(4, 0.49)]), new Discrete([new(3, 0.1), new(4, 0.2), new(5, 0.7)])),
        Case(RuleCodes.ProbabilitySum, "/outcomes", new Discrete([new(3, 0.5), new(4, 0.5 + 2e-9)]), new Discrete([new(3, 0.5), new(4, 0.5 + 9e-10)])),
        Case(RuleCodes.DistributionNegative, "", new Discrete([new(-3, 0.5), new(4, 0.5)])),
        Case(FaultCodes.NumberNotFinite, "/outcomes/0/value", new Discrete([new(Infinite, 1)])),
        Case(RuleCodes.DistributionPoints, "/points", new Percentiles([new(0, 1)]), Curve((0, 1), (100, 1))),
        Case(RuleCodes.DistributionPoints, "/points/0/p", Curve((1, 1), (100, 2)), Curve((0, 1), (100, 2))),
        Case(RuleCodes.DistributionPoints, "/points/1/p", Curve((0, 1), (99, 2)), Curve((0, 1), (99, 2), (100, 2))),
        Case(RuleCodes.DistributionPoints, "/points/2/p", Curve((0, 1), (50, 2), (50, 3), (100, 4)), Curve((0, 1), (50, 2), (51, 3), (100, 4))),
        Case(RuleCodes.DistributionOrder, "/points/1/value", Curve((0, 2), (100, 1)), Curve((0, 2), (100, 2))),
        Case(RuleCodes.DistributionNegative, "", Curve((0, -2), (100, 1)), Curve((0, 0), (100, 1))),
        Case(RuleCodes.LimitExceeded, "/points", new Percentiles(Points(1_001)), new Percentiles(Points(1_000))),
        Case(FaultCodes.NumberNotFinite, "/points/1/p", Curve((0, 1), (Infinite, 2))),
    ];

    private static Percentiles Curve(params (double P, double Value)[] points) => new([.. points.Select(p =>
        new PercentilePoint(p.P, p.Value))]);

    private static Outcome[] Outcomes(int count) => [.. Enumerable.Range(0, count).Select(i => new Outcome(i, 1.0 / count))];

    private static PercentilePoint[] Points(int count) => [.. Enumerable.Range(0, count).Select(i =>
        new PercentilePoint(100.0 * i / (count - 1), i))];

    private static RuleCase Case(string code, string member, Distribution broken, Distribution? sound = null) =>
        new(code, "/projects/0/activities/1/duration" + member, "weir-lock/A20", Sound.WithDuration(broken), Sound.WithDuration(sound ?? new Constant(1)));
}
