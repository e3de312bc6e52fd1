using System.Globalization;

namespace Portfolio.Engine.Results;

/// <summary>
/// A confidence level in percent, above 0 and below 100, kept exactly to six decimals, so that the rank it points to is exact too.
/// Valid by construction (the default value is not a level); ordered and compared by value.
/// </summary>
public readonly record struct Level : IComparable<Level>
{
    private const int Units = 1_000_000;

    private Level(int millionths) => Millionths = millionths;

    /// <summary>Millionths of a percent, 1…99,999,999.</summary>
    public int Millionths { get; }

    /// <summary>The level in percent.</summary>
    public decimal Percent => (decimal)Millionths / Units;

    /// <summary>The level as a probability, 0–1, correctly rounded.</summary>
    public double Probability => Millionths / (100.0 * Units);

    /// <summary>The levels kept for ever of every run: 0.5, 1…99 and 99.5.</summary>
    public static IReadOnlyList<Level> Kept { get; } = [Of(0.5m), .. Enumerable.Range(1, 99).Select(p => Of(p)), Of(99.5m)];

    /// <summary>The level of a percentage.</summary>
    /// <exception cref="ArgumentOutOfRangeException">Not above 0 and below 100, or with more than six decimals.</exception>
    public static Level Of(decimal percent) =>
        TryOf(percent, out var level) ? level
        : throw new ArgumentOutOfRangeException(
            nameof(percent), percent, "A level lies above 0 and below 100 and has at most six decimals.");

    /// <summary>The level of a whole percentage, 1…99.</summary>
    public static Level Of(int percent) => Of((decimal)percent);

    /// <summary>The level of a percentage as it stands in a document, to six decimals.</summary>
    /// <exception cref="ArgumentOutOfRangeException">Not above 0 and below 100.</exception>
    public static Level Of(double percent) => percent is > 0 and < 100
        ? Of(Math.Round((decimal)percent, 6))
        : throw new ArgumentOutOfRangeException(nameof(percent), percent, "A level lies above 0 and below 100.");

    /// <summary>False when the percentage is not a level: out of range, or with more than six decimals.</summary>
    public static bool TryOf(decimal percent, out Level level)
    {
        var valid = percent is > 0 and < 100 && decimal.Truncate(percent * Units) == percent * Units;
        level = valid ? new((int)(percent * Units)) : default;
        return valid;
    }

    /// <summary>The level written in millionths of a percent.</summary>
    /// <exception cref="ArgumentOutOfRangeException">Outside 1…99,999,999.</exception>
    public static Level OfMillionths(int millionths)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(millionths, 1);
        ArgumentOutOfRangeException.ThrowIfGreaterThanOrEqual(millionths, 100 * Units);
        return new(millionths);
    }

    /// <summary>The kept levels and those given, each once, rising.</summary>
    public static IReadOnlyList<Level> KeptAnd(IEnumerable<Level> configured) => [.. Kept.Concat(configured).Distinct().Order()];

    /// <summary>Which of n values in rising order stands for the level: ⌈p·n/100⌉, 1…n. Hyndman and Fan (1996), definition 1.</summary>
    public int Rank(int n)
    {
        const long hundred = 100L * Units;
        return (int)(((long)Millionths * n + hundred - 1) / hundred);
    }

    public int CompareTo(Level other) => Millionths.CompareTo(other.Millionths);

    /// <summary>The percentage without trailing zeros, such as <c>99.5</c>.</summary>
    public override string ToString() => Percent.ToString("0.######", CultureInfo.InvariantCulture);
}
