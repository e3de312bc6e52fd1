namespace Portfolio.Server.Contracts.Json;

/// <summary>Where a thing stands in the JSON that was sent (RFC 6901 pointer) and what it is called in faults.</summary>
public readonly record struct Place(string Path, string Subject)
{
    /// <summary>The pointer of a member of this thing.</summary>
    public string Member(string name) => $"{Path}/{Escape(name)}";

    public static string Escape(string name) =>
        name.AsSpan().ContainsAny('~', '/')
            ? name.Replace("~", "~0", StringComparison.Ordinal).Replace("/", "~1", StringComparison.Ordinal)
            : name;
}
