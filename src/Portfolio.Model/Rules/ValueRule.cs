using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules;

/// <summary>
/// Dates, probabilities, amounts and other single values; each gives its fault or null. What could not be read (NaN,
/// <see cref="DateOnly.MinValue"/>) was reported by who read it and is passed over.
/// </summary>
internal static class ValueRule
{
    public static Fault? Date(DateOnly? date, Func<Place> at) =>
        date is not { } d || d == DateOnly.MinValue || (d >= Bounds.FirstDate && d <= Bounds.LastDate)
            ? null
            : at().Fault(RuleCodes.DateRange, $"{d:yyyy-MM-dd} is outside the years 1970 to 2199.");

    public static Fault? Probability(double probability, string what, Func<Place> at) =>
        probability is (>= 0 and <= 1) or double.NaN
            ? null
            : Finite(probability, at) ?? at().Fault(
                RuleCodes.ProbabilityRange, $"The probability of {what} is {probability}; it must lie between 0 and 1.");

    /// <summary>An exact amount: no more decimals than the currency's minor unit, and of a size money can have.</summary>
    public static Fault? Money(decimal? amount, int digits, Func<Place> at, bool negativeAllowed = false)
    {
        if (amount is not { } money) return null;
        if (Math.Abs(money) > (decimal)Bounds.Money)
            return at().Fault(RuleCodes.MoneyRange, $"{money} is too large: at most {Bounds.Money:0} units of the currency can be stated.");
        if (money < 0 && !negativeAllowed)
            return at().Fault(RuleCodes.MoneyNegative, $"{money} is negative; this amount must be 0 or more.");
        return decimal.Round(money, digits) == money
            ? null
            : at().Fault(FaultCodes.MoneyDecimals, $"{money} has more decimals than the currency; it has {digits}.");
    }

    public static Fault? Finite(double value, Func<Place> at) =>
        !double.IsInfinity(value) ? null : at().Fault(FaultCodes.NumberNotFinite, "The number is not finite: it is too large to be read.");

    /// <summary>A number within closed bounds, reported with <paramref name="code"/> outside them.</summary>
    public static Fault? Within(double value, double low, double high, string what, string code, Func<Place> at) =>
        (value >= low && value <= high) || double.IsNaN(value)
            ? null
            : Finite(value, at) ?? at().Fault(code, $"The {what} is {value}; it must lie between {low} and {high}.");
}
