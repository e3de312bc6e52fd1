using System.Text.Json;
using System.Text.RegularExpressions;
using Portfolio.Engine.Results;
using Portfolio.Model.Faults;
using Portfolio.Server.Contracts;
using Portfolio.Server.Contracts.Json;
using Portfolio.Server.Contracts.Subscriptions;
using Portfolio.Server.Webhooks;
using Portfolio.Store.Subscriptions;

namespace Portfolio.Server.Subscriptions;

/// <summary>A subscription that was sent, read and checked.</summary>
/// <param name="Id">Null: the server chooses.</param>
/// <param name="Faults">What is wrong with it; the rest is of use only when there are none.</param>
internal sealed partial record SubscriptionRequest(string? Id, SubscriptionContent Content, IReadOnlyList<Fault> Faults)
{
    private const int MostWanted = 100;

    private static readonly Place Body = new("", "subscription");

    /// <param name="address">The id in the address; null when one is made.</param>
    /// <param name="kept">The levels that runs keep.</param>
    public static SubscriptionRequest Of(
        SubscriptionRequestJson sent, string? address, TargetRule targets, IReadOnlyCollection<Level> kept)
    {
        var reading = new Reading();
        CheckId(reading, sent.Id, address);
        var url = reading.Required(Body, "url", sent.Url);
        if (!string.IsNullOrEmpty(url))
        {
            foreach (var flaw in targets.Check(url))
                reading.Refuse(Body, "url", flaw.Code, $"'url' {flaw.Message}");
        }
        var events = Wanted(reading, sent.Events, kept);
        var content = new SubscriptionContent(
            url, JsonSerializer.Serialize(events, ApiContext.Default.IReadOnlyListWantedEventJson), sent.Active ?? true);
        return new SubscriptionRequest(address ?? sent.Id, content, reading.Faults);
    }

    private static void CheckId(Reading reading, string? sent, string? address)
    {
        if (address is null && sent is not null && !Id64().IsMatch(sent))
        {
            reading.Refuse(
                Body, "id", SubscriptionCodes.IdFormat,
                "'id' must begin with a letter or digit and hold at most 64 letters, digits, dots, hyphens and underscores.");
        }
        else if (address is not null && sent is not null && sent != address)
            reading.Refuse(Body, "id", SubscriptionCodes.IdFixed, "'id' must be left out or equal the address.");
    }

    [GeneratedRegex(@"^[A-Za-z0-9][A-Za-z0-9._-]{0,63}\z")]
    private static partial Regex Id64();

    private static IReadOnlyList<WantedEventJson> Wanted(
        Reading reading, IReadOnlyList<WantedEventJson>? sent, IReadOnlyCollection<Level> kept)
    {
        if (sent is null)
            reading.Missing(Body, "events");
        else if (sent.Count == 0)
            reading.Refuse(Body, "events", SubscriptionCodes.NothingWanted, "'events' must name at least one thing to be told of.");
        else if (sent.Count > MostWanted)
            reading.Refuse(Body, "events", SubscriptionCodes.TooManyWanted, $"'events' may name {MostWanted} things at most.");
        var rules = new WantedRules(reading, kept);
        var seen = new HashSet<WantedEventJson>();
        return reading.List(Body, "events", sent, (wanted, place) =>
        {
            var faults = reading.Faults.Count;
            var whole = rules.Read(wanted, place);
            if (reading.Faults.Count == faults && !seen.Add(whole))
                reading.Faults.Add(new Fault(place.Path, place.Subject, SubscriptionCodes.WantedTwice, "The same stands here twice."));
            return whole;
        });
    }
}
