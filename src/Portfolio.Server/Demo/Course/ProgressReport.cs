using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Demo.Programmes;
using Portfolio.Server.Demo.Scope;

namespace Portfolio.Server.Demo.Course;

/// <summary>A project as it is reported: its plan with what has been done and spent before the status date.</summary>
internal static class ProgressReport
{
    // Of the trouble with a piece of work, planners admit somewhat more than the share of it that is done.
    private const double Candour = 1.3;

    public static ProjectJson Of(Book book, ActualCourse course, ProjectJson plan, DateOnly statusDate)
    {
        var started = plan.Activities!
            .Select(activity => course.Of(plan.Id!, activity.Id!).Start)
            .Where(start => start < statusDate).Min();
        var days = started is { } first ? book.ProjectDays.Between(first, statusDate) : 0;
        return plan with
        {
            StatusDate = SharedSettings.Written(statusDate),
            Overhead = plan.Overhead! with { Actual = days == 0 ? null : (decimal)Math.Round(days * plan.Overhead!.PerDay!.Value) },
            Activities = [.. plan.Activities!.Select(activity => Of(book, course, plan.Id!, activity, statusDate))],
        };
    }

    private static ActivityJson Of(Book book, ActualCourse course, string project, ActivityJson activity, DateOnly statusDate)
    {
        var ran = course.Of(project, activity.Id!);
        var finished = ran.Finish < statusDate;
        if (activity.Milestone == true)
            return finished ? activity with { ActualFinish = SharedSettings.Written(ran.Finish!.Value) } : activity;
        var current = activity with { Duration = book.Duration(project, activity) };
        if (!(ran.Start < statusDate))
            return current;
        current = current with { ActualStart = SharedSettings.Written(ran.Start!.Value) };
        var calendar = book.DaysOf(activity);
        return finished
            ? current with
            {
                ActualFinish = SharedSettings.Written(ran.Finish!.Value),
                Cost = Spent(project, activity, calendar.Between(ran.Start.Value, ran.Finish.Value.AddDays(1)), share: 1),
            }
            : UnderWay(course, project, current, calendar.Between(ran.Start.Value, statusDate));
    }

    private static ActivityJson UnderWay(ActualCourse course, string project, ActivityJson activity, int done)
    {
        var planned = Estimate.Middle(activity.Duration);
        var truth = Math.Max(course.Takes(project, activity), 1);
        var admitted = planned + ((truth - planned) * Math.Min(1, Candour * done / truth));
        var remaining = Math.Max(Math.Round(2 * (admitted - done)) / 2, 0.5);
        return activity with
        {
            Remaining = Estimate.Pert(Math.Round(remaining * 0.8, 2), remaining, Math.Round(remaining * 1.5, 2)),
            Cost = Spent(project, activity, done, share: done / (done + remaining)),
        };
    }

    /// <summary>Cost after so many days of work; <paramref name="share"/> of the fixed cost is spent.</summary>
    private static ActivityCostJson? Spent(string project, ActivityJson activity, int done, double share)
    {
        if (activity.Cost is not { } cost)
            return null;
        var price = Chance.Between($"{project}/{activity.Id}/price", 0.96, 1.1);
        var spent = price * ((share * Estimate.Middle(cost.Fixed)) + (done * Estimate.Middle(cost.PerDay)));
        var toGo = share < 0.98 && cost.Fixed is not null ? Estimate.Scaled(cost.Fixed, price * (1 - share), digits: 0) : null;
        return cost with { Fixed = share == 1 ? cost.Fixed : toGo, Actual = (decimal)Math.Round(spent) };
    }
}
