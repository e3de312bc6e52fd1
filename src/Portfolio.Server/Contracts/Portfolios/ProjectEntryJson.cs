using Portfolio.Model.Rules;

namespace Portfolio.Server.Contracts.Portfolios;

/// <summary>A project as listed, in document order.</summary>
public sealed record ProjectEntryJson
{
    public required string Id { get; init; }

    public string? Name { get; init; }

    public string? Programme { get; init; }

    /// <summary>How many it has.</summary>
    public required int Activities { get; init; }

    /// <summary>Entity tag of the project at its own address, as If-Match takes it.</summary>
    public required string Etag { get; init; }

    internal static ProjectEntryJson From(ProjectOutline outline, string etag) => new()
    {
        Id = outline.Id, Name = outline.Name, Programme = outline.Programme, Activities = outline.ActivityIds.Count, Etag = etag,
    };
}
