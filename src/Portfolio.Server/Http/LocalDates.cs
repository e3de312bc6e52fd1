namespace Portfolio.Server.Http;

/// <summary>Local dates and times of a portfolio and the instants at which they come.</summary>
internal static class LocalDates
{
    // No zone changes its clock twice within two days.
    private static readonly TimeSpan Around = TimeSpan.FromDays(1);

    /// <summary>The first instant of the date: after a gap at midnight the end of the gap, of a repeated midnight the first.</summary>
    public static DateTimeOffset StartOf(DateOnly date, TimeZoneInfo zone) => InstantOf(date.ToDateTime(TimeOnly.MinValue), zone);

    /// <summary>The last instant of the date.</summary>
    public static DateTimeOffset EndOf(DateOnly date, TimeZoneInfo zone) => StartOf(date.AddDays(1), zone).AddTicks(-1);

    /// <summary>The date on which an instant falls.</summary>
    public static DateOnly Of(DateTimeOffset instant, TimeZoneInfo zone) =>
        DateOnly.FromDateTime(TimeZoneInfo.ConvertTime(instant, zone).DateTime);

    /// <summary>
    /// The first instant at which the clocks of the zone show this time or a later one: of a time that comes twice the first, of one that
    /// is left out the end of the gap.
    /// </summary>
    public static DateTimeOffset InstantOf(DateTime local, TimeZoneInfo zone)
    {
        var utc = new DateTimeOffset(DateTime.SpecifyKind(local, DateTimeKind.Unspecified), TimeSpan.Zero);
        var (before, after) = (zone.GetUtcOffset(utc - Around), zone.GetUtcOffset(utc + Around));
        // The larger offset gives the earlier instant.
        foreach (var offset in before > after ? [before, after] : new[] { after, before })
        {
            if (zone.GetUtcOffset(utc - offset) == offset)
                return utc - offset;
        }
        return EndOfGap(utc - after, utc - before, zone);
    }

    // Only the clock's jump lies in between: halved down to it. It comes at a whole second.
    private static DateTimeOffset EndOfGap(DateTimeOffset early, DateTimeOffset late, TimeZoneInfo zone)
    {
        var offset = zone.GetUtcOffset(late);
        while (late - early > TimeSpan.FromSeconds(1))
        {
            var middle = early + TimeSpan.FromSeconds(Math.Floor((late - early).TotalSeconds / 2));
            if (zone.GetUtcOffset(middle) == offset)
                late = middle;
            else
                early = middle;
        }
        return late;
    }
}
