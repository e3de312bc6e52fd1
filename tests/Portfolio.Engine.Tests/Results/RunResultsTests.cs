using Portfolio.Engine.Results;
using Portfolio.Model.Documents;
using Xunit;

namespace Portfolio.Engine.Tests.Results;

/// <summary>
/// Three projects over the ten scenarios whose totals are worked out by hand in <see cref="GridTests"/>, and one without activities.
/// </summary>
public sealed class RunResultsTests
{
    private const int Day = Instants.MinutesPerDay;
    private static readonly IReadOnlyList<Level> Levels = Level.KeptAnd([]);

    private static readonly PortfolioDocument Document = new(
        new Settings
        {
            Name = "Harbour works",
            Currency = "JPY",
            Commitments = new(Instants.ToDate(10), 20),
            ProgrammeCommitments = new Dictionary<string, Commitments> { ["quays"] = new(null, 12) },
        },
        [ProjectOf("lock", "quays"), ProjectOf("empty", "roads") with { Activities = [] }, ProjectOf("mole", null), ProjectOf("berth", "quays")]);

    [Fact]
    public void RowsComeInTheirOrderAndProjectsWithoutActivitiesNowhere() =>
        Assert.Equal(
            ["portfolio", "programme/quays", "project/lock", "milestone/lock/M", "project/mole", "milestone/mole/M", "project/berth", "milestone/berth/M"],
            Run().Rows.Select(row => row.Scope.ToString()));

    [Fact]
    public void LargerScopesAreMaximaAndSumsOfIterations()
    {
        var rows = Run().Rows.ToDictionary(row => row.Scope.ToString());
        var portfolio = rows["portfolio"];
        Assert.Equal(21, portfolio.Cost!.At(Level.Of(80))!.Value.Value);
        Assert.Equal(new Reference(15, 4), portfolio.Cost.Base);
        Assert.Equal(0.7, portfolio.Cost.Probability(portfolio.Cost.Commitment));
        Assert.Equal(rows["project/lock"].Cost!.Mean + rows["project/mole"].Cost!.Mean + rows["project/berth"].Cost!.Mean, portfolio.Cost.Mean);
        Assert.Equal(13, rows["programme/quays"].Cost!.At(Level.Of(50))!.Value.Value); // 13, 6, 14, 13, 13, 5, 14, 6, 16, 15
        Assert.Equal(12, rows["programme/quays"].Cost!.Commitment!.Value.Value);

        // finish of a scenario: the greatest of its three costs, in days: 10, 9, 8, 9, 12, 3, 8, 5, 9, 10
        Assert.Equal(9 * Day, portfolio.Finish.At(Level.Of(50))!.Value.Value);
        Assert.Equal(5 * Day, portfolio.Finish.At(Level.Of(20))!.Value.Value);
        // 12 days end on day 11, promised is day 10
        Assert.Equal(0.9, FinishSummary.Of(portfolio.Finish, [Level.Of(50)]).CommitmentProbability);
    }

    [Fact] // seven scenarios cost no more than 20, one of them takes 12 days
    public void JointIsThereOnlyForADateAndABudget()
    {
        var rows = Run().Rows;
        Assert.Equal([true, false, false, false, false, false, false, false], rows.Select(row => row.Joint is not null));
        Assert.Equal((6, 10), (rows[0].Joint!.Kept, rows[0].Joint!.Iterations));
    }

    [Fact]
    public void SharesAreThoseOfTheContingency()
    {
        var run = Run();
        var result = Contingency.At(Level.Of(80), run.Rows[0].Cost!, run.Projects)!;
        Assert.Equal(["lock", "mole", "berth"], result.Allocations.Select(allocation => allocation.Project));
        Assert.Equal((6, 9), (result.Total, result.SumOfStandalone));
        var bytes = ContingencyBytes.ToBytes(result);
        var back = ContingencyBytes.FromBytes(bytes);
        Assert.Equal(result.Allocations, back.Allocations);
        Assert.Equal((result.Level, result.Base, result.CostAtLevel, result.Diversification), (back.Level, back.Base, back.CostAtLevel, back.Diversification));
        Assert.Throws<FormatException>(() => ContingencyBytes.FromBytes(bytes.AsSpan(0, bytes.Length - 1)));
        Assert.Throws<FormatException>(() => ContingencyBytes.FromBytes([.. bytes, 0]));
    }

    [Fact]
    public void EqualSamplesGiveEqualDigestsAndOthersOthers()
    {
        Assert.Equal(Run().Digest, Run().Digest);
        Assert.NotEqual(Run().Digest, Run(shift: 1).Digest);
    }

    [Fact]
    public void ACancelledRunStops()
    {
        using var source = new CancellationTokenSource();
        source.Cancel();
        Assert.Throws<OperationCanceledException>(() => RunResults.Of(Document, Source(0), Levels, source.Token));
    }

    private static RunResults Run(int shift = 0) => RunResults.Of(Document, Source(shift), Levels, CancellationToken.None);

    private static SampleSource Source(int shift) => new(
        10,
        p => new(FinishesOf(p), GridTests.TenScenarios[PlaceOf(p)].Select(cost => cost + shift).ToArray(), 4 * Day, 5),
        (p, _) => new(FinishesOf(p), Instants.Never));

    private static int PlaceOf(int project) => project == 0 ? 0 : project - 1;

    private static int[] FinishesOf(int project) => [.. GridTests.TenScenarios[PlaceOf(project)].Select(cost => (int)cost * Day)];

    private static Project ProjectOf(string id, string? programme) => new()
    {
        Id = id, Programme = programme, StatusDate = new(1970, 1, 1), Activities = [new() { Id = "A" }, new() { Id = "M", Milestone = true, Predecessors = [new("A")] }],
    };
}
