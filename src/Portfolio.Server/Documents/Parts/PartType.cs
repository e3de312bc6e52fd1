using System.Text.Json.Serialization.Metadata;
using Portfolio.Server.Contracts.Document;

namespace Portfolio.Server.Documents.Parts;

/// <summary>What differs between things that have an address of their own: how each is read, written and named.</summary>
internal sealed record PartType<T>
{
    public required Func<DocumentReader, ReadOnlyMemory<byte>, T> Read { get; init; }

    public required Func<T, byte[]> Bytes { get; init; }

    /// <summary>Null when it was not sent; of settings always.</summary>
    public required Func<T, string?> Id { get; init; }

    public required Func<T, string, T> WithId { get; init; }

    public required JsonTypeInfo Json { get; init; }
}

internal static class PartTypes
{
    public static readonly PartType<SettingsJson> Settings = new()
    {
        Read = (reader, json) => reader.ReadSettings(json.Span),
        Bytes = DocumentReader.Bytes,
        Id = _ => null,
        WithId = (settings, _) => settings,
        Json = DocumentReader.SettingsType,
    };

    public static readonly PartType<ProjectJson> Project = new()
    {
        Read = (reader, json) => reader.ReadProject(json.Span),
        Bytes = DocumentReader.Bytes,
        Id = project => project.Id,
        WithId = (project, id) => project with { Id = id },
        Json = DocumentReader.ProjectType,
    };

    public static readonly PartType<ActivityJson> Activity = new()
    {
        Read = (reader, json) => reader.ReadActivity(json.Span),
        Bytes = DocumentReader.Bytes,
        Id = activity => activity.Id,
        WithId = (activity, id) => activity with { Id = id },
        Json = DocumentReader.ActivityType,
    };
}
