using System.Security.Cryptography;
using System.Text.Json;
using Portfolio.Server.Contracts;
using Portfolio.Server.Contracts.Subscriptions;
using Portfolio.Store.Outbox;
using Portfolio.Store.Subscriptions;

namespace Portfolio.Server.Events;

/// <summary>A subscription with what it wants.</summary>
internal sealed record Listener(string Portfolio, string Id, IReadOnlyList<WantedEventJson> Wishes)
{
    public static Listener Of(StoredSubscription stored) => new(
        stored.Portfolio, stored.Id, JsonSerializer.Deserialize(stored.Events, ApiContext.Default.IReadOnlyListWantedEventJson)!);

    /// <summary>
    /// Whether it is to be told: of plain events by their kind, of those that follow from a wish when it has that very wish.
    /// </summary>
    public bool Wants(OutboxEvent told)
    {
        var wish = Wish.Behind(told);
        return Wishes.Any(wanted => wish is null ? wanted.Type == told.Kind : wanted == wish);
    }
}

/// <summary>Wishes that have to be looked after: events that follow from one name it, so that it finds its listeners again.</summary>
internal static class Wish
{
    private const string Member = "wish";

    /// <summary>The wish that an event follows from; null for plain events.</summary>
    public static WantedEventJson? Behind(OutboxEvent told)
    {
        if (told.Kind is not (EventTypes.LevelMoved or EventTypes.CommitmentBelow or EventTypes.EstimatesStale))
            return null;
        using var payload = JsonDocument.Parse(told.Payload);
        return payload.RootElement.GetProperty(Member).Deserialize(ApiContext.Default.WantedEventJson);
    }

    /// <summary>A short name that equal wishes share.</summary>
    public static string NameOf(WantedEventJson wish)
    {
        var digest = SHA256.HashData(JsonSerializer.SerializeToUtf8Bytes(wish, ApiContext.Default.WantedEventJson));
        return $"{wish.Type}/{Convert.ToHexStringLower(digest)[..16]}";
    }

    /// <summary>The payload of an event that follows from a wish: the wish, then the figures.</summary>
    public static Dictionary<string, object?> Payload(WantedEventJson wish, params (string Name, object? Value)[] figures)
    {
        var payload = new Dictionary<string, object?>
        {
            [Member] = JsonSerializer.SerializeToElement(wish, ApiContext.Default.WantedEventJson),
        };
        foreach (var (name, value) in figures)
        {
            if (value is not null)
                payload.Add(name, value);
        }
        return payload;
    }
}
