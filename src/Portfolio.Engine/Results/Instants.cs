namespace Portfolio.Engine.Results;

/// <summary>
/// Instants are whole minutes since 1970-01-01T00:00 local, days whole days since 1970-01-01.
/// Days outside 1970-01-01…2199-12-31 are clamped to the nearer end.
/// </summary>
public static class Instants
{
    public const int MinutesPerDay = 1440;

    /// <summary>Stands for the instant of what does not happen in an iteration.</summary>
    public const int Never = int.MinValue;

    private static readonly int Epoch = new DateOnly(1970, 1, 1).DayNumber;

    /// <summary>2199-12-31.</summary>
    public static readonly int LastDay = new DateOnly(2199, 12, 31).DayNumber - Epoch;

    /// <summary>The day that ends at the first midnight at or after the instant: midnight belongs to the day before it.</summary>
    public static int DayEndingAt(long minutes) => Clamp(-FloorDay(-minutes) - 1);

    /// <summary>The day that begins at or contains the instant.</summary>
    public static int DayContaining(long minutes) => Clamp(FloorDay(minutes));

    /// <summary>The date of a day, clamped.</summary>
    public static DateOnly ToDate(int day) => DateOnly.FromDayNumber(Clamp(day) + Epoch);

    /// <summary>The day of a date; negative before 1970.</summary>
    public static int ToDay(DateOnly date) => date.DayNumber - Epoch;

    /// <summary>The instant at which a day ends.</summary>
    public static int EndOf(DateOnly date) => (ToDay(date) + 1) * MinutesPerDay;

    private static long FloorDay(long minutes) => (minutes - (minutes % MinutesPerDay + MinutesPerDay) % MinutesPerDay) / MinutesPerDay;

    private static int Clamp(long day) => (int)Math.Clamp(day, 0, LastDay);
}
