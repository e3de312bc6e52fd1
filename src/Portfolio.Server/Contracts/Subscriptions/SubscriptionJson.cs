using System.Text.Json;
using Portfolio.Store.Subscriptions;

namespace Portfolio.Server.Contracts.Subscriptions;

/// <summary>A subscription that is asked for.</summary>
public sealed record SubscriptionRequestJson
{
    /// <summary>Left out when making one: the server chooses. Cannot be changed.</summary>
    public string? Id { get; init; }

    /// <summary>Where events are posted to: <c>https</c>, port 443, a public address, unless the operator allows the host.</summary>
    public string? Url { get; init; }

    public IReadOnlyList<WantedEventJson>? Events { get; init; }

    /// <summary>Left out: true. While it is false nothing is sent and nothing is kept for later.</summary>
    public bool? Active { get; init; }
}

/// <summary>Where signed events are posted to.</summary>
public sealed record SubscriptionJson
{
    public required string Id { get; init; }

    public required string Url { get; init; }

    /// <summary>What it wants to be told of, with what was left out filled in.</summary>
    public required IReadOnlyList<WantedEventJson> Events { get; init; }

    public required bool Active { get; init; }

    /// <summary>Why the server has ended it: <c>gone</c> when its target answered 410.</summary>
    public string? Ended { get; init; }

    /// <summary>Attempts that failed since the last that did not.</summary>
    public required int Failures { get; init; }

    public required DateTimeOffset CreatedAt { get; init; }

    public required DateTimeOffset ChangedAt { get; init; }

    /// <summary>Until when the secret before the present one signs as well.</summary>
    public DateTimeOffset? PreviousSecretUntil { get; init; }

    /// <summary>What signatures are made with; shown once, when it is made.</summary>
    public string? Secret { get; init; }

    internal static SubscriptionJson From(StoredSubscription stored) => new()
    {
        Id = stored.Id,
        Url = stored.Url,
        Events = JsonSerializer.Deserialize(stored.Events, ApiContext.Default.IReadOnlyListWantedEventJson)!,
        Active = stored.Active,
        Ended = stored.Gone ? "gone" : null,
        Failures = stored.Failures,
        CreatedAt = stored.CreatedAt,
        ChangedAt = stored.ChangedAt,
        PreviousSecretUntil = stored.PreviousSecretUntil,
    };
}

/// <summary>How a secret is replaced.</summary>
public sealed record SecretRequestJson
{
    /// <summary>Hours, 0…168, for which the present secret signs as well. Left out: as the operator has set it, usually 24.</summary>
    public decimal? OverlapHours { get; init; }
}
