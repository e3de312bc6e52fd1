using System.Security.Cryptography;
using System.Text;
using System.Text.Json;
using Portfolio.Engine.Results;
using Portfolio.Server.Contracts.Results;
using Portfolio.Server.Results;
using Portfolio.Store.Runs;
using Portfolio.Store.Samples;

namespace Portfolio.Server.Tests.Results;

public sealed class FinishedRunTests
{
    [Fact]
    public void RowsStandInOrderAndProjectsWithoutActivitiesHaveNone()
    {
        var result = SmallPortfolio.Finish(SmallPortfolio.Plan(), SmallPortfolio.Facts());
        string[] expected =
            ["portfolio", "programme/locks", "programme/harbour", "project/weir", "project/quay", "project/pumps", "milestone/weir/M", "milestone/quay/S"];
        Assert.Equal(expected, result.Rows.Select(row => row.Scope));
        Assert.Equal(expected, result.Grids.Select(grid => grid.Scope).Distinct());
        Assert.Equal(2 * expected.Length - 2, result.Grids.Count); // milestones have no cost
    }

    [Fact]
    public void MoneyAddsUpOverProjectsProgrammesAndAllocations()
    {
        var result = SmallPortfolio.Finish(SmallPortfolio.Plan(), SmallPortfolio.Facts());
        var rows = Rows(result);
        foreach (var figure in new Func<CostJson, decimal>[] { cost => cost.Base, cost => cost.Mean })
        {
            var projects = rows.Values.Where(row => row.Scope.StartsWith("project/", StringComparison.Ordinal));
            Assert.Equal(figure(rows["portfolio"].Cost!), projects.Sum(row => figure(row.Cost!)));
            Assert.Equal(figure(rows["programme/locks"].Cost!), figure(rows["project/weir"].Cost!) + figure(rows["project/pumps"].Cost!));
        }
        Assert.Equal(102, result.Allocations.Count); // 0.5, 1…99, 99.5 and the configured 82.5
        foreach (var allocation in result.Allocations.Select(row => ContingencyBytes.FromBytes(row.Bytes)))
            Assert.Equal(allocation.Total, allocation.Allocations.Sum(line => line.Allocated));
        var at80 = ContingencyBytes.FromBytes(result.Allocations.Single(row => row.Level == 80).Bytes);
        Assert.Equal(rows["portfolio"].Cost!.Percentiles.Single(at => at.P == 80).Value - rows["portfolio"].Cost!.Base, at80.Total / 100m);
    }

    [Fact]
    public void RowsTellWhatTheIterationsSay()
    {
        var (plan, facts) = (SmallPortfolio.Plan(), SmallPortfolio.Facts());
        var samples = SmallPortfolio.Samples(plan, facts);
        var row = Rows(FinishedRun.Build(plan, samples, facts, TestContext.Current.CancellationToken))["project/weir"];
        var finishes = samples.Minutes(SeriesNames.Finish("weir"))!;
        var costs = samples.Money(SeriesNames.Cost("weir"))!;
        var (sortedFinishes, sortedCosts) = (finishes.Order().ToArray(), costs.Order().ToArray());
        // k-th smallest with k = ⌈82.5 · 5000 / 100⌉ = 4125; a finish belongs to the day that ends at or after it.
        Assert.Equal(DateOfFinish(sortedFinishes[4124]), row.Finish.Percentiles.Single(at => at.P == 82.5m).Value);
        Assert.Equal((decimal)sortedCosts[4124] / 100, row.Cost!.Percentiles.Single(at => at.P == 82.5m).Value);
        var onTime = finishes.Select(finish => DateOfFinish(finish) <= new DateOnly(2027, 4, 30)).ToArray();
        var within = costs.Select(cost => cost <= 12_000_000).ToArray();
        Assert.Equal(onTime.Count(kept => kept) / 5000.0, row.Finish.Commitment!.Probability);
        Assert.Equal(within.Count(kept => kept) / 5000.0, row.Cost.Commitment!.Probability);
        Assert.Equal(onTime.Zip(within).Count(both => both.First && both.Second) / 5000.0, row.Joint!.Probability);
        Assert.InRange(row.Joint.Probability, 0.01, 0.99); // so that the comparison above says something
    }

    [Fact]
    public void OnlyAMilestoneInABranchTellsHowOftenItHappens()
    {
        var (plan, facts) = (SmallPortfolio.Plan(), SmallPortfolio.Facts());
        var samples = SmallPortfolio.Samples(plan, facts);
        var rows = Rows(FinishedRun.Build(plan, samples, facts, TestContext.Current.CancellationToken));
        var happens = samples.Minutes(SeriesNames.Milestone("quay", "S"))!.Count(finish => finish != Instants.Never) / 5000.0;
        Assert.Equal(happens, rows["milestone/quay/S"].Happens);
        Assert.InRange(happens, 0.3 - 4 * 0.0065, 0.3 + 4 * 0.0065); // four standard errors, √(0.3 · 0.7 / 5000) = 0.0065
        Assert.Null(rows["milestone/quay/S"].Finish.Base); // the likelier branch is without it
        Assert.All(rows.Values.Where(row => row.Scope != "milestone/quay/S"), row => Assert.Null(row.Happens));
    }

    [Fact]
    public void EqualRunsAgreeWhateverTheirIdAndThreads()
    {
        var plan = SmallPortfolio.Plan();
        var first = SmallPortfolio.Finish(plan, SmallPortfolio.Facts(), threads: 1);
        var facts = SmallPortfolio.Facts("0190a6f0-0000-7000-8000-000000000002") with { AsOf = new(2026, 12, 2), Revision = 8 };
        var second = SmallPortfolio.Finish(SmallPortfolio.Plan(), facts, threads: 3);
        Assert.Equal(first.ResultDigest, second.ResultDigest);
        Assert.Equal(first.InputsDigest, second.InputsDigest);
        Assert.Equal(first.Grids.Select(grid => grid.Bytes), second.Grids.Select(grid => grid.Bytes));
        Assert.Equal(first.Allocations.Select(row => row.Bytes), second.Allocations.Select(row => row.Bytes));
        var other = SmallPortfolio.Finish(plan, SmallPortfolio.Facts(seed: 2));
        Assert.NotEqual(first.ResultDigest, other.ResultDigest);
        Assert.NotEqual(first.InputsDigest, other.InputsDigest);
    }

    [Fact]
    public void InputsDigestIsOverOneLineForEachInput()
    {
        var text = "engine 1\nseed 1\niterations 5000\npart aa\npart bb\n";
        Assert.Equal(Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(text))), InputsDigest.Of(SmallPortfolio.Facts(), "1"));
    }

    [Fact]
    public void AMissingSeriesStopsTheBuild()
    {
        var (plan, facts) = (SmallPortfolio.Plan(), SmallPortfolio.Facts());
        var samples = SmallPortfolio.Samples(plan, facts);
        var holed = samples with { Minutes = series => series == SeriesNames.Finish("quay") ? null : samples.Minutes(series) };
        var missing = Assert.Throws<InvalidOperationException>(() => FinishedRun.Build(plan, holed, facts, TestContext.Current.CancellationToken));
        Assert.Contains("finish/quay", missing.Message, StringComparison.Ordinal);
    }

    internal static Dictionary<string, ResultJson> Rows(RunResult result) => result.Rows
        .Select(row => JsonSerializer.Deserialize(row.Json, ResultsContext.Plain.ResultJson)!).ToDictionary(row => row.Scope);

    private static DateOnly DateOfFinish(int minutes) => new DateOnly(1970, 1, 1).AddDays((int)Math.Ceiling(minutes / 1440.0) - 1);
}
