using System.Globalization;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Demo.Scope;

namespace Portfolio.Server.Demo.Course;

/// <summary>When an activity really ran. Both are null until it begins.</summary>
internal readonly record struct Ran(DateOnly? Start, DateOnly? Finish);

/// <summary>
/// What really happens on the sites, a day at a time: work begins when its predecessors allow and its crews are free, and takes as long
/// as it takes. The planners see of it only what has been reported. A plain rule of its own, not the engine's: history is given, never
/// computed from a forecast.
/// </summary>
/// <param name="pace">What a day of estimate really takes, by activity.</param>
/// <param name="happens">Of an activity in a fork: true, false, or null while nobody knows and it has to wait.</param>
internal sealed class ActualCourse(Book book, Func<string, string, double> pace, Func<string, string, bool?> happens)
{
    private readonly Dictionary<(string Project, string Activity), Ran> ran = [];

    // The next day to be worked; the first project begins less than two years before the history.
    private DateOnly next = book.WeekEnd(-103);

    private ActualCourse(ActualCourse other, Func<string, string, double> pace, Func<string, string, bool?> happens)
        : this(other.Book, pace, happens)
    {
        ran = new(other.ran);
        next = other.next;
    }

    private Book Book { get; } = book;

    /// <summary>The same until now, another way from here.</summary>
    public ActualCourse From(Func<string, string, double> otherPace, Func<string, string, bool?> otherHappens) =>
        new(this, otherPace, otherHappens);

    public Ran Of(string project, string activity) => ran.GetValueOrDefault((project, activity));

    /// <summary>Working days that an activity takes in truth, as things stand.</summary>
    public double Takes(string project, ActivityJson activity) =>
        (Estimate.Middle(activity.Duration) * pace(project, activity.Id!)) + Book.Hold(project, activity.Id!);

    /// <summary>Works every day before <paramref name="until"/>; true when nothing is left to do.</summary>
    public bool Work(DateOnly until)
    {
        var plans = Book.Projects.OrderBy(plan => plan.Priority).ToList();
        for (; next < until; next = next.AddDays(1))
        {
            var free = Book.Settings.Pools!.ToDictionary(pool => pool.Id!, pool => CapacityOn(pool, next), StringComparer.Ordinal);
            var open = (from plan in plans
                        from activity in plan.Activities!
                        where Of(plan.Id!, activity.Id!).Finish is null
                        select (Project: plan.Id!, Activity: activity)).ToList();
            if (open.Count == 0)
                return true;
            foreach (var (project, activity) in open)
                if (Of(project, activity.Id!).Start is not null)
                    Go(project, activity, free);
            foreach (var (project, activity) in open)
                if (Of(project, activity.Id!).Start is null)
                    Begin(project, activity, free);
        }
        return false;
    }

    private void Go(string project, ActivityJson activity, Dictionary<string, double> free)
    {
        foreach (var demand in activity.Demands ?? [])
            free[demand.Pool!] -= demand.Units!.Value;
        FinishWhenDone(project, activity);
    }

    private void Begin(string project, ActivityJson activity, Dictionary<string, double> free)
    {
        var does = happens(project, activity.Id!);
        if (does is null || !Allowed(project, activity))
            return;
        if (does is false || activity.Milestone == true)
        {
            ran[(project, activity.Id!)] = new Ran(next.AddDays(-1), next.AddDays(-1));
            return;
        }
        if (!Book.DaysOf(activity).Open(next) || activity.Demands?.Any(demand => free[demand.Pool!] < demand.Units) == true)
            return;
        ran[(project, activity.Id!)] = new Ran(next, null);
        Go(project, activity, free);
    }

    private void FinishWhenDone(string project, ActivityJson activity)
    {
        var start = Of(project, activity.Id!).Start!.Value;
        var done = Book.DaysOf(activity).Between(start, next.AddDays(1));
        var held = activity.Predecessors?
            .Any(link => link.Type == "FF" && !Passed(project, activity, link, Of(Split(project, link)).Finish)) == true;
        if (!held && done >= Takes(project, activity))
            ran[(project, activity.Id!)] = new Ran(start, next);
    }

    private bool Allowed(string project, ActivityJson activity)
    {
        if (activity.EarliestStart is { } earliest && next < DateOnly.ParseExact(earliest, "yyyy-MM-dd", CultureInfo.InvariantCulture))
            return false;
        return activity.Predecessors?.All(link => link.Type switch
        {
            "SS" => Passed(project, activity, link, Of(Split(project, link)).Start?.AddDays(-1)),
            "FF" => true,
            _ => Passed(project, activity, link, Of(Split(project, link)).Finish),
        }) != false;
    }

    /// <summary>True when the lag of a link has passed since a day whose evening it counts from.</summary>
    private bool Passed(string project, ActivityJson activity, LinkJson link, DateOnly? since) =>
        since < next && (link.Lag is null || Book.DaysOf(activity).Between(since.Value.AddDays(1), next) >= link.Lag);

    private Ran Of((string Project, string Activity) key) => ran.GetValueOrDefault(key);

    private static (string Project, string Activity) Split(string project, LinkJson link) =>
        link.Activity!.Split('/') is [var other, var activity] ? (other, activity) : (project, link.Activity!);

    private static double CapacityOn(PoolJson pool, DateOnly date)
    {
        var day = date.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture);
        var last = pool.CapacityChanges?.LastOrDefault(change => string.CompareOrdinal(change.From, day) <= 0);
        return last?.Capacity ?? pool.Capacity!.Value;
    }
}
