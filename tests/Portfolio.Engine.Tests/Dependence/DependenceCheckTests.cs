using Portfolio.Engine.Dependence;
using Portfolio.Model.Documents;
using Xunit;

namespace Portfolio.Engine.Tests.Dependence;

public sealed class DependenceCheckTests
{
    private static readonly RankPair[] Contradicting =
        [new("driver/a", "driver/b", 0.9), new("driver/a", "driver/c", 0.9), new("driver/b", "driver/c", -0.9), new("driver/d", "driver/c", 0.001)];

    [Fact]
    public void A_contradiction_names_its_eigenvalue_and_pairs()
    {
        var fault = Assert.Single(DependenceCheck.Check(DependenceModelTests.Stated(["a", "b", "c", "d"], 0, null, Contradicting), []));
        Assert.Equal(("/settings/dependence", "settings", "dependence.not-positive"), (fault.Path, fault.Subject, fault.Code));
        Assert.Contains("eigenvalue -0.815962", fault.Message); // 1 − 2·(2·sin(.15π)) = 1 − 2·0.907981
        Assert.Contains("driver/a with driver/b (0.9)", fault.Message);
        Assert.Contains("driver/b with driver/c (-0.9)", fault.Message);
        Assert.DoesNotContain("driver/d", fault.Message);
    }

    [Fact]
    public void Nothing_is_refused_that_shall_be_repaired()
    {
        var settings = DependenceModelTests.Stated(["a", "b", "c", "d"], 0, null, Contradicting);
        Assert.Empty(DependenceCheck.Check(settings with { Dependence = settings.Dependence with { Repair = MatrixRepair.Nearest } }, []));
    }

    [Theory]
    [InlineData(0.69, 0)] // .69 and .69 load .706² + .706² < 1
    [InlineData(0.72, 1)] // .736² + .736² > 1
    public void Loadings_leave_room_for_the_rest(double rank, int faults)
    {
        var settings = DependenceModelTests.Stated(["a"], 0, 0.5, new RankPair("driver/a", "portfolio", rank), new RankPair("driver/a", "programme/north", rank));
        Project[] projects = [new() { Id = "p", Programme = "north", StatusDate = new DateOnly(2026, 12, 1) }];
        Assert.Equal(faults, DependenceCheck.Check(settings, projects).Count);
        var nearest = settings with { Dependence = settings.Dependence with { Repair = MatrixRepair.Nearest } };
        Assert.Equal(faults, DependenceCheck.Check(nearest, projects).Count);
    }

    // The background already ties the two: a pair of rank −1 cannot hold for what it leaves.
    [Fact]
    public void A_pair_against_the_background_is_refused()
    {
        Project[] projects = [.. "pq".Select(id => new Project { Id = id.ToString(), StatusDate = new DateOnly(2026, 12, 1) })];
        var pair = new RankPair("project/p", "project/q", -1);
        Assert.Single(DependenceCheck.Check(DependenceModelTests.Stated([], 0.3, null, pair), projects));
        Assert.Empty(DependenceCheck.Check(DependenceModelTests.Stated([], 0, null, pair), projects));
    }

    [Fact]
    public void Unknown_nodes_are_passed_over() =>
        Assert.Empty(DependenceCheck.Check(DependenceModelTests.Stated(["a"], 0, null, new RankPair("driver/a", "driver/z", 1), new RankPair("nowhere", "project/z", 1)), []));
}
