using Portfolio.Store.Outbox;

namespace Portfolio.Store.Deliveries;

/// <summary>
/// waiting → sending → delivered or dead; sending → waiting when an attempt fails or the process stops; dead or delivered → waiting when
/// somebody asks for it again.
/// </summary>
public enum DeliveryState
{
    Waiting,
    Sending,
    Delivered,
    Dead,
}

/// <summary>One event on its way to one subscription.</summary>
public sealed record StoredDelivery
{
    public required string Id { get; init; }
    public required OutboxEvent Event { get; init; }
    public required DeliveryState State { get; init; }
    /// <summary>Attempts made so far.</summary>
    public required int Attempt { get; init; }
    public DateTimeOffset? NextAttemptAt { get; init; }
    public required DateTimeOffset GiveUpAt { get; init; }
    public DateTimeOffset? LastAttemptAt { get; init; }
    /// <summary>HTTP status of the last answer.</summary>
    public int? LastStatus { get; init; }
    /// <summary>A sentence about the last attempt that failed.</summary>
    public string? LastError { get; init; }
    public DateTimeOffset? DeliveredAt { get; init; }
}

/// <summary>The words for the states, as kept and as asked for.</summary>
public static class DeliveryWords
{
    public static string Of(DeliveryState state) => state switch
    {
        DeliveryState.Waiting => "waiting",
        DeliveryState.Sending => "sending",
        DeliveryState.Delivered => "delivered",
        _ => "dead",
    };

    public static IReadOnlyList<string> All { get; } = [.. Enum.GetValues<DeliveryState>().Select(Of)];
}
