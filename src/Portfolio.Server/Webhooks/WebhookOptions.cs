using System.ComponentModel.DataAnnotations;

namespace Portfolio.Server.Webhooks;

/// <summary>How events are posted to subscriptions (<c>Webhooks</c>).</summary>
public sealed class WebhookOptions
{
    public const string Section = "Webhooks";

    /// <summary>Hosts, parted by commas, that may be called at any address, at any port and by plain <c>http</c>.</summary>
    public string AllowedHosts { get; set; } = "";

    /// <summary>Seconds that an attempt may take from connecting to the end of the answer.</summary>
    [Range(1, 120)]
    public int TimeoutSeconds { get; set; } = 10;

    /// <summary>Bytes of an answer that are read; nothing of it is kept.</summary>
    [Range(0, 1024 * 1024)]
    public int AnswerBytes { get; set; } = 16 * 1024;

    /// <summary>Deliveries under way at once in this process; at most half of them to targets whose last attempt failed.</summary>
    [Range(2, 256)]
    public int Senders { get; set; } = 8;

    /// <summary>Hours for which a delivery is tried.</summary>
    [Range(1, 168)]
    public int TriedHours { get; set; } = 24;

    /// <summary>Seconds after the first attempt that failed; each further wait is twice as long.</summary>
    [Range(1, 3600)]
    public int FirstRetrySeconds { get; set; } = 10;

    /// <summary>Seconds of the longest wait.</summary>
    [Range(1, 86_400)]
    public int LongestRetrySeconds { get; set; } = 3600;

    /// <summary>Hours for which a secret that was replaced signs beside the new one.</summary>
    [Range(0, 168)]
    public int SecretOverlapHours { get; set; } = 24;

    /// <summary>Subscriptions of one portfolio.</summary>
    [Range(1, 10_000)]
    public int Subscriptions { get; set; } = 200;

    public TimeSpan Timeout => TimeSpan.FromSeconds(TimeoutSeconds);

    /// <summary>Longer than an attempt can take: a sender that lives never loses its lease.</summary>
    public TimeSpan Lease => Timeout + TimeSpan.FromSeconds(20);

    public TimeSpan TriedFor => TimeSpan.FromHours(TriedHours);

    /// <summary>The allowed hosts as a set that knows no case.</summary>
    internal IReadOnlySet<string> Allowed() =>
        AllowedHosts.Split(',', StringSplitOptions.TrimEntries | StringSplitOptions.RemoveEmptyEntries)
            .ToHashSet(StringComparer.OrdinalIgnoreCase);
}
