using CsCheck;
using MathNet.Numerics.Random;
using Portfolio.Engine.Results;
using Xunit;
using Normal = MathNet.Numerics.Distributions.Normal;

namespace Portfolio.Engine.Tests.Results;

public sealed class ContingencyTests
{
    private const double Scale = 1e6; // minor units to one unit of the published examples
    private static readonly Level P80 = Level.Of(80);
    private static readonly RankTable Table = new([Level.Of(0.5), Level.Of(50), P80, Level.Of(99.5)]);

    /// <summary>
    /// Three joint normals, means 100, 200, 150, sds 20, 50, 30, correlations .3, .1, .2. Total variance 5120; P80 510.22151326644; Euler
    /// shares
    /// Cov(X, T)/Var(T) = .1484375, .60546875, .24609375 (Tasche 1999; values by SciPy). Local fits are unbiased here: E[X | T] is a line.
    /// </summary>
    [Theory]
    [InlineData(100, 200, 150, 8.939130875487, 36.46224436054, 14.820138030413)]
    [InlineData(90, 180, 140, 18.939130875487, 56.46224436054, 24.820138030413)]
    public void ThreeNormalProjectsGetTheirEulerShares(int base1, int base2, int base3, double share1, double share2, double share3)
    {
        const int n = 200_000;
        var (bases, shares) = ((int[])[base1, base2, base3], (double[])[share1, share2, share3]);
        var result = At(P80, ThreeNormals(n), [.. bases.Select(b => (long)(b * Scale))]);
        var sd = Math.Sqrt(5120);
        var se = 1.42876573863094 * sd / Math.Sqrt(n); // √(p(1 − p)/n)/f of a normal at .8
        Assert.Equal(510.22151326644, result.CostAtLevel / Scale, 4 * se);
        // sds sum to 100
        Assert.Equal(534.162123357291 - bases.Sum(), result.SumOfStandalone / Scale, 4 * 1.42876573863094 * 100 / Math.Sqrt(n));
        Assert.Equal(23.940610090851, result.Diversification / Scale, 4 * 1.42876573863094 * 100 / Math.Sqrt(n));
        for (var i = 0; i < 3; i++)
        {
            var allocation = result.Allocations[i];
            // the shares' errors lie between .05 and .3: a 95 % interval of 2.093 se
            Assert.InRange(allocation.Error!.Value / Scale, 0.02, 0.5);
            Assert.Equal(shares[i], allocation.Allocated / Scale, 4 * allocation.Error.Value / Scale / 2.093);
        }
        Assert.Equal(result.Total, result.Allocations.Sum(allocation => allocation.Allocated));
    }

    [Fact] // by hand: rank 8 of 10 is 21; ranks 7 to 9 are (12, 7, 1), (6, 7, 8), (9, 6, 7), whose mean total is 21 as well
    public void TenScenariosShareToTheUnit()
    {
        var result = At(P80, GridTests.TenScenarios, [5, 5, 5]);
        Assert.Equal((15, 21, 6, 9, 3), (result.Base, result.CostAtLevel, result.Total, result.SumOfStandalone, result.Diversification));
        Assert.Equal([4, 2, 0], result.Allocations.Select(allocation => allocation.Allocated)); // 4, 5/3 and 1/3
        Assert.Equal([4, 2, 3], result.Allocations.Select(allocation => allocation.Standalone));
        Assert.Equal(4 / 6.0, result.Allocations[0].Share);
        Assert.Null(result.Allocations[0].Error);
        Assert.Equal((0, 2), (result.Shortfall(7), result.Shortfall(4)));
        Assert.Same(Cautions.Always, Cautions.Of(result));
    }

    [Fact] // costs that lie on a line are found on it, also at the last rank, where the window is one-sided
    public void ALineIsFittedExactly()
    {
        var steps = Enumerable.Range(0, 100).Select(i => i * 37 % 100).ToArray();
        double[][] projects = [[.. steps.Select(i => 3.0 * i + 5)], [.. steps.Select(i => 7.0 * i - 5)]];
        Assert.Equal([302, 688], At(Level.Of(99.5), projects, [0, 0]).Allocations.Select(allocation => allocation.Allocated));
        Assert.Equal([3 * 79 + 5 - 40, 7 * 79 - 5 - 50], At(P80, projects, [40, 50]).Allocations.Select(allocation => allocation.Allocated));
    }

    [Fact] // the two events of probability .15 and impact 100: each P80 is 0, P(neither) = .7225, so the P80 of both is 100
    public void RareRisksUnderAddAndAreWarnedOf()
    {
        var cells = Enumerable.Range(0, 400).ToArray(); // all 20 × 20 combinations, so frequencies are exact
        double[][] projects = [[.. cells.Select(i => i / 20 < 3 ? 100.0 : 0)], [.. cells.Select(i => i % 20 < 3 ? 100.0 : 0)]];
        var result = At(P80, projects, [0, 0]);
        Assert.Equal((100, 0, -100), (result.Total, result.SumOfStandalone, result.Diversification));
        Assert.Equal(100, result.Allocations.Sum(allocation => allocation.Allocated));
        Assert.Equal(
            [CautionCodes.CoversWhatWasEntered, CautionCodes.SamplingIsNotInput, CautionCodes.LevelsUnderAdd],
            Cautions.Of(result).Select(warning => warning.Code));
    }

    /// <summary>Two independent lognormals of mean 100 and sd 40 (convolution by SciPy): P50s make 185.695338177, the P50 of the sum is
    /// 192.35344838; P80s make 256.81208028, the P80 of the sum is 242.8704519.</summary>
    [Fact]
    public void SkewedCostsDoNotAdd()
    {
        const int n = 200_000;
        var s = Math.Sqrt(Math.Log(1.16));
        var normals = Normals(n, 2, 7);
        var projects = normals.Select(z => z.Select(x => Math.Round(Scale * Math.Exp(Math.Log(100) - s * s / 2 + s * x))).ToArray()).ToArray();
        var (p50, p80) = (At(Level.Of(50), projects, [0, 0]), At(P80, projects, [0, 0]));
        const double tolerance = 4 * 1.6 * 80 / 447.2; // se below 1.6 sd/√n for these densities, sds sum to 80
        Assert.Equal((185.695338177, 192.35344838), (p50.SumOfStandalone / Scale, p50.Total / Scale), Within(tolerance));
        Assert.Equal((256.81208028, 242.8704519), (p80.SumOfStandalone / Scale, p80.Total / Scale), Within(tolerance));
        Assert.Contains(Cautions.Of(p50), warning => warning.Code == CautionCodes.LevelsUnderAdd);
    }

    [Fact]
    public void MoneyAddsUpAtEveryLevelAndGrouping() =>
        Gen.Select(Gen.Int[1, 60], Gen.Int[1, 7], Gen.Int[0, 1_000_000]).Sample((n, count, seed) =>
        {
            var random = new MersenneTwister(seed);
            var coarse = seed % 3 == 0 ? 1e7 : 1; // ties and constant totals
            var projects = Enumerable.Range(0, count).Select(_ => Enumerable.Range(0, n).Select(_ => Math.Floor(random.Next(10_000_000) / coarse) - 3).ToArray()).ToArray();
            long[] bases = [.. projects.Select(_ => (long)random.Next(9_000_000))];
            var grids = projects.Select((costs, i) => Grids.OfCost(costs, Table, bases[i], null)).ToArray();
            var (all, odd, even) = (new ScopeSamples(n), new ScopeSamples(n), new ScopeSamples(n));
            for (var i = 0; i < count; i++)
                foreach (var group in (ScopeSamples[])[all, i % 2 == 0 ? even : odd]) group.Add(new int[n], projects[i], (long)grids[i].Mean);
            Assert.Equal(all.MeanOfParts, odd.MeanOfParts + even.MeanOfParts);
            for (var k = 0; k < n; k++) Assert.Equal(all.Costs[k], odd.Costs[k] + even.Costs[k]);
            foreach (var level in Table.Levels)
            {
                var result = At(level, projects, bases);
                Assert.Equal(result.Total, result.Allocations.Sum(allocation => allocation.Allocated));
                Assert.Equal(result.Diversification, result.Allocations.Sum(allocation => allocation.Standalone - allocation.Allocated));
                Assert.Equal(bases.Sum(), result.Base);
                Assert.Equal(n < 20, result.Allocations[0].Error is null);
                if (count == 1) Assert.Equal(result.Allocations[0].Standalone, result.Allocations[0].Allocated);
            }
        }, iter: 300);

    [Fact]
    public void ATotalWithoutSpreadIsSharedByTheMeans()
    {
        double[][] projects = [[1, 3, 1, 3], [3, 1, 3, 1]];
        // n/10 < 1: the one iteration at rank 2, ties in their order
        Assert.Equal([3, 1], At(Level.Of(50), projects, [0, 0]).Allocations.Select(allocation => allocation.Allocated));
        var wide = projects.Select(costs => Enumerable.Repeat(costs, 10).SelectMany(x => x).ToArray()).ToArray();
        Assert.Equal(4, At(Level.Of(50), wide, [0, 0]).Allocations.Sum(allocation => allocation.Allocated));
        Assert.Null(At(Level.Of(50), projects, [2, 2]).Allocations[0].Share);
    }

    [Fact]
    public void BytesGiveTheSharesBack()
    {
        var projects = ThreeNormals(100);
        foreach (var shares in Allocate(projects, [1, 2, 3]).Concat(Allocate([.. projects.Select(costs => costs[..15])], [1, 2, 3])))
        {
            var bytes = shares.ToBytes();
            Assert.Equal(shares.Shares, AllocatedCost.FromBytes(bytes).Shares);
            Assert.Throws<FormatException>(() => AllocatedCost.FromBytes(bytes.AsSpan(1)));
            Assert.Throws<FormatException>(() => AllocatedCost.FromBytes(bytes.AsSpan(0, bytes.Length - 1)));
        }
    }

    internal static double[][] Normals(int n, int count, int seed)
    {
        var generator = new MersenneTwister(seed);
        var normals = Enumerable.Range(0, count).Select(_ => new double[n]).ToArray();
        foreach (var series in normals) Normal.Samples(generator, series, 0, 1);
        return normals;
    }

    private static double[][] ThreeNormals(int n)
    {
        var z = Normals(n, 3, 20261201);
        var c = Math.Sqrt(1 - 0.3 * 0.3); // Cholesky factor of the correlations
        var d = (0.2 - 0.3 * 0.1) / c;
        var e = Math.Sqrt(1 - 0.1 * 0.1 - d * d);
        return
        [
            [.. Enumerable.Range(0, n).Select(i => Math.Round(Scale * (100 + 20 * z[0][i])))],
            [.. Enumerable.Range(0, n).Select(i => Math.Round(Scale * (200 + 50 * (0.3 * z[0][i] + c * z[1][i]))))],
            [.. Enumerable.Range(0, n).Select(i => Math.Round(Scale * (150 + 30 * (0.1 * z[0][i] + d * z[1][i] + e * z[2][i]))))],
        ];
    }

    private static ScopeSamples Together(double[][] projects)
    {
        var all = new ScopeSamples(projects[0].Length);
        foreach (var costs in projects) all.Add(new int[costs.Length], costs, 0);
        return all;
    }

    private static IReadOnlyList<AllocatedCost> Allocate(double[][] projects, long[] bases)
    {
        var allocation = new CostAllocation(Together(projects).Costs, Table.Levels);
        for (var i = 0; i < projects.Length; i++) allocation.Add(projects[i], bases[i]);
        return allocation.Close();
    }

    private static Contingency At(Level level, double[][] projects, long[] bases)
    {
        var allocated = Allocate(projects, bases);
        var parts = projects.Select((costs, i) => new ProjectCost($"p{i}", Grids.OfCost(costs, Table, bases[i], null), allocated[i])).ToArray();
        return Contingency.At(level, Grids.OfCost(Together(projects).Costs, Table, bases.Sum(), null), parts)!;
    }

    private static EqualityComparer<(double, double)> Within(double tolerance) => EqualityComparer<(double, double)>.Create(
        (a, b) => Math.Abs(a.Item1 - b.Item1) <= tolerance && Math.Abs(a.Item2 - b.Item2) <= tolerance);
}
