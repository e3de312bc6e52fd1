using System.Text.Json;
using System.Text.Json.Serialization.Metadata;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Contracts.Document;

/// <summary>
/// From bytes to contract types and back. Reading throws <see cref="JsonRefused"/> for what is not JSON of the right shape (400).
/// </summary>
/// <param name="maxDepth">Deepest nesting that is read.</param>
public sealed class DocumentReader(int maxDepth)
{
    /// <summary>For what is stored: it was read with the limits of its day.</summary>
    public static readonly DocumentReader OfStored = new(64);

    private readonly DocumentContext context = DocumentContext.Strict(maxDepth);

    public DocumentJson ReadDocument(ReadOnlySpan<byte> json) => Read(json, context.DocumentJson);

    public SettingsJson ReadSettings(ReadOnlySpan<byte> json) => Read(json, context.SettingsJson);

    public ProjectJson ReadProject(ReadOnlySpan<byte> json) => Read(json, context.ProjectJson);

    /// <summary>The bytes in which settings are stored and digested: members in contract order, absent ones left out.</summary>
    public static byte[] Bytes(SettingsJson settings) => JsonSerializer.SerializeToUtf8Bytes(settings, OfStored.context.SettingsJson);

    /// <summary>The bytes in which a project is stored and digested.</summary>
    public static byte[] Bytes(ProjectJson project) => JsonSerializer.SerializeToUtf8Bytes(project, OfStored.context.ProjectJson);

    /// <summary>A document from its stored parts, which were checked when they were written.</summary>
    public static PortfolioDocument FromParts(ReadOnlySpan<byte> settings, IEnumerable<ReadOnlyMemory<byte>> projects)
    {
        var reading = new Reading();
        return new PortfolioDocument(
            OfStored.ReadSettings(settings).ToModel(reading, "/settings"),
            [.. projects.Select((project, index) => OfStored.ReadProject(project.Span).ToModel(reading, $"/projects/{index}"))]);
    }

    private T Read<T>(ReadOnlySpan<byte> json, JsonTypeInfo<T> type)
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
            throw JsonRefused.From(json, refused, type, maxDepth);
        }
    }
}
