using Portfolio.Model.Distributions;
using Portfolio.Model.Documents;
using Portfolio.Server.Demo;

namespace Portfolio.Server.Tests.Demo;

/// <summary>What the demo portfolio promises to show, in its first week.</summary>
public class DemoDocumentTests
{
    private static readonly PortfolioDocument First = DemoWeeks.Model(DemoHistory.Weeks(new DateOnly(2026, 12, 1))[0]);

    [Fact]
    public void Twelve_projects_of_25_to_60_activities_in_four_programmes()
    {
        Assert.Equal(12, First.Projects.Count);
        Assert.All(First.Projects, project => Assert.InRange(project.Activities.Count, 25, 60));
        Assert.Equal(4, First.Projects.Select(project => project.Programme).Distinct().Count());
    }

    [Fact]
    public void Five_pools_and_each_is_wanted_by_several_projects()
    {
        Assert.Equal(5, First.Settings.Pools.Count);
        Assert.All(First.Settings.Pools, pool => Assert.True(
            First.Projects.Count(project => project.Activities.Any(activity => activity.Demands.Any(demand => demand.Pool == pool.Id))) >= 3
            || pool.Id == "dredging-plant", pool.Id));
    }

    [Fact]
    public void Eight_drivers_all_in_use_with_correlations_of_every_kind()
    {
        var used = First.Projects
            .SelectMany(project => project.Drivers.Concat(project.Activities.SelectMany(activity => activity.Drivers))).ToHashSet();
        Assert.Equal(8, First.Settings.Drivers.Count);
        Assert.All(First.Settings.Drivers, driver => Assert.Contains(driver.Id, used));
        Assert.True(First.Settings.Dependence.BetweenProjects > 0);
        Assert.True(First.Settings.Dependence.WithinProgramme > First.Settings.Dependence.BetweenProjects);
        Assert.NotEmpty(First.Settings.Dependence.Pairs);
        Assert.All(First.Projects, project => Assert.True(project.Correlation > 0, project.Id));
    }

    [Fact]
    public void Thirty_risk_events_with_responses_some_of_them_taken()
    {
        var risks = First.Settings.RiskEvents.Concat(First.Projects.SelectMany(project => project.RiskEvents)).ToList();
        var responses = risks.SelectMany(risk => risk.Responses).ToList();
        Assert.Equal(30, risks.Count);
        Assert.Contains(responses, response => response.Taken);
        Assert.Contains(responses, response => !response.Taken);
    }

    [Fact]
    public void Chance_branches_links_between_projects_calendars_and_tags()
    {
        Assert.True(First.Projects.Count(project => project.ChanceBranches.Count > 0) >= 5);
        Assert.True(First.Projects.SelectMany(project => project.Activities).SelectMany(activity => activity.Predecessors)
            .Count(link => link.Activity.Contains('/')) >= 5);
        Assert.True(First.Settings.Calendars.Count >= 3);
        Assert.All(First.Projects, project => Assert.Equal(["funding", "region"], project.Tags.Keys));
    }

    [Fact]
    public void Commitments_at_every_level()
    {
        Assert.NotNull(First.Settings.Commitments);
        Assert.Equal(4, First.Settings.ProgrammeCommitments.Count);
        Assert.All(First.Projects, project => Assert.True(project.Commitments is { Finish: not null, Budget: > 0 }, project.Id));
        Assert.All(First.Projects, project =>
            Assert.Contains(project.Activities, activity => activity is { Milestone: true, Commitment: not null }));
        Assert.Equal(First.Settings.Commitments!.Budget, First.Projects.Sum(project => project.Commitments!.Budget));
        Assert.InRange(First.Settings.Commitments.Budget!.Value, 200_000_000m, 900_000_000m);
    }

    [Fact]
    public void Estimates_of_all_eight_types_on_activities()
    {
        var types = First.Projects.SelectMany(project => project.Activities).Select(activity => activity.Duration switch
        {
            LognormalByMoments or LognormalByPercentiles => "Lognormal",
            var duration => duration?.GetType().Name,
        }).OfType<string>().Distinct();
        Assert.Equal(
            ["Constant", "Discrete", "Lognormal", "Normal", "Percentiles", "Pert", "Triangular", "Uniform"],
            types.Order(StringComparer.Ordinal));
    }
}
