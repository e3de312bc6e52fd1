using MathNet.Numerics.Distributions;
using Portfolio.Engine.Results;
using Xunit;

namespace Portfolio.Engine.Tests.Results;

public sealed class LevelTests
{
    [Theory]
    [InlineData(0.5, 10_000, 50)]
    [InlineData(99.5, 10_000, 9_950)]
    [InlineData(7, 100, 7)] // 0.07 · 100 is 7.000000000000001 in binary: a rank from doubles would be 8
    [InlineData(55, 100, 55)] // 0.55 · 100 likewise
    [InlineData(80, 1, 1)]
    [InlineData(80, 11, 9)]
    [InlineData(0.000001, 1_000_000, 1)]
    [InlineData(99.999999, 1_000_000, 1_000_000)]
    public void RankIsExact(double percent, int n, int rank) => Assert.Equal(rank, Level.Of(percent).Rank(n));

    // Hyndman and Fan, "Sample quantiles in statistical packages", The American Statistician 50(4), 1996, definition 1; R, quantile(type =
    // 1).
    [Theory]
    [InlineData(10, 3)]
    [InlineData(25, 7)]
    [InlineData(50, 8)]
    [InlineData(80, 15)]
    [InlineData(90, 16)]
    public void PercentileIsDefinitionOne(int percent, long expected)
    {
        double[] data = [16, 3, 20, 7, 8, 6, 15, 8, 10, 13];
        var grid = Grids.OfCost(data, new RankTable([Level.Of(percent)]), 0, null);
        Assert.Equal(expected, grid.At(Level.Of(percent))!.Value.Value);
    }

    // David and Nagaraja, Order Statistics, 3rd ed. (2003), section 7.1, evaluated with SciPy's binomial distribution.
    [Theory]
    [InlineData(100, 50, 40, 61, .9647997998)]
    [InlineData(100, 80, 72, 89, .9674049169)]
    [InlineData(1000, 50, 469, 532, .9537088026)]
    [InlineData(1000, 80, 775, 825, .9518995832)]
    [InlineData(1000, 90, 881, 919, .9549071811)]
    [InlineData(5000, 80, 3944, 4056, .9522866000)]
    [InlineData(10000, 50, 4902, 5099, .9511670501)]
    [InlineData(10000, 80, 7921, 8079, .9517324352)]
    [InlineData(10000, 90, 8941, 9059, .9507872779)]
    public void SamplingRanksAreThePublishedOnes(int n, int percent, int low, int high, double coverage)
    {
        Assert.Equal(new SamplingRanks(low, high), SamplingRanks.Of(Level.Of(percent), n));
        var binomial = new Binomial(percent / 100.0, n);
        Assert.Equal(coverage, binomial.CumulativeDistribution(high - 1) - binomial.CumulativeDistribution(low - 1), 8);
    }

    [Fact]
    public void SamplingRanksKeepTheirDefinition() // against MathNet.Numerics 5.0.0, Binomial
    {
        foreach (var n in (int[])[1, 2, 10, 37, 200, 3000])
        foreach (var level in (Level[])[Level.Of(0.5m), Level.Of(1), Level.Of(33), Level.Of(80), Level.Of(97.5m), Level.Of(99.5m)])
        {
            var binomial = new Binomial(level.Probability, n);
            double Below(int x) => x >= n ? 1 : binomial.CumulativeDistribution(x); // the library gives NaN at n
            var (low, high) = SamplingRanks.Of(level, n);
            var r = low ?? 0;
            if (low is not null) Assert.True(Below(r - 1) <= 0.025, $"low of {level} in {n}");
            Assert.True(Below(r) > 0.025, $"low of {level} in {n} is the largest");
            var s = high ?? n + 1;
            if (high is not null) Assert.True(1 - Below(s - 1) <= 0.025, $"high of {level} in {n}");
            Assert.True(s == 1 || 1 - Below(s - 2) > 0.025, $"high of {level} in {n} is the smallest");
        }
    }

    // Wilks, Annals of Mathematical Statistics 12 (1941): with 59 values the largest exceeds the 95th percentile with 95 %;
    // with 2.5 % in each tail the smallest number is ln 0.025 / ln 0.95 = 71.9, so 72.
    [Fact]
    public void ABoundThatDoesNotExistIsLeftOut()
    {
        Assert.Null(SamplingRanks.Of(Level.Of(95), 71).High);
        Assert.Equal(72, SamplingRanks.Of(Level.Of(95), 72).High);
        Assert.Null(SamplingRanks.Of(Level.Of(5), 71).Low);
        Assert.Equal(1, SamplingRanks.Of(Level.Of(5), 72).Low);
    }

    [Fact] // for large n the ranks lie at np ± 1.96 √(np(1 − p)), to within a rank or two
    public void AMillionIterationsAreNoTrouble()
    {
        var (low, high) = SamplingRanks.Of(Level.Of(80), 1_000_000);
        Assert.InRange(low!.Value, 800_000 - 785, 800_000 - 781);
        Assert.InRange(high!.Value, 800_000 + 782, 800_000 + 787);
    }

    [Fact]
    public void ALevelIsAboveZeroAndBelowHundredWithSixDecimals()
    {
        Assert.False(Level.TryOf(0, out _));
        Assert.False(Level.TryOf(100, out _));
        Assert.False(Level.TryOf(1.0000001m, out _));
        Assert.True(Level.TryOf(1.000001m, out var level));
        Assert.Equal("1.000001", level.ToString());
        Assert.Throws<ArgumentOutOfRangeException>(() => Level.Of(double.NaN));
        Assert.Equal(102, Level.KeptAnd([Level.Of(80), Level.Of(12.5)]).Count);
        Assert.Equal(101, Level.Kept.Count);
    }
}
