namespace Portfolio.Model.Documents;

/// <summary>
/// Which days are worked: the weekdays, less <see cref="NonWorkingDates"/>, plus <see cref="ExtraWorkingDates"/> (these win).
/// </summary>
public sealed record WorkCalendar(
    string Id, IReadOnlyList<DayOfWeek> WorkingWeekdays, IReadOnlyList<DateOnly> NonWorkingDates, IReadOnlyList<DateOnly> ExtraWorkingDates)
{
    public const string EveryDayId = "every-day";

    /// <summary>The calendar that always exists.</summary>
    public static readonly WorkCalendar EveryDay = new(EveryDayId, Enum.GetValues<DayOfWeek>(), [], []);
}
