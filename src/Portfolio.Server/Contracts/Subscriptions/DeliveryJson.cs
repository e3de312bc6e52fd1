using Portfolio.Store.Deliveries;

namespace Portfolio.Server.Contracts.Subscriptions;

/// <summary>One event on its way to one subscription.</summary>
public sealed record DeliveryJson
{
    public required string Id { get; init; }

    /// <summary>Id of the event; receivers see it as <c>webhook-id</c>.</summary>
    public required string Event { get; init; }

    /// <summary>Such as <c>portfolio.run.succeeded</c>.</summary>
    public required string Type { get; init; }

    public required string Subject { get; init; }

    /// <summary><c>waiting</c>, <c>sending</c>, <c>delivered</c> or <c>dead</c>.</summary>
    public required string State { get; init; }

    /// <summary>Attempts made.</summary>
    public required int Attempts { get; init; }

    public DateTimeOffset? NextAttemptAt { get; init; }

    /// <summary>After this it is not tried again.</summary>
    public required DateTimeOffset GiveUpAt { get; init; }

    public DateTimeOffset? LastAttemptAt { get; init; }

    /// <summary>HTTP status of the last answer.</summary>
    public int? LastStatus { get; init; }

    /// <summary>Why the last attempt failed.</summary>
    public string? LastError { get; init; }

    public DateTimeOffset? DeliveredAt { get; init; }

    internal static DeliveryJson From(StoredDelivery stored) => new()
    {
        Id = stored.Id,
        Event = stored.Event.Id,
        Type = Server.Events.EventTypes.Of(stored.Event.Kind),
        Subject = stored.Event.Subject,
        State = DeliveryWords.Of(stored.State),
        Attempts = stored.Attempt,
        NextAttemptAt = stored.NextAttemptAt,
        GiveUpAt = stored.GiveUpAt,
        LastAttemptAt = stored.LastAttemptAt,
        LastStatus = stored.LastStatus,
        LastError = stored.LastError,
        DeliveredAt = stored.DeliveredAt,
    };
}
