using Portfolio.Model.Documents;

namespace Portfolio.Engine.Calendars;

/// <summary>
/// A calendar as arithmetic on instants. Working time W(t) is counted in whole minutes, 1,440 to a working day; contract section 4, item 6.
/// <para>
/// Instants are ints in one of two scales. In <i>minutes</i>: minutes since 1970-01-01T00:00, so that several calendars can share them. In
/// <i>working time</i> (<see cref="InWorkingTime"/>), for networks with one calendar: W(t) shifted left by <see cref="GapBits"/>, plus the
/// whole days since the earliest instant with that W. Both keep the order of instants; in the second a finish is the start plus the work.
/// </para>
/// The table begins at a first day, before which W is 0, and ends at the last day a date may have, to which later instants are clamped.
/// Immutable, safe to share between threads.
/// </summary>
internal sealed partial class WorkTime
{
    public const int MinutesPerDay = 1440;

    /// <summary>2200-01-01T00:00 in minutes, the end of the last day a date may have.</summary>
    public static readonly int HorizonMinutes = DayNumber(new DateOnly(2199, 12, 31)) * MinutesPerDay + MinutesPerDay;

    private readonly int _origin;         // first instant of the table, minutes
    private readonly int[] _workedBefore; // [day] working days before it; one entry more than days
    private readonly int[] _dayOf;        // [n] day of the n-th working day
    private readonly int[] _beginOf;      // [day] the day itself if worked, else the next working day
    private readonly int[] _latest;       // [n] days from the end of the working day before to the beginning of the n-th

    public WorkTime(WorkCalendar calendar, DateOnly firstDay)
    {
        var first = DayNumber(firstDay);
        var worked = WorkedDays(calendar, first, HorizonMinutes / MinutesPerDay - first);
        var days = worked.Length;
        _origin = first * MinutesPerDay;
        _workedBefore = new int[days + 1];
        _beginOf = new int[days + 1];
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
        _latest = [.. _dayOf.Select((day, n) => day - DayAfter(n))];
        Horizon = HorizonMinutes;
        GapBits = -1;
    }

    private WorkTime(WorkTime minutes, int gapBits)
    {
        (_origin, _workedBefore, _dayOf, _beginOf, _latest) = (
            minutes._origin, minutes._workedBefore, minutes._dayOf, minutes._beginOf, minutes._latest);
        GapBits = gapBits;
        Horizon = OfDay(_workedBefore.Length - 1);
    }

    /// <summary>In the scale of working time the bits below W; −1 in the scale of minutes.</summary>
    public int GapBits { get; }

    /// <summary>True in the scale of working time.</summary>
    public bool Working => GapBits >= 0;

    /// <summary>The last instant there is.</summary>
    public int Horizon { get; }

    /// <summary>All working time there is, minutes; more ends at the horizon.</summary>
    public int MostWorked => _dayOf.Length * MinutesPerDay;

    /// <summary>The beginning of a day in minutes.</summary>
    public static int Instant(DateOnly date) => DayNumber(date) * MinutesPerDay;

    public static int DayNumber(DateOnly date) => date.DayNumber - DateOnly.FromDateTime(DateTime.UnixEpoch).DayNumber;

    /// <summary>The same calendar in the scale of working time; null when W and the longest gap do not fit an int together.</summary>
    public WorkTime? InWorkingTime()
    {
        var longest = Math.Max(_latest.DefaultIfEmpty(0).Max(), _workedBefore.Length - DayAfter(_dayOf.Length));
        var bits = 0;
        while (1 << bits <= longest)
            bits++;
        return ((long)MostWorked + 1) << bits < int.MaxValue ? new WorkTime(this, bits) : null;
    }

    /// <summary>The beginning of a day on this scale; in working time days before the table count as its first.</summary>
    public int BeginningOf(DateOnly date) =>
        Working ? OfDay(Math.Clamp(DayNumber(date) - _origin / MinutesPerDay, 0, _workedBefore.Length - 1)) : Instant(date);

    /// <summary>The end of a day on this scale.</summary>
    public int EndOf(DateOnly date) => BeginningOf(date.AddDays(1));

    /// <summary>Minutes since 1970-01-01T00:00 of an instant.</summary>
    public int ToMinutes(int t)
    {
        if (!Working)
            return t;
        var worked = t >> GapBits;
        return EndMinutes(worked) + (t - (worked << GapBits)) * MinutesPerDay;
    }

    // The day that follows the first n working days, at whose beginning the n-th ends.
    private int DayAfter(int n) => n == 0 ? 0 : _dayOf[n - 1] + 1;

    private int OfDay(int day) => (_workedBefore[day] * MinutesPerDay << GapBits) + day - DayAfter(_workedBefore[day]);

    // The earliest instant with that W, in minutes.
    private int EndMinutes(int worked)
    {
        if (worked <= 0)
            return _origin;
        var n = (worked - 1) / MinutesPerDay;
        return n < _dayOf.Length ? _origin + _dayOf[n] * MinutesPerDay + worked - n * MinutesPerDay : HorizonMinutes;
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
