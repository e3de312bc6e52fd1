namespace Portfolio.Server.Contracts;

/// <summary>One page of a list.</summary>
public sealed record PageJson<T>
{
    public required IReadOnlyList<T> Items { get; init; }

    /// <summary>Cursor of the next page; absent on the last.</summary>
    public string? Next { get; init; }
}
