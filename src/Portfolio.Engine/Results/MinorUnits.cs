namespace Portfolio.Engine.Results;

/// <summary>Whole minor units of a currency and amounts of money; exact both ways.</summary>
public static class MinorUnits
{
    /// <summary>The amount that so many minor units make, with the currency's digits (0–4).</summary>
    public static decimal ToMoney(long minor, int digits) => minor / PowerOfTen(digits);

    /// <summary>The minor units of an exact amount, such as a budget.</summary>
    /// <exception cref="OverflowException">Beyond 64 bits.</exception>
    public static long OfMoney(decimal amount, int digits) => (long)Math.Round(amount * PowerOfTen(digits), MidpointRounding.AwayFromZero);

    private static decimal PowerOfTen(int digits) => digits switch
    {
        0 => 1m,
        1 => 10m,
        2 => 100m,
        3 => 1_000m,
        4 => 10_000m,
        _ => throw new ArgumentOutOfRangeException(nameof(digits), digits, "A minor unit has 0 to 4 digits."),
    };
}
