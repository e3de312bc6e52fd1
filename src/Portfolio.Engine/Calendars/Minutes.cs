namespace Portfolio.Engine.Calendars;

/// <summary>Working days as whole minutes, 1,440 to a day.</summary>
internal static class Minutes
{
    /// <summary>Longer than any horizon, short enough that sums of two stay within an int.</summary>
    public const double Longest = 1 << 29;

    /// <summary>Nearest whole minute, ties to even; beyond ±2²⁹ minutes (a thousand years) clamped.</summary>
    public static int Of(double days) => (int)Math.Clamp(Math.Round(days * WorkTime.MinutesPerDay), -Longest, Longest);

    /// <summary>As <see cref="Of"/>, negative draws counted as 0.</summary>
    public static int OfWork(double days) => Of(Math.Max(days, 0));

    public static double Days(int minutes) => minutes / (double)WorkTime.MinutesPerDay;
}
