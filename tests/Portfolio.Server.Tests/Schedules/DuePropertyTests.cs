using CsCheck;
using Portfolio.Server.Schedules;

namespace Portfolio.Server.Tests.Schedules;

/// <summary>
/// Three years in zones with clock changes of every kind, one of them a leap year, with sweeps that come late, twice, or not for days.
/// </summary>
public sealed class DuePropertyTests
{
    private static readonly DateTimeOffset Start = new(2026, 6, 30, 23, 59, 0, TimeSpan.Zero);
    private static readonly DateTimeOffset End = Start.AddYears(3);

    private static readonly string[] Zones =
    [
        "Europe/Berlin", "Europe/London", "America/New_York", "America/Havana", "America/St_Johns", "Africa/Cairo", "Africa/Casablanca", "Asia/Beirut",
        "Australia/Lord_Howe", "Pacific/Chatham",
    ];

    private static readonly TimeOnly[] Daily = [new(0, 0), new(0, 30), new(1, 59), new(2, 0), new(2, 30), new(3, 0), new(12, 0), new(23, 59)];

    public static TheoryData<string> Zone => [.. Zones];

    /// <summary>The instants by another way: the clock of the zone is watched minute by minute.</summary>
    private static Dictionary<DateOnly, DateTimeOffset> Watched(TimeOnly time, TimeZoneInfo zone)
    {
        var due = new Dictionary<DateOnly, DateTimeOffset>();
        for (var instant = Start; instant <= End; instant = instant.AddMinutes(1))
        {
            var local = TimeZoneInfo.ConvertTime(instant, zone).DateTime;
            if (TimeOnly.FromDateTime(local) >= time)
                due.TryAdd(DateOnly.FromDateTime(local), instant);
        }
        due.Remove(DateOnly.FromDateTime(TimeZoneInfo.ConvertTime(Start, zone).DateTime));
        return due;
    }

    [Theory]
    [MemberData(nameof(Zone))]
    public void EveryDueDateGetsOneRunAndNoDateTwo(string id)
    {
        var zone = TimeZoneInfo.FindSystemTimeZoneById(id);
        foreach (var time in Daily.Where((_, place) => (place + id.Length) % 4 == 0))
        {
            var watched = Watched(time, zone);
            var times = new DueTimes(DueTimes.Parse($"{time.Minute} {time.Hour} * * *")!, zone);
            Gen.Int[1, 60 * 26].Array[400, 600].Sample(gaps => Check(times, watched, gaps), iter: 20, seed: "0000KOIPJ3v6", threads: 1);
        }
    }

    private static void Check(DueTimes times, Dictionary<DateOnly, DateTimeOffset> watched, int[] gaps)
    {
        var since = watched.Values.Min().AddMinutes(-1);
        var made = new List<DateOnly>();
        var (before, now) = (since, since);
        for (var sweep = 0; now < End; sweep++)
        {
            // Every fiftieth time the server was away for a week.
            now += TimeSpan.FromMinutes(gaps[sweep % gaps.Length] * (sweep % 50 == 49 ? 7 : 1));
            var latest = watched.Where(due => due.Value > before && due.Value <= now && due.Value <= End).Select(due => (DateOnly?)due.Key).Max();
            if (now > End)
                break;
            var due = times.Latest(since, now, made.Count > 0 ? made[^1] : null);
            Assert.Equal(latest, due?.Date);
            if (due is { } found)
            {
                Assert.Equal(watched[found.Date], found.At);
                made.Add(found.Date);
            }
            Assert.Null(times.Latest(since, now, made.Count > 0 ? made[^1] : null));
            before = now;
        }
        Assert.Equal(made.Distinct().Order(), made);
    }
}
