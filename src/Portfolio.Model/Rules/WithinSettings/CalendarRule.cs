using Portfolio.Model.Documents;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules.WithinSettings;

/// <summary>Working calendars and the default one. A date that is both non-working and extra is worked: the extra day wins.</summary>
internal static class CalendarRule
{
    public static IEnumerable<Fault> Check(Settings settings, Place at, ModelLimits limits)
    {
        var calendars = settings.Calendars;
        Place Of(int i) => at.Under("calendars", i).About("calendar/", calendars[i].Id, i);

        foreach (var fault in Ids.Check(calendars, c => c.Id, "calendar", Of)) yield return fault;
        for (var i = 0; i < calendars.Count; i++)
            foreach (var fault in CheckOne(calendars[i], Of(i), limits))
                yield return fault;

        if (settings.DefaultCalendar is { } id && !PortfolioContext.CalendarIds(settings).Contains(id))
            yield return at.Under("defaultCalendar").Fault(RuleCodes.CalendarUnknown, $"There is no calendar {TextRule.Shown(id)}.");
    }

    private static IEnumerable<Fault> CheckOne(WorkCalendar calendar, Place at, ModelLimits limits)
    {
        if (calendar.Id == WorkCalendar.EveryDayId)
            yield return at.Under("id").Fault(
                RuleCodes.IdReserved, $"The calendar {WorkCalendar.EveryDayId} always exists, with every day worked; choose another id.");
        // Extra days alone are allowed: some work is only possible in windows that are listed one by one.
        if (calendar.WorkingWeekdays.Count == 0 && calendar.ExtraWorkingDates.Count == 0)
            yield return at.Fault(RuleCodes.CalendarNoWork,
                $"The calendar {calendar.Id} has no working day, so work on it would never end.");
        if (calendar.NonWorkingDates.Count + calendar.ExtraWorkingDates.Count is var count && count > limits.CalendarDates)
            yield return at.Fault(RuleCodes.LimitExceeded,
                $"The calendar {calendar.Id} lists {count} dates; at most {limits.CalendarDates} are allowed.");
        foreach (var fault in Dates(calendar.NonWorkingDates, "nonWorkingDates", at)) yield return fault;
        foreach (var fault in Dates(calendar.ExtraWorkingDates, "extraWorkingDates", at)) yield return fault;
    }

    private static IEnumerable<Fault> Dates(IReadOnlyList<DateOnly> dates, string member, Place at)
    {
        var seen = new HashSet<DateOnly>(dates.Count);
        for (var i = 0; i < dates.Count; i++)
        {
            if (dates[i] == DateOnly.MinValue) continue;
            if (ValueRule.Date(dates[i], () => at.Under(member, i)) is { } range) yield return range;
            else if (!seen.Add(dates[i]))
                yield return at.Under(member, i).Fault(RuleCodes.DateRepeated, $"{dates[i]:yyyy-MM-dd} is listed twice.");
        }
    }
}
