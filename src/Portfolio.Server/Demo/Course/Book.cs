using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Demo.Programmes;
using Portfolio.Server.Demo.Scope;

namespace Portfolio.Server.Demo.Course;

/// <summary>
/// What the office plans at the moment: settings and projects with their current estimates, without progress; and what has befallen
/// activities since. The story changes it week by week.
/// </summary>
internal sealed class Book
{
    // Three years before the history for the oldest project, ten after it for the last finish.
    private const int YearsBefore = 3;
    private const int YearsAfter = 10;

    private readonly Dictionary<(string Project, string Activity), double> hold = [];
    private readonly Dictionary<string, WorkDays> calendars;

    public Book(DateOnly firstWeek)
    {
        FirstWeek = firstWeek;
        Settings = SharedSettings.From(firstWeek);
        Projects = [.. Catalogue.Projects(week => SharedSettings.Written(WeekEnd(week)))];
        var first = firstWeek.AddYears(-YearsBefore);
        var days = firstWeek.AddYears(YearsAfter).DayNumber - first.DayNumber;
        calendars = Settings.Calendars!.ToDictionary(
            calendar => calendar.Id!, calendar => new WorkDays(calendar, first, days), StringComparer.Ordinal);
    }

    /// <summary>Sunday of week 1.</summary>
    public DateOnly FirstWeek { get; }

    public SettingsJson Settings { get; set; }

    public List<ProjectJson> Projects { get; }

    /// <summary>Sunday of a week, counted from 1 for the first of the history.</summary>
    public DateOnly WeekEnd(int week) => FirstWeek.AddDays(7 * (week - 1));

    public WorkDays DaysOf(ActivityJson activity) => calendars[activity.Calendar ?? SharedSettings.FiveDay];

    public WorkDays ProjectDays => calendars[SharedSettings.FiveDay];

    /// <summary>Working days that an activity has lost, beyond its estimate.</summary>
    public double Hold(string project, string activity) => hold.GetValueOrDefault((project, activity));

    public void AddHold(string project, string activity, double days) => hold[(project, activity)] = Hold(project, activity) + days;

    public void Change(string project, Func<ProjectJson, ProjectJson> change)
    {
        var index = Projects.FindIndex(candidate => candidate.Id == project);
        Projects[index] = change(Projects[index]);
    }

    public void Change(string project, string activity, Func<ActivityJson, ActivityJson> change)
    {
        if (Projects.Single(candidate => candidate.Id == project).Activities!.All(candidate => candidate.Id != activity))
            throw new InvalidOperationException($"The demo has no activity {project}/{activity}.");
        Change(project, plan => plan with { Activities = [.. plan.Activities!.Select(each => each.Id == activity ? change(each) : each)] });
    }

    /// <summary>The estimate with what was lost since.</summary>
    public DistributionJson Duration(string project, ActivityJson activity) =>
        Estimate.Shifted(activity.Duration!, Hold(project, activity.Id!));
}
