using System.Globalization;
using Portfolio.Server.Contracts.Document;

namespace Portfolio.Server.Demo.Course;

/// <summary>Working days of one calendar, counted over the years that the demo can reach.</summary>
internal sealed class WorkDays
{
    private readonly DateOnly first;

    // worked[i]: working days before first + i.
    private readonly int[] worked;

    public WorkDays(CalendarJson calendar, DateOnly first, int days)
    {
        this.first = first;
        worked = new int[days + 1];
        var closed = calendar.NonWorkingDates!
            .Select(text => DateOnly.ParseExact(text, "yyyy-MM-dd", CultureInfo.InvariantCulture)).ToHashSet();
        for (var day = 0; day < days; day++)
        {
            var date = first.AddDays(day);
            var open = calendar.WorkingWeekdays!.Contains(Weekday(date)) && !closed.Contains(date);
            worked[day + 1] = worked[day] + (open ? 1 : 0);
        }
    }

    /// <summary>Working days from one day up to another, which is not counted.</summary>
    public int Between(DateOnly from, DateOnly to) => Before(to) - Before(from);

    public bool Open(DateOnly date) => Between(date, date.AddDays(1)) == 1;

    private int Before(DateOnly date) => worked[Math.Clamp(date.DayNumber - first.DayNumber, 0, worked.Length - 1)];

    private static string Weekday(DateOnly date) => date.DayOfWeek.ToString()[..3].ToLowerInvariant();
}
