using System.Text.Json;
using System.Text.Json.Serialization;

namespace Portfolio.Server.Contracts.Events;

/// <summary>Something that happened, as CloudEvents 1.0 writes it.</summary>
public sealed record EventJson
{
    /// <summary>Always <c>1.0</c>.</summary>
    [JsonPropertyName("specversion")]
    public required string SpecVersion { get; init; }

    /// <summary>Unique; the cursor after the event.</summary>
    public required string Id { get; init; }

    /// <summary>The portfolio's address.</summary>
    public required string Source { get; init; }

    /// <summary>Such as <c>portfolio.run.succeeded</c>.</summary>
    public required string Type { get; init; }

    /// <summary>What it happened to: a run's id, a revision's number, a scope.</summary>
    public required string Subject { get; init; }

    public required DateTimeOffset Time { get; init; }

    /// <summary>Always <c>application/json</c>.</summary>
    [JsonPropertyName("datacontenttype")]
    public required string DataContentType { get; init; }

    /// <summary>An object; its members depend on the type.</summary>
    public required JsonElement Data { get; init; }
}
