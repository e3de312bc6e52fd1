using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Http;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Documents;

/// <summary>
/// Which revision was current at the end of a local date. Asked by the server itself: who may only submit sees neither revisions nor
/// settings, but what it may read it may read as it was then.
/// </summary>
internal sealed class RevisionOfDate(DocumentStore documents)
{
    /// <summary>Null when the portfolio had none yet.</summary>
    public async Task<long?> FindAsync(string portfolio, DateOnly date, CancellationToken cancellation)
    {
        var zone = await ZoneAsync(portfolio, cancellation);
        return (await documents.FindRevisionAtAsync(Caller.System, portfolio, LocalDates.EndOf(date, zone), cancellation))?.Number;
    }

    /// <summary>The zone of a portfolio's local dates.</summary>
    public async Task<TimeZoneInfo> ZoneAsync(string portfolio, CancellationToken cancellation)
    {
        var settings = await documents.ReadPartAsync(Caller.System, portfolio, PartNames.Settings, null, cancellation);
        return settings is null || DocumentReader.OfStored.ReadSettings(settings.Bytes).TimeZone is not { } zone
            ? TimeZoneInfo.Utc
            : TimeZoneInfo.FindSystemTimeZoneById(zone);
    }
}
