using Portfolio.Model.Documents;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules.WithinProject;

/// <summary>Links to activities of the same project, lags, and exact repeats; links into other projects are checked across parts.</summary>
internal static class LinkRule
{
    public static IEnumerable<Fault> Check(PlacedProject placed)
    {
        var activities = placed.Project.Activities;
        var seen = new HashSet<Link>();
        for (var i = 0; i < activities.Count; i++)
        {
            var links = activities[i].Predecessors;
            seen.Clear();
            for (var k = 0; k < links.Count; k++)
            {
                if (string.IsNullOrEmpty(links[k].Activity)) continue;
                if (One(links[k], seen, placed, i, k) is { } fault) yield return fault;
                if (Math.Abs(links[k].Lag) > Bounds.WorkingDays) yield return Lag(links[k], placed, i, k);
            }
        }
    }

    private static Fault? One(Link link, HashSet<Link> seen, PlacedProject placed, int i, int k)
    {
        var id = placed.Project.Activities[i].Id;
        var (project, activity) = ProjectOutline.Split(link.Activity, placed.Project.Id);
        if (project is null && activity == id) return At(placed, i, k).Fault(RuleCodes.LinkSelf, $"{placed.Name(i)} is linked to itself.");
        if (project is null && !placed.Has(activity))
            return At(placed, i, k).Fault(
                RuleCodes.ActivityUnknown,
                $"{placed.Name(i)} waits for {TextRule.Shown(activity)}, which is no activity of {placed.Project.Id}.");
        return seen.Add(project is null ? link with { Activity = activity } : link)
            ? null
            : At(placed, i, k).Fault(
                RuleCodes.LinkRepeated,
                $"{placed.Name(i)} has the same link to {TextRule.Shown(link.Activity)} twice, with the same type and lag.");
    }

    private static Fault Lag(Link link, PlacedProject placed, int i, int k) =>
        ValueRule.Within(link.Lag, -Bounds.WorkingDays, Bounds.WorkingDays, "lag in working days", RuleCodes.LagRange,
            () => At(placed, i, k).Under("lag"))!;

    private static Place At(PlacedProject placed, int i, int k) => placed.Activity(i).Under("predecessors", k);
}
