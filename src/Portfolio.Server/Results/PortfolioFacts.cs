using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Json;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Results;

/// <summary>
/// The settings by which the figures of a revision are read. For requests that may read the figures: no right to the settings is asked for.
/// </summary>
internal sealed class PortfolioFacts(DocumentStore documents)
{
    /// <param name="revision">Null: the newest.</param>
    public async Task<(int Digits, DayOfWeek WeekEnds)> OfAsync(string portfolio, long? revision, CancellationToken cancellation)
    {
        var part = await documents.ReadPartAsync(Caller.System, portfolio, PartNames.Settings, revision, cancellation)
            ?? throw new InvalidOperationException($"Portfolio '{portfolio}' has no settings at revision {revision}.");
        var settings = DocumentReader.OfStored.ReadSettings(part.Bytes).ToModel(new Reading(), "");
        return (Money.MinorDigits(settings.Currency), settings.WeekEnds);
    }
}
