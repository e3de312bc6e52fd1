using Portfolio.Engine.Dependence;
using Portfolio.Engine.Distributions;
using Portfolio.Engine.Draws;
using Portfolio.Model.Distributions;
using Portfolio.Model.Documents;
using Xunit;

namespace Portfolio.Engine.Tests.Dependence;

public sealed class DriverFactorsTests
{
    private const int Sections = 20, PerSection = 10_000;

    [Fact]
    public void A_driver_acts_in_the_upper_tail_at_the_place_within_it()
    {
        var triangular = new Triangular(1, 1.2, 1.6);
        var driver = new DriverFactors(new Driver("ground", null, 0.4, triangular, null));
        double[] scores = [-3, 0.2533, 0.2534, 1, 3, 8.2]; // Φ⁻¹(.6) = 0.25334710313579974
        var (duration, cost) = (new double[scores.Length], new double[scores.Length]);
        driver.Read(scores, duration, cost);
        Assert.Equal([1, 1, 1, 1, 1, 1], cost);
        Assert.Equal([1, 1], duration[..2]);
        for (var i = 2; i < scores.Length; i++)
            Assert.Equal(Marginal.Of(triangular).Quantile((NormalScore.Phi(scores[i]) - 1 + 0.4) / 0.4), duration[i], 1e-6);
    }

    [Fact]
    public void Certain_and_impossible_drivers()
    {
        double[] scores = [-8.2, -1, 0, 8.2, 9];
        var (duration, cost) = (new double[5], new double[5]);
        new DriverFactors(new Driver("a", null, 1, new Uniform(2, 3), new Constant(0.5))).Read(scores, duration, cost);
        Assert.Equal([2, 2 + NormalScore.Phi(-1), 2.5, 3, 3], duration, (x, y) => Math.Abs(x - y) < 1e-14);
        Assert.Equal([0.5, 0.5, 0.5, 0.5, 0.5], cost);
        new DriverFactors(new Driver("a", null, 0, new Uniform(2, 3), new Constant(0.5))).Read(scores, duration, cost);
        Assert.Equal([1, 1, 1, 1, 1], duration);
        Assert.Equal([1, 1, 1, 1, 1], cost);
    }

    [Fact]
    public void A_factor_is_never_below_0()
    {
        var duration = new double[1];
        new DriverFactors(new Driver("a", null, 1, new Normal(1, 1), null)).Read([-3], duration, new double[1]);
        Assert.Equal([0], duration);
    }

    // P(both) of two events in a Gaussian copula, SciPy 1.10.1 = R 4.2.2: p = .2 and .3, normal correlation 0, .3 and .6.
    [Theory]
    [InlineData(0, 0.06)]
    [InlineData(0.3, 0.0913211139831716)]
    [InlineData(0.6, 0.128598830722552)]
    public void Drivers_happen_together_as_their_rank_says(double normal, double both)
    {
        var pair = new RankPair("driver/a", "driver/b", RankCorrelation.FromNormal(normal));
        var factors = Draw([new Driver("a", null, 0.2, new Constant(2), null), new Driver("b", null, 0.3, new Constant(2), null)], pair);
        var n = Sections * PerSection;
        var share = (double)Enumerable.Range(0, n).Count(i => factors[0][i] == 2 && factors[1][i] == 2) / n;
        var error = 4 * Math.Sqrt(both * (1 - both) / n);
        Assert.InRange(share, both - error, both + error);
    }

    // Moments of M = 1 + B(F − 1) and the correlations that shared drivers induce, in closed form.
    [Fact]
    public void Shared_drivers_induce_the_correlation_of_their_products()
    {
        Driver[] drivers =
        [
            new("r1", null, 1, new Triangular(0.9, 1, 1.3), null), new("r2", null, 0.4, new Triangular(1, 1.2, 1.6), null),
            new("r3", null, 0.25, new Triangular(1.1, 1.3, 1.8), null),
        ];
        var r = Draw(drivers);
        var (a, b, c) = (Product(r[0], r[1]), Product(r[0], r[2]), Product(r[1], r[2]));
        Within(1.0666666666667, s => Mean(r[0], s));
        Within(1.1066666666667, s => Mean(r[1], s));
        Within(1.1, s => Mean(r[2], s));
        Within(1.2454166666667, s => Mean(Product(r[2], r[2]), s));
        Within(1.18044444444, s => Mean(a, s));
        Within(1.17333333333, s => Mean(b, s));
        Within(1.21733333333, s => Mean(c, s));
        Within(0.21014339605835, s => Correlation(a, b, s));
        Within(0.53899073373573, s => Correlation(a, c, s));
        Within(0.69994124943747, s => Correlation(b, c, s));
    }

    /// <summary>The mean of a figure over 20 sections within 4 of its standard errors.</summary>
    private static void Within(double expected, Func<int, double> figure)
    {
        var values = Enumerable.Range(0, Sections).Select(figure).ToArray();
        var mean = values.Average();
        var error = 4 * Math.Sqrt(values.Sum(v => (v - mean) * (v - mean)) / (Sections - 1) / Sections);
        Assert.InRange(mean, expected - error, expected + error);
    }

    private static double Mean(double[] x, int section) => x.AsSpan(section * PerSection, PerSection).ToArray().Average();

    private static double Correlation(double[] x, double[] y, int section) => MathNet.Numerics.Statistics.Correlation.Pearson(
        x.Skip(section * PerSection).Take(PerSection), y.Skip(section * PerSection).Take(PerSection));

    private static double[] Product(double[] x, double[] y) => [.. x.Zip(y, (a, b) => a * b)];

    private static double[][] Draw(Driver[] drivers, params RankPair[] pairs)
    {
        const int n = Sections * PerSection;
        var scores = new double[drivers.Length * n];
        var settings = DependenceModelTests.Stated([], 0, null, pairs) with { Drivers = drivers };
        DependenceModel.Build(settings, []).Scores(1, 0, n, [], scores);
        var factors = drivers.Select(_ => new double[n]).ToArray();
        for (var k = 0; k < drivers.Length; k++)
            new DriverFactors(drivers[k]).Read(scores.AsSpan(k * n, n), factors[k], new double[n]);
        return factors;
    }
}
