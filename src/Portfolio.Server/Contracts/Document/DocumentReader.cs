using System.Text.Json;
using System.Text.Json.Serialization.Metadata;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Contracts.Document;

/// <summary>From bytes to contract types and back. Throws <see cref="JsonRefused"/> for what is not JSON of the right shape (400).</summary>
public static class DocumentReader
{
    public static DocumentJson ReadDocument(ReadOnlySpan<byte> json) => Read(json, DocumentContext.Strict.DocumentJson);

    public static SettingsJson ReadSettings(ReadOnlySpan<byte> json) => Read(json, DocumentContext.Strict.SettingsJson);

    public static ProjectJson ReadProject(ReadOnlySpan<byte> json) => Read(json, DocumentContext.Strict.ProjectJson);

    /// <summary>The bytes in which settings are stored and digested: members in contract order, absent ones left out.</summary>
    public static byte[] Bytes(SettingsJson settings) => JsonSerializer.SerializeToUtf8Bytes(settings, DocumentContext.Strict.SettingsJson);

    /// <summary>The bytes in which a project is stored and digested.</summary>
    public static byte[] Bytes(ProjectJson project) => JsonSerializer.SerializeToUtf8Bytes(project, DocumentContext.Strict.ProjectJson);

    /// <summary>A document from its stored parts, which were checked when they were written.</summary>
    public static PortfolioDocument FromParts(ReadOnlySpan<byte> settings, IEnumerable<ReadOnlyMemory<byte>> projects)
    {
        var reading = new Reading();
        return new PortfolioDocument(
            ReadSettings(settings).ToModel(reading, "/settings"),
            [.. projects.Select((project, index) => ReadProject(project.Span).ToModel(reading, $"/projects/{index}"))]);
    }

    internal static T Read<T>(ReadOnlySpan<byte> json, JsonTypeInfo<T> type)
        where T : class
    {
        // A byte order mark is tolerated (RFC 8259, section 8.1).
        json = json.StartsWith("\uFEFF"u8) ? json[3..] : json;
        try
        {
            return JsonSerializer.Deserialize(json, type) ?? throw JsonRefused.Null("");
        }
        catch (JsonException refused)
        {
            throw JsonRefused.From(json, refused, type);
        }
    }
}
