namespace Portfolio.Server.Events;

/// <summary>What is said in the log about events and deliveries, by ids alone. Event ids 2100…2199 never change meaning.</summary>
internal static partial class EventLog
{
    [LoggerMessage(2100, LogLevel.Error, "Whether {Type} follows from run {Run} cannot be told.")]
    public static partial void LookFailed(ILogger log, string run, string type, Exception failure);

    [LoggerMessage(2101, LogLevel.Error, "Events could not be handed on; the next look tries again.")]
    public static partial void HandOnFailed(ILogger log, Exception failure);

    [LoggerMessage(2102, LogLevel.Error, "Deliveries could not be looked at; the next look tries again.")]
    public static partial void LookedInVain(ILogger log, Exception failure);

    [LoggerMessage(2103, LogLevel.Error, "Delivery {Delivery} could not be sent.")]
    public static partial void SendFailed(ILogger log, string delivery, Exception failure);

    [LoggerMessage(2104, LogLevel.Error, "How old the estimates of {Portfolio} are cannot be told; the next look tries again.")]
    public static partial void AgesFailed(ILogger log, string portfolio, Exception failure);

    [LoggerMessage(2110, LogLevel.Information, "Delivery {Delivery} to {Subscription} failed (attempt {Attempt}): {Reason}")]
    public static partial void AttemptFailed(ILogger log, string delivery, string subscription, int attempt, string reason);

    [LoggerMessage(2111, LogLevel.Warning, "Delivery {Delivery} to {Subscription} is given up after {Attempt} attempts.")]
    public static partial void GivenUp(ILogger log, string delivery, string subscription, int attempt);

    [LoggerMessage(2112, LogLevel.Warning, "Subscription {Subscription} has ended: its target is gone.")]
    public static partial void SubscriptionEnded(ILogger log, string subscription);

    [LoggerMessage(2120, LogLevel.Information, "{Count} old events were removed.")]
    public static partial void Forgotten(ILogger log, int count);
}
