using Portfolio.Model.Faults;
using Portfolio.Server.Contracts.Document;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Documents;

/// <summary>A portfolio's currency stays once figures exist in it.</summary>
internal static class FixedCurrency
{
    /// <param name="stored">The settings before; null when there are none.</param>
    /// <param name="path">Pointer of the currency in what was sent.</param>
    public static async Task<Fault?> CheckAsync(Head head, byte[]? stored, string? currency, string path)
    {
        if (stored is null)
            return null;
        var before = DocumentReader.OfStored.ReadSettings(stored).Currency;
        if (before == currency || !await head.HasRunsAsync())
            return null;
        return new Fault(path, "settings", FaultCodes.CurrencyFixed, $"The currency stays {before}: runs were made in it.");
    }
}
