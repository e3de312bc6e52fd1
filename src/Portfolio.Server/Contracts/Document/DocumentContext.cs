using System.Text.Encodings.Web;
using System.Text.Json;
using System.Text.Json.Nodes;
using System.Text.Json.Serialization;

namespace Portfolio.Server.Contracts.Document;

/// <summary>Generated readers and writers of the portfolio document, strict as the API promises.</summary>
[JsonSerializable(typeof(DocumentJson))]
[JsonSerializable(typeof(SettingsJson))]
[JsonSerializable(typeof(ProjectJson))]
[JsonSerializable(typeof(ActivityJson))]
[JsonSerializable(typeof(UpdatesJson))]
[JsonSerializable(typeof(JsonElement))]
[JsonSerializable(typeof(JsonNode))]
internal sealed partial class DocumentContext : JsonSerializerContext
{
    /// <param name="maxDepth">Deepest nesting that is read.</param>
    public static DocumentContext Strict(int maxDepth) => new(StrictOptions(maxDepth));

    /// <summary>
    /// Also writes numbers that are too large to be any: never stored, written only to see that they differ from what is.
    /// </summary>
    public static DocumentContext ForWriting(int maxDepth) => new(new JsonSerializerOptions(StrictOptions(maxDepth))
    {
        NumberHandling = JsonNumberHandling.AllowNamedFloatingPointLiterals,
    });

    private static JsonSerializerOptions StrictOptions(int maxDepth) => new(JsonSerializerDefaults.Strict)
    {
        PropertyNamingPolicy = JsonNamingPolicy.CamelCase,
        DefaultIgnoreCondition = JsonIgnoreCondition.WhenWritingNull,
        MaxDepth = maxDepth,
        // Stored and served as application/json, never inside a page: letters stay readable.
        Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping,
    };
}
