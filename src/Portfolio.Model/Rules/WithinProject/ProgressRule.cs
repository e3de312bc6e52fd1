using Portfolio.Model.Documents;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules.WithinProject;

/// <summary>Dates of an activity and what its progress needs; milestones have a rule of their own for what they may not have.</summary>
internal static class ProgressRule
{
    public static IEnumerable<Fault> Check(PlacedProject placed)
    {
        var activities = placed.Project.Activities;
        for (var i = 0; i < activities.Count; i++)
        {
            var activity = activities[i];
            if (activity.EarliestStart is not null && Range(placed, i, activity.EarliestStart, "earliestStart") is { } range)
                yield return range;
            if (!activity.Milestone && activity is not { Started: false, Duration: not null, Remaining: null })
                foreach (var fault in Estimates(activity, placed, i))
                    yield return fault;
            if (!activity.Started) continue;
            foreach (var fault in Actuals(activity, placed, i)) yield return fault;
        }
    }

    private static IEnumerable<Fault> Estimates(Activity activity, PlacedProject placed, int i)
    {
        if (activity.Duration is null && !activity.Finished)
            yield return placed.Activity(i).Fault(RuleCodes.DurationMissing,
                $"{placed.Name(i)} has no duration; only milestones and finished work can do without.");
        if (activity.Remaining is null && activity.UnderWay)
            yield return placed.Activity(i).Fault(
                RuleCodes.RemainingMissing, $"{placed.Name(i)} has started and is not finished, so it must say how much work is remaining.");
        if (activity.Remaining is not null && activity.Finished)
            yield return placed.Activity(i).Under("remaining").Fault(RuleCodes.RemainingFinished,
                $"{placed.Name(i)} is finished, so no work can be remaining.");
        if (activity.Remaining is not null && !activity.Started)
            yield return placed.Activity(i).Under("remaining").Fault(
                RuleCodes.RemainingNotStarted, $"{placed.Name(i)} has remaining work but no actual start; before the start only "
                + "the duration counts.");
        if (activity.Finished && activity.ActualStart is null)
            yield return placed.Activity(i).Fault(RuleCodes.ActualStartMissing,
                $"{placed.Name(i)} is finished, so it must also say when it started.");
    }

    private static IEnumerable<Fault> Actuals(Activity activity, PlacedProject placed, int i)
    {
        var (start, finish) = (activity.ActualStart, activity.ActualFinish);
        if (Actual(placed, i, start, "actualStart") is { } ofStart) yield return ofStart;
        if (Actual(placed, i, finish, "actualFinish") is { } ofFinish) yield return ofFinish;
        if (finish < start && finish != DateOnly.MinValue)
            yield return placed.Activity(i).Under("actualFinish").Fault(
                RuleCodes.ActualOrder, $"{placed.Name(i)} finishes on {finish:yyyy-MM-dd}, before it starts on {start:yyyy-MM-dd}.");
    }

    private static Fault? Actual(PlacedProject placed, int i, DateOnly? date, string member)
    {
        if (Range(placed, i, date, member) is { } range) return range;
        var status = placed.Project.StatusDate;
        if (date is not { } actual || status == DateOnly.MinValue || actual < status) return null;
        return placed.Activity(i).Under(member).Fault(
            RuleCodes.ActualNotBeforeStatus,
            $"{actual:yyyy-MM-dd} is not before the status date {status:yyyy-MM-dd}; progress is reported up to the beginning "
            + "of that day.");
    }

    private static Fault? Range(PlacedProject placed, int i, DateOnly? date, string member) =>
        ValueRule.Date(date, () => placed.Activity(i).Under(member));
}
