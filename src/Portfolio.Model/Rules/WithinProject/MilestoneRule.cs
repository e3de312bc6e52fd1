using Portfolio.Model.Documents;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules.WithinProject;

/// <summary>A milestone has no duration, remaining work, cost, demand or start; only a milestone has a commitment.</summary>
internal static class MilestoneRule
{
    public static IEnumerable<Fault> Check(PlacedProject placed)
    {
        var activities = placed.Project.Activities;
        for (var i = 0; i < activities.Count; i++)
        {
            var activity = activities[i];
            if (activity.Milestone)
                foreach (var (member, what) in Work(activity))
                    yield return placed.Activity(i).Under(member).Fault(RuleCodes.MilestoneWork,
                        $"{placed.Name(i)} is a milestone and cannot have {what}.");
            if (activity.Milestone && activity.ActualStart is not null)
                yield return placed.Activity(i).Under("actualStart").Fault(
                    RuleCodes.MilestoneStart, $"{placed.Name(i)} is a milestone: it has no start, only an actual finish.");
            if (activity.Commitment is not { } promised) continue;
            if (!activity.Milestone)
                yield return placed.Activity(i).Under("commitment").Fault(
                    RuleCodes.CommitmentPlace, $"Only a milestone can carry a commitment, and {placed.Name(i)} is none.");
            var index = i;
            if (ValueRule.Date(promised, () => placed.Activity(index).Under("commitment")) is { } range) yield return range;
        }
    }

    private static IEnumerable<(string Member, string What)> Work(Activity milestone)
    {
        if (milestone.Duration is not null) yield return ("duration", "a duration");
        if (milestone.Cost is not null) yield return ("cost", "a cost");
        if (milestone.Demands.Count > 0) yield return ("demands", "demands on pools");
        if (milestone.Remaining is not null) yield return ("remaining", "remaining work");
    }
}
