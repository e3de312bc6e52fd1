using CsCheck;
using Portfolio.Engine.Results;
using Xunit;

namespace Portfolio.Engine.Tests.Results;

public sealed class LargestRemaindersTests
{
    [Theory]
    [InlineData(10, new[] { 3.4, 3.3, 3.3 }, new long[] { 4, 3, 3 })]
    [InlineData(10, new[] { 2.5, 2.5, 2.5, 2.5 }, new long[] { 3, 3, 2, 2 })] // ties: who stands first
    [InlineData(-10, new[] { -3.4, -3.3, -3.3 }, new long[] { -4, -3, -3 })]
    [InlineData(0, new[] { 0.4, -0.4 }, new long[] { 0, 0 })]
    [InlineData(5, new[] { 5 - 1e-12, 1e-12 }, new long[] { 5, 0 })]
    [InlineData(3, new[] { 1.0, 1.0 }, new long[] { 2, 1 })] // figures that miss the total
    [InlineData(-4, new[] { 1.0, 1.5, 1.25 }, new long[] { -2, -1, -1 })]
    [InlineData(7, new double[0], new long[0])]
    public void PartsMakeTheTotal(long total, double[] figures, long[] parts) => Assert.Equal(parts, LargestRemainders.Round(total, figures));

    [Theory]
    [InlineData(100, new double[] { 1, 1, 1 }, new long[] { 34, 33, 33 })]
    [InlineData(100, new double[] { 0, 0 }, new long[] { 50, 50 })]
    [InlineData(-1, new double[] { 1, 3 }, new long[] { 0, -1 })]
    public void WeightsShareATotal(long total, double[] weights, long[] parts) => Assert.Equal(parts, LargestRemainders.Share(total, weights));

    [Fact]
    public void NobodyIsAWholeUnitOff() =>
        Gen.Double[-1e9, 1e9].Array[1, 50].Sample(figures =>
        {
            var total = (long)Math.Round(figures.Sum());
            var rest = total - figures.Sum();
            figures[0] += rest;
            var parts = LargestRemainders.Round(total, figures);
            Assert.Equal(total, parts.Sum());
            for (var i = 0; i < parts.Length; i++) Assert.True(Math.Abs(parts[i] - figures[i]) < 1 + 1e-6);
        }, iter: 500);

    [Fact] // twenty sections one above and one below the figure: s² = 20/19, so 2.093/√19
    public void SectionErrorByHand() =>
        Assert.Equal(2.093 / Math.Sqrt(19), SectionError.Of(5, [.. Enumerable.Range(0, 20).Select(i => i % 2 == 0 ? 4.0 : 6.0)]), 12);

    [Theory]
    [InlineData(20)]
    [InlineData(47)]
    [InlineData(1_000_000)]
    public void SectionsCoverAllIterationsOnce(int n)
    {
        var at = 0;
        for (var s = 0; s < SectionError.Sections; s++)
        {
            var (offset, length) = SectionError.Of(s, n).GetOffsetAndLength(n);
            Assert.Equal(at, offset);
            Assert.InRange(length, n / 20, n / 20 + 1);
            at += length;
        }
        Assert.Equal(n, at);
    }
}
