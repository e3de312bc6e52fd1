namespace Portfolio.Store.Subscriptions;

/// <summary>Who wants to be told of what.</summary>
public sealed record StoredSubscription
{
    public required string Portfolio { get; init; }
    public required string Id { get; init; }
    public required string Url { get; init; }
    /// <summary>JSON array of what is wanted.</summary>
    public required string Events { get; init; }
    public required bool Active { get; init; }
    /// <summary>True when the server ended it because its target answered 410.</summary>
    public required bool Gone { get; init; }
    /// <summary>Attempts that failed since the last that did not.</summary>
    public required int Failures { get; init; }
    public required DateTimeOffset CreatedAt { get; init; }
    public required DateTimeOffset ChangedAt { get; init; }
    /// <summary>Until when the secret before the present one signs as well.</summary>
    public DateTimeOffset? PreviousSecretUntil { get; init; }
}

/// <summary>What a caller says of a subscription.</summary>
public sealed record SubscriptionContent(string Url, string Events, bool Active);

internal sealed record SubscriptionRow
{
    /// <summary>Of a subscription called <c>s</c>; secrets are not among them.</summary>
    public const string Columns =
        "s.portfolio, s.id, s.url, s.events, s.active, s.ended, s.failures, s.created_at, s.changed_at, s.previous_until";

    public string Portfolio { get; init; } = "";
    public string Id { get; init; } = "";
    public string Url { get; init; } = "";
    public string Events { get; init; } = "";
    public long Active { get; init; }
    public string? Ended { get; init; }
    public long Failures { get; init; }
    public long CreatedAt { get; init; }
    public long ChangedAt { get; init; }
    public long? PreviousUntil { get; init; }

    public StoredSubscription ToSubscription(long now) => new()
    {
        Portfolio = Portfolio,
        Id = Id,
        Url = Url,
        Events = Events,
        Active = Active == 1,
        Gone = Ended is not null,
        Failures = (int)Failures,
        CreatedAt = CreatedAt.ToInstant(),
        ChangedAt = ChangedAt.ToInstant(),
        PreviousSecretUntil = PreviousUntil > now ? PreviousUntil.ToInstant() : null,
    };
}
