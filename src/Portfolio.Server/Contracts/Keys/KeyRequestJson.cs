using System.Text.Json.Serialization;

namespace Portfolio.Server.Contracts.Keys;

/// <summary>A key that shall be made, or what shall change of one (RFC 7396).</summary>
public sealed record KeyRequestJson
{
    /// <summary>Whose key it is, or what for.</summary>
    public string? Name { get; set => (field, HasName) = (value, true); }

    /// <summary>All of its grants.</summary>
    public IReadOnlyList<GrantJson>? Grants { get; set => (field, HasGrants) = (value, true); }

    /// <summary>RFC 3339 in UTC. Left out or null: never.</summary>
    public string? ExpiresAt { get; set => (field, HasExpiresAt) = (value, true); }

    [JsonIgnore]
    public bool HasName { get; private set; }

    [JsonIgnore]
    public bool HasGrants { get; private set; }

    [JsonIgnore]
    public bool HasExpiresAt { get; private set; }
}

/// <summary>How a key is rotated.</summary>
public sealed record RotationJson
{
    /// <summary>How long the text before still opens: 0…720 hours. Left out: 24.</summary>
    public double? OverlapHours { get; init; }
}
