using Portfolio.Engine.Distributions;
using Portfolio.Model.Distributions;
using Xunit;

namespace Portfolio.Engine.Tests.Distributions;

public sealed class OuterLimitsTests
{
    // Bisection for q = F(mode) in the equations of the triangular distribution, done apart in Python (mpmath 1.2.1); idea in Kotz and van Dorp, Beyond Beta, 2004.
    [Theory]
    [InlineData(90, 100, 130, 10, 90, 77.260808240234, 148.62966268617, 108.63015697547, 14.884208932608, 106.97247052201, 122.28334105295)]
    [InlineData(10, 12, 20, 10, 90, 7.0332812400004, 24.75407564418, 14.59578562806, 3.731849761377, 14.123639333617, 18.030797391633)]
    [InlineData(10, 15, 20, 10, 90, 5.9549150281253, 24.045084971875, 15, 3.6926404768682, 15, 18.324470943698)]
    [InlineData(6.5, 7, 10.5, 10, 90, 5.4639705245798, 12.451838212769, 8.3052695791162, 1.499187013714, 8.0873952879362, 9.6915221407132)]
    [InlineData(80, 100, 150, 15, 85, 44.215833590919, 197.24689933605, 113.82091097566, 31.617215658352, 110.98625754095, 142.69087923596)]
    [InlineData(80, 100, 150, 5, 95, 67.063919294762, 168.68025033916, 111.91472321131, 21.165774872157, 109.60811200527, 131.31974966084)]
    public void Triangular(
        double low, double mode, double high, double lowPercentile, double highPercentile,
        double a, double b, double mean, double sd, double p50, double p80)
    {
        var stated = new Triangular(low, mode, high, lowPercentile, highPercentile);
        Near(a, OuterLimits.Of(stated).Low);
        Near(b, OuterLimits.Of(stated).High);
        var marginal = Marginal.Of(stated);
        Near(mean, marginal.Mean);
        Near(sd, Math.Sqrt(marginal.Variance));
        Near(p50, marginal.Quantile(0.5));
        Near(p80, marginal.Quantile(0.8));
        Assert.Null(MarginalCheck.Fault(stated, out var lowest));
        Near(a, lowest);
    }

    // One side known: the larger root of p·b² − (2U − k(a + m))·b + U² − k·a·m = 0, k = 1 − p.
    [Fact]
    public void Only_the_high_end_of_a_triangular_is_a_percentile()
    {
        var (low, high) = OuterLimits.Of(new Triangular(10, 12, 18, 0, 90));
        Assert.Equal(10, low);
        Near(21.214634688829, high);
    }

    // SciPy 1.10.1: optimize.brentq on special.betaincinv.
    [Theory]
    [InlineData(10, 12, 20, 4, 10, 90, 8.3146138611663, 30.996675426358)]
    [InlineData(90, 100, 130, 4, 5, 95, 85.820692256968, 156.99862070074)]
    [InlineData(10, 10, 20, 4, 10, 90, 9.2346734612438, 36.375355957577)]
    [InlineData(10, 20, 20, 4, 10, 90, -6.3753559575773, 20.765326538756)]
    [InlineData(8, 12, 25, 2.7, 20, 80, 0.10997629533618, 45.82741630926)]
    [InlineData(10, 12, 20, 4, 0, 90, 10, 32.012534407408)]
    [InlineData(10, 12, 20, 4, 10, 100, 8.3225297783007, 20)]
    [InlineData(5, 6, 9, 30, 10, 90, 3.7970986255566, 34.685695838218)]
    [InlineData(5, 6, 9, 0.5, 10, 90, 4.4487203347586, 9.8964378575058)]
    public void Pert(double low, double mode, double high, double weight, double lowPercentile, double highPercentile, double a, double b)
    {
        var (from, to) = OuterLimits.Of(new Pert(low, mode, high, weight, lowPercentile, highPercentile));
        Near(a, from);
        Near(b, to);
    }

    [Fact]
    public void The_stated_percentiles_come_back_wherever_the_mode_lies()
    {
        for (var mode = 10.0; mode <= 20; mode += 0.5)
        {
            foreach (var marginal in new[] { Marginal.Of(new Triangular(10, mode, 20, 10, 80)), Marginal.Of(new Pert(10, mode, 20, 4, 10, 80)) })
            {
                Near(10, marginal.Quantile(0.1));
                Near(20, marginal.Quantile(0.8));
                Assert.Equal(mode, marginal.BaseValue);
            }
        }
    }

    // The exact quantile is tested against SciPy above; the curves that stand for it must not be told apart from it.
    [Theory]
    [InlineData(0.5)]
    [InlineData(4)]
    [InlineData(11.5)]
    [InlineData(20)]
    public void Curves_follow_the_exact_quantile(double weight)
    {
        foreach (var percentile in new[] { 0.5, 1, 5, 10, 20, 37.5, 50, 80, 90, 99, 99.5 })
        {
            var curve = PertCurve.Of(weight, percentile);
            for (var k = 0; k <= 200; k++)
            {
                var place = k / 200.0;
                var exact = new RegularisedBeta(1 + weight * place, 1 + weight * (1 - place)).Quantile(percentile / 100, 1 - percentile / 100);
                Assert.InRange(curve(place), exact - 1e-12, exact + 1e-12);
            }
        }
    }

    [Fact]
    public void Bounds_that_hold_no_probability_are_named()
    {
        Assert.NotNull(MarginalCheck.Fault(new Normal(0, 1, 50, 60)));
        Assert.NotNull(MarginalCheck.Fault(new Normal(0, 0, 1, 2)));
        Assert.NotNull(MarginalCheck.Fault(new LognormalByPercentiles(1, 1e300, 49, 51)));
        Assert.Null(MarginalCheck.Fault(new Normal(0, 1, 5, 60)));
        Assert.Null(MarginalCheck.Fault(new Pert(10, 12, 20, 4, 10, 90)));
        Assert.Null(MarginalCheck.Fault(new Triangular(10, 10, 10, 10, 90)));
    }

    private static void Near(double expected, double actual) =>
        Assert.InRange(actual, expected - 1e-10 * Math.Max(1, Math.Abs(expected)), expected + 1e-10 * Math.Max(1, Math.Abs(expected)));
}
