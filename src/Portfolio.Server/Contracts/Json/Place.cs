namespace Portfolio.Server.Contracts.Json;

/// <summary>
/// Where a thing stands in the JSON that was sent (RFC 6901 pointer) and what it is called in faults. The pointer is put together when it
/// is asked for: most places never see a fault.
/// </summary>
public readonly record struct Place
{
    private readonly string owner;
    private readonly string? list;
    private readonly int index;

    public Place(string path, string subject)
        : this(path, null, 0, subject)
    {
    }

    private Place(string owner, string? list, int index, string subject)
    {
        (this.owner, this.list, this.index) = (owner, list, index);
        Subject = subject;
    }

    public string Path => list is null ? owner : $"{owner}/{list}/{index}";

    public string Subject { get; }

    /// <summary>One of a list, all of whose entries share the owner's pointer.</summary>
    public static Place OfEntry(string owner, string list, int index, string subject) => new(owner, list, index, subject);

    /// <summary>A member of this thing, called the same in faults.</summary>
    public Place Under(string name) => new(Member(name), Subject);

    /// <summary>The pointer of a member of this thing.</summary>
    public string Member(string name) => $"{Path}/{Escape(name)}";

    public static string Escape(string name) =>
        name.AsSpan().ContainsAny('~', '/')
            ? name.Replace("~", "~0", StringComparison.Ordinal).Replace("/", "~1", StringComparison.Ordinal)
            : name;
}
