using Portfolio.Store.Outbox;

namespace Portfolio.Store.Deliveries;

/// <summary>The secrets that sign for a subscription: the present one and, while it is being replaced, the one before.</summary>
public sealed record SigningSecrets(string Present, string? Previous)
{
    /// <summary>Says nothing: records print their members, and secrets must not reach a log.</summary>
    public override string ToString() => "(secrets)";
}

/// <summary>A claimed delivery. Every write about it carries the fence: once another sender has claimed it, none takes effect.</summary>
/// <param name="Attempt">Which attempt this is, from 1.</param>
/// <param name="GiveUpAt">No attempt is made after this instant.</param>
/// <param name="Failing">The last attempt at this subscription's target failed.</param>
public sealed record DeliveryLease(
    string Id, long Fence, int Attempt, DateTimeOffset GiveUpAt, string Subscription, string Url, bool Failing, SigningSecrets Secrets,
    OutboxEvent Event);

/// <summary>How an attempt ended.</summary>
/// <param name="Status">HTTP status of the answer; null when there was none.</param>
/// <param name="Error">A sentence about what failed; null when nothing did.</param>
/// <param name="RetryAt">Before it the target wants no further attempt; null when it did not say.</param>
public sealed record AttemptResult(int? Status, string? Error, DateTimeOffset? RetryAt = null);
