using System.Globalization;

namespace Portfolio.Store;

/// <summary>
/// How time is kept: instants as microseconds since 1970 in UTC, dates as ISO text. Both databases sort and compare these alike.
/// </summary>
internal static class Instants
{
    private const long TicksPerMicrosecond = TimeSpan.TicksPerMillisecond / 1000;

    public static long ToMicroseconds(this DateTimeOffset instant) =>
        (instant.UtcTicks - DateTimeOffset.UnixEpoch.Ticks) / TicksPerMicrosecond;

    public static DateTimeOffset ToInstant(this long microseconds) => DateTimeOffset.UnixEpoch.AddTicks(microseconds * TicksPerMicrosecond);

    public static DateTimeOffset? ToInstant(this long? microseconds) => microseconds?.ToInstant();

    public static string ToText(this DateOnly date) => date.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture);

    public static DateOnly ToDate(this string text) => DateOnly.ParseExact(text, "yyyy-MM-dd", CultureInfo.InvariantCulture);
}
