using System.ComponentModel.DataAnnotations;

namespace Portfolio.Server.Events;

/// <summary>Events for those who listen (<c>Events</c>).</summary>
public sealed class EventOptions
{
    public const string Section = "Events";

    /// <summary>Days for which events, and what became of their deliveries, are kept.</summary>
    [Range(8, 3650)]
    public int KeptDays { get; set; } = 90;

    /// <summary>Stands before the portfolio's address in <c>source</c>, such as <c>https://risk.harbour.example</c>; usually nothing.</summary>
    [RegularExpression("https?://[^/?#\\s]+", ErrorMessage = "Events:Source must be like https://risk.harbour.example, without a path.")]
    public string? Source
    {
        get;
        set => field = string.IsNullOrEmpty(value) ? null : value;
    }

    public TimeSpan Kept => TimeSpan.FromDays(KeptDays);
}
