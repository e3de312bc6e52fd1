using Portfolio.Model.Documents;

namespace Portfolio.Engine.Results;

/// <summary>
/// How an instant becomes a date. The default is that of every finish: the day that ends at the first midnight at or after it. A later
/// instant never gets an earlier date, so the percentile of the dates is the date of the percentile.
/// </summary>
/// <param name="Opens">True for what only starts lead to: dated by the day that begins at or contains the instant.</param>
/// <param name="EarliestDay">Day before which nothing is dated; 0 (1970-01-01) when there is none.</param>
public readonly record struct DateRule(bool Opens, int EarliestDay)
{
    /// <summary>
    /// The rule of a milestone. Without a predecessor by FS or FF it opens a day; it is not dated before its project's status date or its
    /// own earliest start. A finished one stands at the end of its actual day, where the default gives that day back.
    /// </summary>
    public static DateRule OfMilestone(Project project, Activity milestone)
    {
        if (milestone.Finished) return default;
        var opens = !milestone.Predecessors.Any(link => link.Type is LinkType.FinishToStart or LinkType.FinishToFinish);
        var earliest = milestone.EarliestStart is { } start && start > project.StatusDate ? start : project.StatusDate;
        return new(opens, Instants.ToDay(earliest));
    }

    /// <summary>The day of an instant.</summary>
    public int Day(long minutes) => Math.Max(Opens ? Instants.DayContaining(minutes) : Instants.DayEndingAt(minutes), EarliestDay);

    /// <summary>The date of an instant.</summary>
    public DateOnly Date(long minutes) => Instants.ToDate(Day(minutes));

    /// <summary>The date of an instant between two minutes, such as a mean.</summary>
    public DateOnly Date(double minutes) => Date((long)(Opens ? Math.Floor(minutes) : Math.Ceiling(minutes)));
}
