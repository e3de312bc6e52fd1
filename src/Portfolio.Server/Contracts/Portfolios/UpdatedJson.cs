namespace Portfolio.Server.Contracts.Portfolios;

/// <summary>Answer to updates, or to the question what they would change.</summary>
public sealed record UpdatedJson
{
    public required string Portfolio { get; init; }

    /// <summary>The revision that now stands.</summary>
    public required long Revision { get; init; }

    /// <summary>False when nothing differs from what was there; then no revision is made.</summary>
    public required bool Changed { get; init; }

    /// <summary>Only of a dry run: every place that the same request would change.</summary>
    public IReadOnlyList<ChangeJson>? Changes { get; init; }
}
