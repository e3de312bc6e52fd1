using Portfolio.Model.Faults;
using Portfolio.Server.Contracts.Document;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Documents;

/// <summary>A portfolio's currency stays once figures exist in it.</summary>
internal static class FixedCurrency
{
    /// <param name="stored">The settings before; null when there are none.</param>
    /// <param name="currency">As sent; that it is missing is for the rules to say.</param>
    /// <param name="path">Pointer of the currency in what was sent.</param>
    public static async Task<Fault?> CheckAsync(Head head, byte[]? stored, string? currency, string path)
    {
        if (stored is null || currency is null)
            return null;
        var before = DocumentReader.OfStored.ReadSettings(stored).Currency;
        if (before == currency || !await head.HasRunsAsync())
            return null;
        return new Fault(path, "settings", FaultCodes.CurrencyFixed, $"The currency stays {before}: runs were made in it.");
    }
}
