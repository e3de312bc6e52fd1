using CsCheck;
using Portfolio.Engine.Results;
using Portfolio.Model.Documents;
using Xunit;

namespace Portfolio.Engine.Tests.Results;

public sealed class GridTests
{
    private const int Day = Instants.MinutesPerDay;
    private static readonly RankTable Table = new(Level.KeptAnd([Level.Of(12.5)]));

    // Scenarios small enough to check by hand; their totals are 18, 15, 15, 17, 20, 7, 21, 9, 22, 25.
    internal static readonly double[][] TenScenarios =
    [
        [10, 2, 8, 4, 12, 3, 6, 1, 9, 5],
        [5, 9, 1, 4, 7, 2, 7, 3, 6, 10],
        [3, 4, 6, 9, 1, 2, 8, 5, 7, 10],
    ];

    [Fact]
    public void TenScenariosAddUpAndHaveTheirPercentiles()
    {
        var together = new ScopeSamples(10);
        foreach (var part in TenScenarios) together.Add(new int[10], part, (long)Grids.OfCost(part, Table, 0, null).Mean);
        Assert.Equal([18, 15, 15, 17, 20, 7, 21, 9, 22, 25], together.Costs.ToArray());
        var grid = Grids.OfCost(together.Costs, Table, 17, 20, together.MeanOfParts);
        Assert.Equal(21, grid.At(Level.Of(80))!.Value.Value);
        Assert.Equal([9, 7, 8], TenScenarios.Select(part => Grids.OfCost(part, Table, 0, null).At(Level.Of(80))!.Value.Value));
        Assert.Equal(0.5, grid.Probability(grid.Base));
        Assert.Equal(0.7, grid.Probability(grid.Commitment));
        Assert.Equal(6 + 5 + 6, grid.Mean); // means 6, 5.4 and 5.5, each rounded half away from zero
        Assert.Equal(Math.Sqrt(28.69), grid.Sd, 12); // mean square 314.3 less 16.9²
    }

    [Theory]
    [InlineData(new double[] { 1, 2 }, 2)]
    [InlineData(new double[] { -1, -2 }, -2)]
    [InlineData(new double[] { 1, 1, 2 }, 1)]
    [InlineData(new double[] { 9_007_199_254_740_991, 9_007_199_254_740_991 }, 9_007_199_254_740_991)]
    public void MeansAreRoundedHalfAwayFromZero(double[] costs, double mean) => Assert.Equal(mean, Grids.OfCost(costs, Table, 0, null).Mean);

    [Fact]
    public void DatesAreComparedAsDates()
    {
        int[] finishes = [10 * Day, 10 * Day + 1, 11 * Day, 11 * Day + 1];
        var grid = Grids.OfFinish(finishes, Table, default, 10 * Day + 5, Instants.ToDate(9));
        Assert.Equal(new Reference(10, 3), grid.Base);
        Assert.Equal(new Reference(9, 1), grid.Commitment);
        var summary = FinishSummary.Of(grid, [Level.Of(50), Level.Of(99)]);
        Assert.Equal(Instants.ToDate(10), summary.Base);
        Assert.Equal(0.75, summary.BaseProbability);
        Assert.Equal(0.25, summary.CommitmentProbability);
        Assert.Equal(Instants.ToDate(10), summary.Mean);
        Assert.Equal([Instants.ToDate(10), Instants.ToDate(11)], summary.Percentiles.Select(at => at.Value));
        Assert.Equal(0.5, summary.SdDays!.Value, 3);
    }

    [Fact]
    public void WhatDoesNotAlwaysHappenIsCountedWhereItDoes()
    {
        var grid = Grids.OfFinish([Instants.Never, 5 * Day, Instants.Never, 7 * Day], Table, default, Instants.Never, Instants.ToDate(4));
        Assert.Equal(0.5, grid.Happens);
        Assert.Null(grid.Base);
        Assert.Equal(0.5, grid.Probability(grid.Commitment));
        Assert.Equal(5 * Day, grid.At(Level.Of(50))!.Value.Value);
        var never = FinishSummary.Of(Grids.OfFinish([Instants.Never], Table, default, 3 * Day, Instants.ToDate(4)), [Level.Of(80)]);
        Assert.Equal((0, null, null), (never.Happens, never.Mean, never.CommitmentProbability));
        Assert.Empty(never.Percentiles);
    }

    [Fact]
    public void MoneyIsReportedInItsDigits()
    {
        var summary = CostSummary.Of(Grids.OfCost([100_005, 100_010, 300_000], Table, 100_005, 250_000), [Level.Of(80)], 2);
        Assert.Equal((1000.05m, 1666.72m, 3000m), (summary.Base, summary.Mean, summary.Percentiles[0].Value));
        Assert.Equal((1 / 3.0, 2 / 3.0, 2500m), (summary.BaseProbability, summary.CommitmentProbability, summary.Commitment));
        Assert.Null(summary.Percentiles[0].SamplingHigh);
        Assert.Equal(90_071_992_547_409.91m, MinorUnits.ToMoney(9_007_199_254_740_991, 2));
        Assert.Equal(9_007_199_254_740_991, MinorUnits.OfMoney(90_071_992_547_409.91m, 2));
    }

    [Fact]
    public void PercentilesRiseAndAreValuesThatOccurred() =>
        Gen.Select(Gen.Double[-1e12, 1e12].Select(Math.Round), Gen.Double[-5, 5].Select(Math.Round)).Array[1, 1500].Sample(pairs =>
        {
            foreach (var costs in (double[][])[[.. pairs.Select(pair => pair.Item1)], [.. pairs.Select(pair => pair.Item2)]])
            {
                var grid = Grids.OfCost(costs, Table, (long)costs[0], (long)costs[^1]);
                var sorted = costs.Order().ToArray();
                foreach (var at in grid.Percentiles)
                {
                    Assert.Equal(sorted[at.Level.Rank(costs.Length) - 1], at.Value);
                    Assert.True((at.SamplingLow ?? at.Value) <= at.Value && at.Value <= (at.SamplingHigh ?? at.Value));
                }
                Assert.Equal(costs.Count(cost => cost <= costs[0]), grid.Base!.Value.Kept);
                Assert.Equal(costs.Count(cost => cost <= costs[^1]), grid.Commitment!.Value.Kept);
            }
        }, iter: 200);

    [Fact]
    public void BytesGiveTheGridBack() =>
        Gen.Select(Gen.Int[0, 120_000_000].Array[1, 900], Gen.Bool, Gen.Int[0, 40_000]).Sample((finishes, opens, earliest) =>
        {
            if (opens) finishes[0] = Instants.Never;
            var grids = (Grid[])
            [
                Grids.OfFinish(finishes, Table, new(opens, earliest), finishes[^1], opens ? Instants.ToDate(20_000) : null),
                Grids.OfCost([.. finishes.Select(minutes => minutes * 1e6)], Table, -5, opens ? 7 : null),
            ];
            foreach (var grid in grids)
            {
                var bytes = GridBytes.ToBytes(grid);
                var back = GridBytes.FromBytes(bytes);
                Assert.Equal(grid.Percentiles, back.Percentiles);
                Assert.Equal((grid.Metric, grid.Dates, grid.Iterations, grid.Happening), (back.Metric, back.Dates, back.Iterations, back.Happening));
                Assert.Equal((grid.Mean, grid.Sd, grid.Base, grid.Commitment), (back.Mean, back.Sd, back.Base, back.Commitment));
                Assert.Equal(bytes, GridBytes.ToBytes(back));
                Assert.InRange(bytes.Length, 1, 2_500);
                Assert.Throws<FormatException>(() => GridBytes.FromBytes(bytes.AsSpan(0, bytes.Length - 1)));
                Assert.Throws<FormatException>(() => GridBytes.FromBytes([9, .. bytes]));
            }
        }, iter: 200);

    [Fact]
    public void AGridSaysWhichLevelsItHolds()
    {
        var grid = Grids.OfCost([1, 2, 3], Table, 0, null);
        Assert.True(grid.Covers([Level.Of(0.5), Level.Of(12.5), Level.Of(99.5)]));
        Assert.False(grid.Covers([Level.Of(80), Level.Of(80.5)]));
        Assert.Null(grid.At(Level.Of(80.5)));
    }

    [Fact]
    public void TheDigestDependsOnEveryFigureAndOnNoOrder()
    {
        var rows = (ScopeResult[])
        [
            new(Scope.Portfolio, Grids.OfFinish([Day, 2 * Day], Table, default, Day, null), Grids.OfCost([1, 2], Table, 1, 2), new(Instants.ToDate(1), 2, 1, 2)),
            new(Scope.OfMilestone("p", "m"), Grids.OfFinish([Day, Instants.Never], Table, new(true, 3), Day, null), null, null),
        ];
        var digest = ResultDigest.Of(rows);
        Assert.Equal(64, digest.Length);
        Assert.Equal(digest, ResultDigest.Of(rows.Reverse()));
        Assert.NotEqual(digest, ResultDigest.Of([rows[0] with { Joint = null }, rows[1]]));
        Assert.NotEqual(digest, ResultDigest.Of([rows[0] with { Cost = null }, rows[1]]));
        Assert.NotEqual(digest, ResultDigest.Of([rows[0], rows[1] with { Finish = Grids.OfFinish([Day, Instants.Never], Table, new(true, 4), Day, null) }]));
        Assert.NotEqual(digest, ResultDigest.Of([rows[0], rows[1] with { Scope = Scope.OfMilestone("p", "n") }]));
        Assert.Equal(Pinned, digest);
    }

    // First value pinned: another digest for the same rows means that old runs no longer agree with new ones.
    private const string Pinned = "995402d5f6119e378ad6d76a5a63d032cf96e21b5b59778c675f9a91637a37d3";
}
