using System.Globalization;
using Portfolio.Store.Results;

namespace Portfolio.Server.Results;

/// <summary>The intervals of a series.</summary>
internal static class Intervals
{
    public const string Run = "run";
    public const string Day = "day";
    public const string Week = "week";
    public const string Month = "month";

    public static readonly IReadOnlyList<string> All = [Run, Day, Week, Month];

    /// <summary>The last point of each interval. A date has one point, so that runs and days are the same.</summary>
    /// <param name="points">By date.</param>
    /// <param name="weekEnds">Last day of a week.</param>
    public static IEnumerable<SeriesPoint> LastOfEach(IReadOnlyList<SeriesPoint> points, string every, DayOfWeek weekEnds) => every switch
    {
        Week => points.GroupBy(point => EndOfWeek(point.AsOf, weekEnds)).Select(group => group.Last()),
        Month => points.GroupBy(point => (point.AsOf.Year, point.AsOf.Month)).Select(group => group.Last()),
        _ => points,
    };

    /// <summary>Names the interval in which a date lies: the same text for all its dates, another for every other interval.</summary>
    public static string NameOf(DateOnly date, string every, DayOfWeek weekEnds) => every switch
    {
        Week => EndOfWeek(date, weekEnds).ToString("yyyy-MM-dd", CultureInfo.InvariantCulture),
        Month => date.ToString("yyyy-MM", CultureInfo.InvariantCulture),
        _ => date.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture),
    };

    private static DateOnly EndOfWeek(DateOnly date, DayOfWeek weekEnds) => date.AddDays(((int)weekEnds - (int)date.DayOfWeek + 7) % 7);
}
