using Portfolio.Model.Documents;
using Portfolio.Model.Faults;
using Portfolio.Model.Rules.WithinProject;

namespace Portfolio.Model.Rules;

/// <summary>Everything one project can break on its own or against the settings, without looking at any other project.</summary>
public static class ProjectRules
{
    /// <param name="project">As read; what could not be read is passed over.</param>
    /// <param name="outline">Outline of the same project.</param>
    /// <param name="context">What it may refer to.</param>
    /// <param name="path">Pointer of the project in what was sent: <c>/projects/3</c> in a document, "" when sent alone; null: not sent
    /// but stored.</param>
    /// <param name="sent">
    /// Places of the activities that were sent where the others are stored: a circle is reported at a link of one of them. Null: all.
    /// </param>
    /// <returns>All faults, in no particular order.</returns>
    public static IEnumerable<Fault> Check(
        Project project, ProjectOutline outline, PortfolioContext context, string? path, IReadOnlySet<int>? sent = null)
    {
        var placed = new PlacedProject(project, outline, context, path, sent);
        return
        [
            .. ProjectRule.Check(placed),
            .. Ids.Check(project.Activities, a => a.Id, "activity", placed.Activity),
            .. ActivityTextRule.Check(placed),
            .. MilestoneRule.Check(placed),
            .. ProgressRule.Check(placed),
            .. EstimateRule.Check(placed),
            .. LinkRule.Check(placed),
            .. CycleRule.Check(placed),
            .. DemandRule.Check(placed),
            .. ReferenceRule.Check(placed),
            .. RiskEventRule.Check(project.RiskEvents, EventOwner.OfProject(placed)),
            .. ChanceBranchRule.Check(placed),
        ];
    }
}
