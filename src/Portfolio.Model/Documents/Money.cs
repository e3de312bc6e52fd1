namespace Portfolio.Model.Documents;

/// <summary>Rounding of money to the minor unit of its currency.</summary>
public static class Money
{
    // ISO 4217:2015 list one (as amended), currencies whose minor unit has not two digits.
    private static readonly Dictionary<string, int> OtherDigits = new(StringComparer.Ordinal)
    {
        ["BIF"] = 0, ["CLP"] = 0, ["DJF"] = 0, ["GNF"] = 0, ["ISK"] = 0, ["JPY"] = 0, ["KMF"] = 0, ["KRW"] = 0, ["PYG"] = 0,
        ["RWF"] = 0, ["UGX"] = 0, ["UYI"] = 0, ["VND"] = 0, ["VUV"] = 0, ["XAF"] = 0, ["XOF"] = 0, ["XPF"] = 0,
        ["BHD"] = 3, ["IQD"] = 3, ["JOD"] = 3, ["KWD"] = 3, ["LYD"] = 3, ["OMR"] = 3, ["TND"] = 3,
        ["CLF"] = 4, ["UYW"] = 4,
    };

    /// <summary>Digits after the decimal point of the currency's minor unit: 0, 2, 3 or 4.</summary>
    public static int MinorDigits(string currency) => OtherDigits.GetValueOrDefault(currency, 2);

    /// <summary>Minor units in one unit of the currency: 1, 100, 1000 or 10000.</summary>
    public static double MinorPerUnit(string currency) => Math.Pow(10, MinorDigits(currency));

    /// <summary>The amount in whole minor units, half away from zero.</summary>
    public static double ToMinor(double amount, double minorPerUnit) => Math.Round(amount * minorPerUnit, MidpointRounding.AwayFromZero);
}
