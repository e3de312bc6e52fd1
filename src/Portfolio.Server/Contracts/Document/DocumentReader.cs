using System.Text.Json;
using System.Text.Json.Nodes;
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

    /// <summary>What each type of part is made of.</summary>
    public static readonly JsonTypeInfo SettingsType = OfStored.context.SettingsJson;
    public static readonly JsonTypeInfo ProjectType = OfStored.context.ProjectJson;
    public static readonly JsonTypeInfo ActivityType = OfStored.context.ActivityJson;

    /// <summary>Any JSON, written as parts are.</summary>
    public static readonly JsonTypeInfo<JsonNode> AnyType = OfStored.context.JsonNode;

    private static readonly DocumentContext Writing = DocumentContext.ForWriting(64);

    private readonly DocumentContext context = DocumentContext.Strict(maxDepth);

    // Settings stand one level below the document, projects two.
    private readonly DocumentContext belowDocument = DocumentContext.Strict(maxDepth - 1);
    private readonly DocumentContext inList = DocumentContext.Strict(maxDepth - 2);

    /// <summary>
    /// Projects are read beside each other. What is not a document at once is read again as a whole, to say what is wrong.
    /// </summary>
    public DocumentJson ReadDocument(ReadOnlyMemory<byte> json)
    {
        json = WithoutMark(json.Span) is var plain && plain.Length < json.Length ? json[^plain.Length..] : json;
        return ReadSlices(json) ?? Read(json.Span, context.DocumentJson);
    }

    public SettingsJson ReadSettings(ReadOnlySpan<byte> json) => Read(json, context.SettingsJson);

    public ProjectJson ReadProject(ReadOnlySpan<byte> json) => Read(json, context.ProjectJson);

    public ActivityJson ReadActivity(ReadOnlySpan<byte> json) => Read(json, context.ActivityJson);

    public UpdatesJson ReadUpdates(ReadOnlySpan<byte> json) => Read(json, context.UpdatesJson);

    /// <summary>Any JSON value, as long as no object in it names a member twice.</summary>
    public JsonElement ReadAny(ReadOnlySpan<byte> json)
    {
        json = WithoutMark(json);
        try
        {
            var read = JsonSerializer.Deserialize(json, context.JsonElement);
            JsonRefused.WhereTextsAreBroken(json);
            return read;
        }
        catch (JsonException refused)
        {
            throw JsonRefused.From(json, refused, context.JsonElement, maxDepth);
        }
    }

    /// <summary>The bytes in which settings are stored and digested: members in contract order, absent ones left out.</summary>
    public static byte[] Bytes(SettingsJson settings) => JsonSerializer.SerializeToUtf8Bytes(settings, Writing.SettingsJson);

    /// <summary>The bytes in which a project is stored and digested.</summary>
    public static byte[] Bytes(ProjectJson project) => JsonSerializer.SerializeToUtf8Bytes(project, Writing.ProjectJson);

    /// <summary>The bytes in which an activity is digested and served on its own: those that stand for it in its project.</summary>
    public static byte[] Bytes(ActivityJson activity) => JsonSerializer.SerializeToUtf8Bytes(activity, Writing.ActivityJson);

    /// <summary>A document from its stored parts, which were checked when they were written.</summary>
    public static PortfolioDocument FromParts(ReadOnlySpan<byte> settings, IReadOnlyList<ReadOnlyMemory<byte>> projects) => new(
        OfStored.ReadSettings(settings).ToModel(new Reading(), "/settings"),
        SideBySide.Each(projects, (project, index) => OfStored.ReadProject(project.Span).ToModel(new Reading(), $"/projects/{index}")));

    private DocumentJson? ReadSlices(ReadOnlyMemory<byte> json)
    {
        try
        {
            if (DocumentSlices.Of(json, maxDepth) is not { } slices)
                return null;
            var settings = slices.Settings is { } sent ? JsonSerializer.Deserialize(sent.Span, belowDocument.SettingsJson) : null;
            var projects = SideBySide.Each(slices.Projects, (project, _) => JsonSerializer.Deserialize(project.Span, inList.ProjectJson)!);
            return new DocumentJson { Settings = settings, Projects = projects };
        }
        catch (Exception refused) when (refused is JsonException or InvalidOperationException)
        {
            return null;
        }
    }

    // A byte order mark is tolerated (RFC 8259, section 8.1).
    private static ReadOnlySpan<byte> WithoutMark(ReadOnlySpan<byte> json) => json.StartsWith("\uFEFF"u8) ? json[3..] : json;

    private T Read<T>(ReadOnlySpan<byte> json, JsonTypeInfo<T> type)
        where T : class
    {
        json = WithoutMark(json);
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
