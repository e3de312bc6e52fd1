namespace Portfolio.Engine.Calendars;

/// <content>Instants plus and minus work.</content>
internal sealed partial class WorkTime
{
    /// <summary>W(t), minutes.</summary>
    public int Worked(int t)
    {
        if (Working)
            return t >> GapBits;
        var (day, minute) = Split(t);
        return _workedBefore[day] * MinutesPerDay + (_beginOf[day] == day ? minute : 0);
    }

    /// <summary>The earliest working instant at or after t.</summary>
    public int Begin(int t)
    {
        if (Working)
            return BeginWorking(t);
        var (day, _) = Split(t);
        var begin = _beginOf[day];
        return begin == day ? Math.Min(t, Horizon) : _origin + begin * MinutesPerDay;
    }

    /// <summary>The earliest instant with W = <paramref name="worked"/>: an end of work falls at the end of a working day.</summary>
    public int At(int worked)
    {
        if (!Working)
            return EndMinutes(worked);
        return worked > MostWorked ? Horizon : Math.Max(worked, 0) << GapBits;
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
        if (Working)
            return BeginWorking(worked << GapBits);
        var n = Math.Min(worked / MinutesPerDay, _dayOf.Length - 1);
        return _origin + _dayOf[n] * MinutesPerDay + worked - n * MinutesPerDay;
    }

    // Between two working days the working instant is the beginning of the second; within one, any instant is.
    private int BeginWorking(int t)
    {
        var worked = t >> GapBits;
        var n = worked / MinutesPerDay;
        if (n * MinutesPerDay != worked)
            return t;
        return n < _latest.Length ? (worked << GapBits) + _latest[n] : Horizon;
    }

    private (int Day, int Minute) Split(int t)
    {
        var since = Math.Clamp(t, _origin, HorizonMinutes) - _origin;
        var day = since / MinutesPerDay;
        return (day, since - day * MinutesPerDay);
    }
}
