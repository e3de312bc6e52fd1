using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Demo.Course;
using Portfolio.Server.Demo.Story;

namespace Portfolio.Server.Demo;

/// <summary>The document as it stood at the end of one week.</summary>
/// <param name="Number">1…26.</param>
/// <param name="AsOf">The Sunday that ends the week.</param>
/// <param name="Note">What happened.</param>
internal sealed record DemoWeek(int Number, DateOnly AsOf, string Note, DocumentJson Document);

/// <summary>The invented half year of the demo portfolio. A function of the day alone: the same day gives the same bytes.</summary>
internal static class DemoHistory
{
    public const int Length = 26;

    // A day of estimate takes 1 to 1.62 days, more often near the lower end: plans are made of likely values, troubles come on top.
    private const double BestPace = 1.0;
    private const double WorsePace = 0.62;
    private const double Skew = 1.6;

    /// <summary>The weeks that end on the 26 Sundays before <paramref name="today"/>, oldest first.</summary>
    public static IReadOnlyList<DemoWeek> Weeks(DateOnly today)
    {
        var lastSunday = today.AddDays(-(today.DayOfWeek == DayOfWeek.Sunday ? 7 : (int)today.DayOfWeek));
        var book = new Book(lastSunday.AddDays(-7 * (Length - 1)));
        var course = new ActualCourse(book, Pace, (project, activity) => Decided(book, project, activity));
        course.Work(book.FirstWeek);
        Baseline.Commit(book, course);

        var reported = book.Projects.ToDictionary(plan => plan.Id!, _ => book.FirstWeek, StringComparer.Ordinal);
        var weeks = new List<DemoWeek>(Length);
        for (var week = 1; week <= Length; week++)
        {
            var happenings = WeeklyStory.Of(week);
            foreach (var happening in happenings.All)
                happening(book);
            var end = book.WeekEnd(week);
            course.Work(end);
            foreach (var plan in book.Projects.Where(plan => WeeklyStory.Reports(plan.Id!, week)))
                reported[plan.Id!] = end;
            weeks.Add(new DemoWeek(week, end, happenings.Note, new DocumentJson
            {
                Settings = book.Settings,
                Projects = [.. book.Projects.Select(plan => ProgressReport.Of(book, course, plan, reported[plan.Id!]))],
            }));
        }
        return weeks;
    }

    /// <summary>A day whose history begins with the week that ends on this Sunday.</summary>
    public static DateOnly DayAfter(DateOnly firstWeek) => firstWeek.AddDays((7 * (Length - 1)) + 1);

    private static double Pace(string project, string activity) =>
        BestPace + (WorsePace * Math.Pow(Chance.Of($"{project}/{activity}/pace"), Skew));

    /// <summary>Work in a fork waits until the story takes the fork away.</summary>
    private static bool? Decided(Book book, string project, string activity)
    {
        var forks = book.Projects.Single(plan => plan.Id == project).ChanceBranches;
        return forks?.Any(fork => fork.Branches!.Any(branch => branch.Activities!.Contains(activity))) == true ? null : true;
    }
}
