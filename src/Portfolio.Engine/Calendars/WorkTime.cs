using Portfolio.Model.Documents;

namespace Portfolio.Engine.Calendars;

/// <summary>
/// A calendar as arithmetic on whole minutes: 1,440 working minutes to a working day, instants in minutes since 1970-01-01T00:00.
/// W(t) is the working time up to t. The table begins at a first day, before which W is 0, and ends at <see cref="Horizon"/>, to which
/// later instants are clamped. Immutable, safe to share between threads. Contract section 4, item 6.
/// </summary>
internal sealed class WorkTime
{
    public const int MinutesPerDay = 1440;

    /// <summary>2200-01-01T00:00, the end of the last day a date may have.</summary>
    public static readonly int Horizon = DayNumber(new DateOnly(2199, 12, 31)) * MinutesPerDay + MinutesPerDay;

    private readonly int _origin;       // first instant of the table
    private readonly int[] _workedBefore; // [day] working days before it; one entry more than days
    private readonly int[] _dayOf;      // [n] day of the n-th working day
    private readonly int[] _beginOf;    // [day] the day itself if worked, else the next working day

    public WorkTime(WorkCalendar calendar, DateOnly firstDay)
    {
        var first = DayNumber(firstDay);
        var days = Horizon / MinutesPerDay - first;
        _origin = first * MinutesPerDay;
        _workedBefore = new int[days + 1];
        _beginOf = new int[days + 1];
        var worked = WorkedDays(calendar, first, days);
        var dayOf = new List<int>(days);
        for (var day = 0; day < days; day++)
        {
            _workedBefore[day + 1] = _workedBefore[day] + (worked[day] ? 1 : 0);
            if (worked[day])
                dayOf.Add(day);
        }
        _dayOf = [.. dayOf];
        _beginOf[days] = days;
        for (var day = days - 1; day >= 0; day--)
            _beginOf[day] = worked[day] ? day : _beginOf[day + 1];
        EveryDay = _dayOf.Length == days;
    }

    /// <summary>True when every day is worked, so that working time is time.</summary>
    public bool EveryDay { get; }

    public static int DayNumber(DateOnly date) => date.DayNumber - DateOnly.FromDateTime(DateTime.UnixEpoch).DayNumber;

    /// <summary>The beginning of a day.</summary>
    public static int Instant(DateOnly date) => DayNumber(date) * MinutesPerDay;

    /// <summary>The earliest working instant at or after t.</summary>
    public int Begin(int t)
    {
        var (day, _) = Split(t);
        var begin = _beginOf[day];
        return begin == day ? Math.Min(t, Horizon) : _origin + begin * MinutesPerDay;
    }

    /// <summary>W(t), minutes.</summary>
    public int Worked(int t)
    {
        var (day, minute) = Split(t);
        return _workedBefore[day] * MinutesPerDay + (_beginOf[day] == day ? minute : 0);
    }

    /// <summary>The earliest instant with W = <paramref name="worked"/>: an end of work falls at the end of a working day.</summary>
    public int At(int worked)
    {
        if (worked <= 0)
            return _origin;
        var n = (worked - 1) / MinutesPerDay;
        return n < _dayOf.Length ? _origin + _dayOf[n] * MinutesPerDay + worked - n * MinutesPerDay : Horizon;
    }

    /// <summary>The end of work of <paramref name="minutes"/> begun at or after t; 0 leaves the instant.</summary>
    public int Add(int t, int minutes) => minutes <= 0 ? t : At(Worked(t) + minutes);

    /// <summary>The instant moved by a lag (positive) or a lead (negative).</summary>
    public int Shift(int t, int lag) => lag == 0 ? t : At(Math.Max(Worked(t) + lag, 0));

    /// <summary>The latest start of work of <paramref name="minutes"/> that ends at W(t); t itself when there is no work.</summary>
    public int Back(int t, int minutes)
    {
        if (minutes <= 0)
            return t;
        var worked = Math.Max(Worked(t) - minutes, 0);
        var n = Math.Min(worked / MinutesPerDay, _dayOf.Length - 1);
        return _origin + _dayOf[n] * MinutesPerDay + worked - n * MinutesPerDay;
    }

    private (int Day, int Minute) Split(int t)
    {
        var since = Math.Clamp(t, _origin, Horizon) - _origin;
        var day = since / MinutesPerDay;
        return (day, since - day * MinutesPerDay);
    }

    private static bool[] WorkedDays(WorkCalendar calendar, int first, int days)
    {
        var worked = new bool[days];
        var weekdays = new bool[7];
        foreach (var weekday in calendar.WorkingWeekdays)
            weekdays[(int)weekday] = true;
        // 1970-01-01 was a Thursday, weekday 4; first may be negative.
        for (var day = 0; day < days; day++)
            worked[day] = weekdays[(((first + day + 4) % 7) + 7) % 7];
        Mark(calendar.NonWorkingDates, false);
        Mark(calendar.ExtraWorkingDates, true);
        return worked;

        void Mark(IReadOnlyList<DateOnly> dates, bool value)
        {
            foreach (var date in dates)
            {
                var day = DayNumber(date) - first;
                if (day >= 0 && day < days)
                    worked[day] = value;
            }
        }
    }
}
