using Portfolio.Model.Distributions;
using Portfolio.Model.Documents;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Tests.Rules;

public sealed class LargeDocumentTests
{
    [Fact]
    public void Fifty_thousand_sound_activities_give_no_fault() => Assert.Empty(Sound.FaultsOf(Large(200, 250)));

    [Fact]
    public void One_mistake_among_fifty_thousand_activities_is_found()
    {
        var document = Large(200, 250);
        var last = document.Projects[^1];
        var broken = last with { Activities = [.. last.Activities.SkipLast(1), last.Activities[^1] with { Predecessors = [new("p0/A999")] }] };
        var fault = Assert.Single(Sound.FaultsOf(document with { Projects = [.. document.Projects.SkipLast(1), broken] }));
        Assert.Equal(("/projects/199/activities/249/predecessors/0", RuleCodes.ActivityUnknown), (fault.Path, fault.Code));
    }

    [Fact]
    public void A_circle_through_every_project_is_named_whole()
    {
        var document = Large(50, 20);
        var first = document.Projects[0];
        var closed = first with { Activities = [first.Activities[0] with { Predecessors = [new("p49/A0")] }, .. first.Activities.Skip(1)] };
        var fault = Assert.Single(Sound.FaultsOf(document with { Projects = [closed, .. document.Projects.Skip(1)] }));
        Assert.Equal(51, fault.Message.Split(" → ").Length);
    }

    /// <summary>Chains of activities; the first of each project waits for the first of the project before.</summary>
    private static PortfolioDocument Large(int projects, int activities) =>
        new(Sound.Settings with { Dependence = new(), RiskEvents = [], ProgrammeCommitments = new Dictionary<string, Commitments>() },
            [.. Enumerable.Range(0, projects).Select(p => new Project
            {
                Id = "p" + p,
                StatusDate = Sound.Status,
                Drivers = ["prices"],
                Activities = [.. Enumerable.Range(0, activities).Select(a => Work(p, a))],
            })]);

    private static Activity Work(int project, int activity) =>
        (activity > 1 ? Sound.Work("A" + activity, $"A{activity - 1}", $"A{activity - 2}")
            : activity == 1 ? Sound.Work("A1", "A0")
            : project > 0 ? Sound.Work("A0", $"p{project - 1}/A0")
            : Sound.Work("A0")) with
        {
            Name = $"Section {activity}",
            Drivers = ["ground"],
            Demands = activity % 3 == 0 ? [new("rig", 2)] : [],
            Cost = new(new Triangular(80_000, 100_000, 150_000), new Normal(2_000, 100), 0),
        };
}
