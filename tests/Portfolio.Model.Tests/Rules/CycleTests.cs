using CsCheck;
using Portfolio.Model.Documents;

namespace Portfolio.Model.Tests.Rules;

public sealed class CycleTests
{
    [Fact]
    public void A_cycle_is_named_activity_by_activity()
    {
        var fault = Assert.Single(Sound.FaultsOf(Quay(Sound.Work("C"), Sound.Work("D", "F", "C"), Sound.Work("E", "D"), Sound.Work("F", "E"), Sound.Work("G", "F"))));
        Assert.Equal("These activities wait for each other in a circle: D → E → F → D.", fault.Message);
        Assert.Equal(("/projects/1/activities/1/predecessors/0", "quay/D"), (fault.Path, fault.Subject));
    }

    [Fact]
    public void Every_knot_is_reported_once_and_by_a_shortest_circle()
    {
        var faults = Sound.FaultsOf(Quay(
            Sound.Work("A", "C", "B"), Sound.Work("B", "A"), Sound.Work("C", "B"), Sound.Work("M", "A"), Sound.Work("X", "Y", "M"), Sound.Work("Y", "X")));
        Assert.Equal(2, faults.Count);
        Assert.Contains("A → B → C → A", faults[0].Message);
        Assert.Contains("X → Y → X", faults[1].Message);
    }

    [Fact]
    public void A_cycle_through_two_projects_is_named_with_them()
    {
        var fault = Assert.Single(Sound.FaultsOf(Sound.WithActivity(0, a => a with { Predecessors = [new("quay/B20", LinkType.FinishToFinish, -2)] })));
        Assert.Equal("These activities wait for each other in a circle: weir-lock/A10 → quay/B10 → quay/B20 → weir-lock/A10.", fault.Message);
    }

    [Fact]
    public void A_circle_inside_one_project_is_not_reported_again_across_projects()
    {
        var fault = Assert.Single(Sound.FaultsOf(Quay(Sound.Work("B10", "weir-lock/A10", "B20"), Sound.Work("B20", "B10"))));
        Assert.Equal("quay/B10", fault.Subject);
        Assert.Contains("circle: B10 → B20 → B10", fault.Message);
    }

    [Fact]
    public void A_circle_is_found_exactly_where_activities_reach_each_other() =>
        Gen.Select(Gen.Int[0, 7], Gen.Int[0, 7]).List[0, 14].Sample(drawn =>
        {
            var links = drawn.Where(l => l.Item1 != l.Item2).Distinct().ToList();
            var faults = Sound.FaultsOf(Quay([.. Enumerable.Range(0, 8).Select(i =>
                Sound.Work($"A{i}", [.. links.Where(l => l.Item2 == i).Select(l => $"A{l.Item1}")]))]));
            foreach (var fault in faults)
            {
                var circle = fault.Message[(fault.Message.IndexOf(':') + 2)..^1].Split(" → ").Select(name => name[1] - '0').ToList();
                Assert.All(circle.Zip(circle.Skip(1)), link => Assert.Contains(link, links));
                Assert.Equal(circle[0], circle[^1]);
            }

            Assert.Equal(Knots(links), faults.Count);
        });

    /// <summary>Sets of nodes that reach each other, by Warshall's transitive closure (Journal of the ACM 9, 1962).</summary>
    private static int Knots(List<(int From, int To)> links)
    {
        var reach = new bool[8, 8];
        foreach (var (from, to) in links) reach[from, to] = true;
        for (var k = 0; k < 8; k++)
            for (var i = 0; i < 8; i++)
                for (var j = 0; j < 8; j++)
                    reach[i, j] |= reach[i, k] && reach[k, j];
        return Enumerable.Range(0, 8).Count(i => reach[i, i] && !Enumerable.Range(0, i).Any(j => reach[i, j] && reach[j, i]));
    }

    private static PortfolioDocument Quay(params Activity[] activities) =>
        new(Sound.Settings with { Dependence = new(), RiskEvents = [] }, [Sound.WeirLock, Sound.Quay with { Activities = activities }]);
}
