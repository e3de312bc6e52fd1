namespace Portfolio.Server.Contracts.Portfolios;

/// <summary>Answer to a write of the document or of a part of it.</summary>
public sealed record WrittenJson
{
    public required string Portfolio { get; init; }

    /// <summary>The revision that now stands.</summary>
    public required long Revision { get; init; }

    /// <summary>False when nothing differed from what was there; then no revision was made.</summary>
    public required bool Changed { get; init; }
}
