namespace Portfolio.Server.Http;

/// <summary>Local dates of a portfolio and the instants at which they begin and end.</summary>
internal static class LocalDates
{
    /// <summary>The first instant of the date: after a gap at midnight the end of the gap, of a repeated midnight the first.</summary>
    public static DateTimeOffset StartOf(DateOnly date, TimeZoneInfo zone)
    {
        var local = date.ToDateTime(TimeOnly.MinValue);
        while (zone.IsInvalidTime(local))
            local = local.AddMinutes(1);
        var offset = zone.IsAmbiguousTime(local) ? zone.GetAmbiguousTimeOffsets(local).Max() : zone.GetUtcOffset(local);
        return new DateTimeOffset(local, offset).ToUniversalTime();
    }

    /// <summary>The last instant of the date.</summary>
    public static DateTimeOffset EndOf(DateOnly date, TimeZoneInfo zone) => StartOf(date.AddDays(1), zone).AddTicks(-1);

    /// <summary>The date on which an instant falls.</summary>
    public static DateOnly Of(DateTimeOffset instant, TimeZoneInfo zone) =>
        DateOnly.FromDateTime(TimeZoneInfo.ConvertTime(instant, zone).DateTime);
}
