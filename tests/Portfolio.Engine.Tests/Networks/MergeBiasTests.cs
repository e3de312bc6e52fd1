using Portfolio.Model.Distributions;
using Xunit;
using static Portfolio.Engine.Tests.TestPlan;

namespace Portfolio.Engine.Tests.Networks;

/// <summary>Where paths merge the latest counts. Exact values of maxima of random quantities.</summary>
public sealed class MergeBiasTests
{
    private const int Iterations = 100_000;

    // Greatest of two normals: C. E. Clark, The greatest of a finite set of random variables, Operations Research 9(2), 1961, 145–162.
    [Theory]
    [InlineData(100, 10, 95, 15, 0, 104.96689130399, 9.966944877538)]
    [InlineData(100, 10, 95, 15, 0.5, 103.15005095113, 10.882002843302)]
    [InlineData(20, 4, 18, 6, 0.3, 21.575246970019, 4.2203205492509)]
    public void TheGreaterOfTwoNormals(double m1, double s1, double m2, double s2, double correlation, double mean, double sd)
    {
        var finishes = Parallel([new Normal(m1, s1), new Normal(m2, s2)], correlation);
        Simulated.Mean(mean, sd, finishes);
        Simulated.Sd(sd, finishes);
    }

    // Greatest of k independent standard normals, mean and 80th percentile, by numerical integration of k φ Φ^(k−1).
    [Theory]
    [InlineData(2, 0.56418958354776, 0.681690113816, 1.250421491)]
    [InlineData(3, 0.84628437532163, 0.559467203797, 1.46337620309)]
    [InlineData(10, 1.5387527308352, 0.344343823261, 2.01281150687)]
    public void TheGreatestOfManyNormals(int k, double mean, double variance, double p80)
    {
        var finishes = Parallel([.. Enumerable.Repeat(new Normal(50, 4), k)], 0);
        Simulated.Mean(50 + 4 * mean, 4 * Math.Sqrt(variance), finishes);
        Simulated.Percentile(80, 50 + 4 * p80, finishes);
    }

    // Distribution function of the triangular, to the power k.
    [Theory]
    [InlineData(1, 14, 16)]
    [InlineData(2, 15.226666666667, 17.093829887979)]
    [InlineData(5, 16.695905339105, 18.131364129426)]
    public void TheGreatestOfManyTriangulars(int k, double mean, double p80)
    {
        var finishes = Parallel([.. Enumerable.Repeat(new Triangular(10, 12, 20), k)], 0);
        Simulated.Mean(mean, 2.2, finishes);
        Simulated.Percentile(80, p80, finishes);
    }

    // Three paths that are each on time with 50 %: all of them with 12.5 %; two with 60 %: 36 % (GAO-16-89G, 2015, best practice 8).
    [Theory]
    [InlineData(3, 50, 0.125)]
    [InlineData(2, 50.253347103, 0.36)]
    [InlineData(3, 50.253347103, 0.216)]
    public void IndependentPathsAreOnTimeTogetherWithTheProductOfTheirChances(int paths, double deadline, double chance)
    {
        var finishes = Parallel([.. Enumerable.Repeat(new Normal(50, 1), paths)], 0);
        Simulated.Share(chance, finishes.Count(f => f <= deadline) / (double)Iterations, Iterations);
    }

    // Equally correlated normals: ∫ φ(t) Φ((z − √ρ t)/√(1 − ρ))^k dt at the 80 % point z of each.
    [Theory]
    [InlineData(2, 0.3, 0.666145699702)]
    [InlineData(5, 0.3, 0.44009463032)]
    [InlineData(10, 0.3, 0.275405698135)]
    [InlineData(2, 0.8, 0.729033979763)]
    [InlineData(5, 0.8, 0.633978238376)]
    public void CorrelatedPathsAreOnTimeTogetherMoreOften(int paths, double correlation, double chance)
    {
        const double z80 = 0.8416212335729143;
        var finishes = Parallel([.. Enumerable.Repeat(new Normal(50, 4), paths)], correlation);
        Simulated.Share(chance, finishes.Count(f => f <= 50 + 4 * z80) / (double)Iterations, Iterations);
    }

    // Paths beside each other, whose scores have the correlation: rank correlation 6/π · asin(ρ/2).
    private static double[] Parallel(Distribution[] durations, double correlation)
    {
        var project = Project([.. durations.Select((d, i) => Work($"A{i}", d))]) with { Correlation = 6 / Math.PI * Math.Asin(correlation / 2) };
        return Compile(Settings(), project).Finishes(Iterations);
    }
}
