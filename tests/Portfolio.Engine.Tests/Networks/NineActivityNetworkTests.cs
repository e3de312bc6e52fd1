using Portfolio.Model.Distributions;
using Portfolio.Model.Documents;
using Xunit;
using static Portfolio.Engine.Tests.TestPlan;

namespace Portfolio.Engine.Tests.Networks;

/// <summary>
/// Nine activities with three-point estimates, merging thrice (network of Hendrickson and Au, Project Management for Construction, 1989,
/// chapter 10). Independent cases: numerical convolution on a grid of 0.01 days; correlated case: a simulation of 10⁸ iterations.
/// </summary>
public sealed class NineActivityNetworkTests
{
    private const int Iterations = 200_000;

    private static readonly (string Id, double Low, double Mode, double High, string[] After)[] Nine =
    [
        ("A", 3, 4, 5, []), ("B", 2, 3, 6, []), ("C", 6, 8, 10, ["A"]), ("D", 5, 7, 8, ["A"]), ("E", 6, 9, 14, ["B", "C"]),
        ("F", 10, 12, 14, ["B", "C"]), ("G", 2, 2, 4, ["D", "E"]), ("H", 4, 5, 8, ["D", "E"]), ("I", 4, 6, 8, ["F", "G"]),
    ];

    [Fact]
    public void BaseDatesAreThoseOfTheModes()
    {
        (double, double)[] expected = [(0, 4), (0, 3), (4, 12), (4, 11), (12, 21), (12, 24), (21, 23), (21, 26), (24, 30)];
        Assert.Equal(expected, Compile(Settings(), Network((l, m, h) => new Triangular(l, m, h))).BaseDates());
    }

    [Fact]
    public void IndependentTriangularsMergeAsByConvolution()
    {
        var finishes = Compile(Settings(), Network((l, m, h) => new Triangular(l, m, h))).Finishes(Iterations);
        Check(finishes, 30.9456, 1.73409, [28.7721, 30.8709, 32.3860, 33.2295], 0.30307, 0.73695);
    }

    [Fact]
    public void IndependentBetasMergeAsByConvolution()
    {
        var finishes = Compile(Settings(), Network((l, m, h) => new Pert(l, m, h))).Finishes(Iterations);
        Check(finishes, 30.5402, 1.47932, [28.6564, 30.5103, 31.7801, 32.4581], 0.36501, 0.83770);
    }

    [Fact]
    public void CorrelatedTriangularsSpreadWider()
    {
        // Normal-score correlation 0.3: rank correlation 6/π · asin(0.3 / 2).
        var project = Network((l, m, h) => new Triangular(l, m, h)) with { Correlation = 6 / Math.PI * Math.Asin(0.15) };
        Check(Compile(Settings(), project).Finishes(Iterations), 30.8811, 2.4854, [27.7525, 30.7496, 32.9812, 34.2146], 0.3813, 0.6848);
    }

    private static void Check(double[] finishes, double mean, double sd, double[] percentiles, double by30, double by32)
    {
        Simulated.Mean(mean, sd, finishes);
        Simulated.Sd(sd, finishes);
        foreach (var (level, expected) in new[] { 10, 50, 80, 90 }.Zip(percentiles))
            Simulated.Percentile(level, expected, finishes);
        Simulated.Share(by30, finishes.Count(f => f <= 30) / (double)finishes.Length, finishes.Length);
        Simulated.Share(by32, finishes.Count(f => f <= 32) / (double)finishes.Length, finishes.Length);
    }

    private static Project Network(Func<double, double, double, Distribution> estimate) =>
        Project([.. Nine.Select(a => Work(a.Id, estimate(a.Low, a.Mode, a.High), [.. a.After.Select(p => After(p))]))]);
}
