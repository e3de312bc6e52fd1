using Portfolio.Engine.Results;
using Xunit;

namespace Portfolio.Engine.Tests.Results;

public sealed class DistributionTableTests
{
    private static readonly int[] Finishes =
    [
        Instants.EndOf(new(2028, 2, 11)), Instants.EndOf(new(2028, 2, 11)) - 30, Instants.EndOf(new(2028, 2, 29)), Instants.EndOf(new(2028, 4, 1)), Instants.Never,
    ];

    [Fact]
    public void MonthsRunFromTheFirstToTheLastWithWhatIsBetween()
    {
        var bins = DistributionTable.OfFinish(Finishes, default, DateBin.Month, DayOfWeek.Sunday, 1000)!;
        Assert.Equal(
            [
                new(new(2028, 2, 1), new(2028, 2, 29), 3, 0.75, 0.75),
                new(new(2028, 3, 1), new(2028, 3, 31), 0, 0, 0.75),
                new(new(2028, 4, 1), new(2028, 4, 30), 1, 0.25, 1),
            ], bins);
    }

    [Theory]
    [InlineData(DayOfWeek.Sunday, "2028-02-07")] // 2028-02-11 is a Friday
    [InlineData(DayOfWeek.Friday, "2028-02-05")]
    [InlineData(DayOfWeek.Saturday, "2028-02-06")]
    [InlineData(DayOfWeek.Thursday, "2028-02-11")]
    public void WeeksEndOnTheirDay(DayOfWeek weekEnds, string first)
    {
        var bins = DistributionTable.OfFinish(Finishes, default, DateBin.Week, weekEnds, 1000)!;
        Assert.Equal(first, bins[0].From.ToString("yyyy-MM-dd", null));
        Assert.All(bins, bin => Assert.Equal((weekEnds, 6), (bin.To.DayOfWeek, bin.To.DayNumber - bin.From.DayNumber)));
        Assert.Equal((4, 1.0), (bins.Sum(bin => bin.Count), bins[^1].Cumulative));
    }

    [Fact]
    public void DaysAreCountedAsDatesAndNotBeyondTheLimit()
    {
        var bins = DistributionTable.OfFinish(Finishes, default, DateBin.Day, DayOfWeek.Sunday, 51)!;
        Assert.Equal((51, 2), (bins.Count, bins[0].Count));
        Assert.Null(DistributionTable.OfFinish(Finishes, default, DateBin.Day, DayOfWeek.Sunday, 50));
        Assert.Empty(DistributionTable.OfFinish([Instants.Never], default, DateBin.Day, DayOfWeek.Sunday, 50)!);
    }

    [Fact]
    public void CostBinsCoverTheRangeWithoutGapOrOverlap()
    {
        var bins = DistributionTable.OfCost([-7, 0, 3, 3, 12, 100], 7);
        Assert.Equal((7, -7, 100, 6), (bins.Count, bins[0].From, bins[^1].To, bins.Sum(bin => bin.Count)));
        for (var i = 1; i < bins.Count; i++) Assert.Equal(bins[i - 1].To + 1, bins[i].From);
        Assert.Equal(1, bins[^1].Cumulative);
        Assert.Equal([new Bin<long>(5, 5, 2, 1, 1)], DistributionTable.OfCost([5, 5], 10));
    }
}
