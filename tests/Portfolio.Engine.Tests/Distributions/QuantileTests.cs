using Portfolio.Engine.Distributions;
using Portfolio.Model.Distributions;
using Xunit;

namespace Portfolio.Engine.Tests.Distributions;

/// <summary>
/// Quantiles, means and deviations against other libraries: SciPy 1.10.1, mpmath 1.2.1 and R 4.2.2 (which agree to 12 digits) unless a test
/// names another source.
/// </summary>
public sealed class QuantileTests
{
    private const double Closed = 1e-12, Iterated = 1e-10;

    [Theory]
    [InlineData(2, 5, 14, 4, 6, 2.1380899352994, 3.3468195025503, 5.76572204546837, 7.88230811566633, 9.00668449543435)]
    [InlineData(10, 12, 20, 4, 13, 1.73205080756888, 10.8990213045924, 12.7667225939252, 14.5025861381575, 15.4533405043358)]
    [InlineData(10, 12, 20, 2, 13.5, 2.13307290077015, 10.8578900068635, 13.2304143906816, 15.4477689909862, 16.5756356309347)]
    [InlineData(10, 12, 20, 10, 12.5, 1.20096115353815, 11.047736721902, 12.3578552663583, 13.5006670495115, 14.1515693172591)]
    [InlineData(0, 0, 10, 4, 1.66666666666667, 1.40859042454753, 0.208516376390232, 1.29449436703876, 2.75220336322304, 3.69042655519807)]
    [InlineData(0, 10, 10, 4, 8.33333333333333, 1.40859042454753, 6.30957344480193, 8.70550563296124, 9.56352499790037, 9.79148362360977)]
    [InlineData(4, 6, 8, 4, 6, 0.755928946018454, 4.98654581315387, 6, 6.69360824863436, 7.01345418684613)]
    [InlineData(2, 5, 14, 4.5, 5.92307692307692, 2.05544449475191, 3.37699787617973, 5.69941210053138, 7.72026639744859, 8.80303126821897)]
    public void Pert(double low, double mode, double high, double weight, double mean, double sd, double p10, double p50, double p80, double p90)
    {
        var pert = Marginal.Of(new Pert(low, mode, high, weight));
        Agree(pert, Iterated, mean, sd, (0.1, p10), (0.5, p50), (0.8, p80), (0.9, p90));
        Assert.Equal(mode, pert.BaseValue);
        Assert.Equal(low, pert.Lowest);
    }

    // mpmath 1.2.1: bisection on its regularised incomplete beta with 30 digits.
    [Theory]
    [InlineData(4, 0.3, 1e-10, 9.76125601826891385e-6)]
    [InlineData(4, 0.3, 1e-4, 0.00523318703355543122)]
    [InlineData(4, 0.3, 0.999999, 0.983553343018372237)]
    [InlineData(0.5, 0.0, 0.01, 0.00667782745049408623)]
    [InlineData(0.5, 1.0, 0.001, 0.0100000000000000001)]
    [InlineData(20, 0.1, 0.37, 0.103074949721228226)]
    [InlineData(50, 0.0, 1e-6, 1.96078527489490584e-8)]
    [InlineData(50, 1.0, 0.5, 0.986500821095876589)]
    [InlineData(50, 0.5, 0.9, 0.588579576536673859)]
    [InlineData(3.3, 0.77, 0.2, 0.501801416293813674)]
    [InlineData(300, 0.25, 0.8, 0.27250239306165535)]
    [InlineData(5000, 0.9, 0.1, 0.894367208012146727)]
    public void Pert_of_any_weight_and_tail(double weight, double place, double p, double x) =>
        Assert.InRange(Marginal.Of(new Pert(0, place, 1, weight)).Quantile(p) / x - 1, -Iterated, Iterated);

    [Theory]
    [InlineData(10, 12, 20, 14, 2.16024689946929, 11.4142135623731, 13.6754446796632, 16, 17.1715728752538, 18)]
    [InlineData(10, 10, 20, 13.3333333333333, 2.35702260395516, 10.5131670194949, 12.9289321881345, 15.5278640450004, 16.8377223398316, 17.7639320225002)]
    [InlineData(10, 20, 20, 16.6666666666667, 2.35702260395516, 13.1622776601684, 17.0710678118655, 18.9442719099992, 19.4868329805051, 19.746794344809)]
    [InlineData(2, 5, 14, 7, 2.54950975679639, 3.89736659610103, 6.65153077165047, 9.3524199845511, 10.713664654969, 11.6762099922755)]
    public void Triangular(double low, double mode, double high, double mean, double sd, double p10, double p50, double p80, double p90, double p95)
    {
        var triangular = Marginal.Of(new Triangular(low, mode, high));
        Agree(triangular, Closed, mean, sd, (0.1, p10), (0.5, p50), (0.8, p80), (0.9, p90), (0.95, p95));
        Assert.Equal(mode, triangular.BaseValue);
    }

    [Fact]
    public void Uniform() => Agree(Marginal.Of(new Uniform(8.75, 21.25)), Closed, 15, 12.5 / Math.Sqrt(12), (0.1, 10), (0.9, 20));

    [Fact]
    public void Normal() => Agree(Marginal.Of(new Normal(100, 20)), Closed, 100, 20, (0.8, 116.832424671458284), (0.1, 74.368968689107991));

    [Fact]
    public void Truncated_normal()
    {
        var held = Marginal.Of(new Normal(100, 20, 80, 150));
        Agree(held, Closed, 105.374996912498, 15.3044260328913,
            (0.1, 86.0131343521653), (0.5, 103.84479497816), (0.8, 118.829036618638), (0.9, 126.849233625406));
        Assert.Equal(100, held.BaseValue);
        Agree(Marginal.Of(new Normal(10, 5, 0)), Closed, 10.2762393133949, 4.70757885837142, (0.1, 4.13692507581402), (0.8, 14.2899322350357));
    }

    // mpmath 1.2.1: root of the upper tail with 40 digits.
    [Theory]
    [InlineData(6, null, 0.5, 6.1115650618134393, 6.1584826045445989)]
    [InlineData(6, null, 0.999, 7.0363664937097025, 6.1584826045445989)]
    [InlineData(6, 7.0, 0.5, 6.1113582155088845, 6.1572109033782798)]
    [InlineData(12, null, 0.25, 12.023787117134062, 12.082214175254284)]
    public void Truncation_far_out_keeps_its_digits(double min, double? max, double p, double value, double mean)
    {
        Agree(Marginal.Of(new Normal(0, 1, min, max)), Closed, mean, null, (p, value));
        Agree(Marginal.Of(new Normal(0, 1, -max, -min)), Closed, -mean, null, (1 - p, -value));
    }

    [Fact]
    public void Lognormal()
    {
        var moments = Marginal.Of(new LognormalByMoments(100, 30));
        Agree(moments, Closed, 100, 30, (0.1, 65.7505853915), (0.5, 95.7826285221151), (0.8, 122.627093037727), (0.9, 139.532018946732));
        Near(95.7826285221151, moments.BaseValue, Closed);
        Agree(Marginal.Of(new LognormalByPercentiles(80, 150, 10, 90)), Closed, 112.889049600188, 28.1079663510835,
            (0.5, 109.544511501033), (0.8, 134.658382711487), (0.1, 80), (0.9, 150));
        Agree(Marginal.Of(new LognormalByPercentiles(100, 130, 50, 80)), Closed, 104.978974295222, null, (0.9, 149.108898361064));
    }

    [Fact]
    public void Straight_lines_between_percentiles()
    {
        var table = Marginal.Of(new Percentiles([new(0, 80), new(10, 90), new(50, 100), new(90, 130), new(100, 160)]));
        Agree(table, Closed, 107, Math.Sqrt(317.666666666667),
            (0.25, 93.75), (0.5, 100), (0.75, 118.75), (0.8, 122.5), (0.95, 145), (0.99, 157));
        Assert.Equal(100, table.BaseValue);
    }

    [Fact]
    public void A_percentile_stated_twice_is_an_atom()
    {
        var table = Marginal.Of(new Percentiles([new(0, 5), new(30, 5), new(100, 12)]));
        Agree(table, Closed, 0.3 * 5 + 0.7 * 8.5, null, (0.01, 5), (0.3, 5), (0.65, 8.5));
    }

    [Fact]
    public void Discrete()
    {
        var fine = Marginal.Of(new Discrete([new(50, 0.1), new(0, 0.7), new(10, 0.2)]));
        Agree(fine, Closed, 7, 14.8660687473185, (0.5, 0), (0.7, 0), (0.70001, 10), (0.8, 10), (0.9, 10), (0.95, 50), (1 - 1e-16, 50));
        Assert.Equal(0, fine.BaseValue);
        Assert.Equal(0, fine.Lowest);
    }

    [Fact]
    public void The_first_of_equally_likely_outcomes_is_the_base() =>
        Assert.Equal(9, Marginal.Of(new Discrete([new(9, 0.4), new(1, 0.2), new(3, 0.4)])).BaseValue);

    // Ten times 0.1 adds up to less than 1 in binary; the last value is still reached, and an impossible one never.
    [Fact]
    public void The_last_cumulative_probability_is_1()
    {
        var ten = Marginal.Of(new Discrete([.. Enumerable.Range(1, 10).Select(v => new Outcome(v, 0.1)), new Outcome(99, 0)]));
        Assert.Equal(10, ten.Quantile(1 - 1.1e-16));
        var values = new double[1];
        ten.Read([8.5], values);
        Assert.Equal(10, values[0]);
    }

    [Fact]
    public void Ranges_without_width_are_constants()
    {
        Distribution[] flat =
        [
            new Constant(7), new Uniform(7, 7), new Triangular(7, 7, 7), new Pert(7, 7, 7), new Triangular(7, 7, 7, 10, 90), new Pert(7, 7, 7, 4, 10, 90),
            new Normal(7, 0), new Normal(7, 0, 2, 9), new Normal(7, 3, 7, 7), new LognormalByMoments(7, 0), new LognormalByPercentiles(7, 7, 10, 90),
            new Discrete([new(7, 1)]), new Percentiles([new(0, 7), new(100, 7)]),
        ];
        foreach (var stated in flat)
        {
            var marginal = Marginal.Of(stated);
            var values = new double[3];
            marginal.Read([-8, 0.3, 8], values);
            Assert.Equal([7, 7, 7], values);
            Assert.Equal((7, 7, 7, 0), (marginal.Quantile(0.3), marginal.BaseValue, marginal.Mean, marginal.Variance));
        }
    }

    private static void Agree(Marginal marginal, double relative, double mean, double? sd, params (double P, double Value)[] quantiles)
    {
        Near(mean, marginal.Mean, relative);
        if (sd is { } deviation)
            Near(deviation, Math.Sqrt(marginal.Variance), relative);
        foreach (var (p, value) in quantiles)
            Near(value, marginal.Quantile(p), relative);
    }

    private static void Near(double expected, double actual, double relative)
    {
        var tolerance = relative * Math.Max(1, Math.Abs(expected));
        Assert.InRange(actual, expected - tolerance, expected + tolerance);
    }
}
