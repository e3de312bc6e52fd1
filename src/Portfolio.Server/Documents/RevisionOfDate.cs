using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Http;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Documents;

/// <summary>Which revision was current at the end of a local date.</summary>
internal sealed class RevisionOfDate(DocumentStore documents)
{
    /// <summary>Null when the portfolio had none yet, or is not the caller's to see.</summary>
    public async Task<long?> FindAsync(Caller caller, string portfolio, DateOnly date, CancellationToken cancellation)
    {
        var zone = await ZoneAsync(portfolio, cancellation);
        return (await documents.FindRevisionAtAsync(caller, portfolio, LocalDates.EndOf(date, zone), cancellation))?.Number;
    }

    /// <summary>
    /// The zone of a portfolio's local dates. Read by the server itself: whoever may ask for a date need not see the settings.
    /// </summary>
    public async Task<TimeZoneInfo> ZoneAsync(string portfolio, CancellationToken cancellation)
    {
        var settings = await documents.ReadPartAsync(Caller.System, portfolio, PartNames.Settings, null, cancellation);
        return settings is null || DocumentReader.OfStored.ReadSettings(settings.Bytes).TimeZone is not { } zone
            ? TimeZoneInfo.Utc
            : TimeZoneInfo.FindSystemTimeZoneById(zone);
    }
}
