using System.Text.Json.Nodes;

namespace Portfolio.Server.Tests.Contract;

/// <summary>The smallest JSON that fits a schema of the description: required members alone, first words, least numbers.</summary>
internal sealed class SchemaSamples(DescribedApi api)
{
    public JsonNode? Smallest(JsonNode schema) => Named(schema) switch
    {
        _ when schema["const"] is { } constant => constant.DeepClone(),
        _ when schema["enum"] is JsonArray words => words[0]!.DeepClone(),
        { } named => Smallest(named),
        _ when schema["oneOf"] is JsonArray forms => Smallest(forms.First(form => TypeOf(form!) != "null")!),
        _ => OfType(schema),
    };

    /// <summary>The schema that a reference names; null when this is no reference.</summary>
    public JsonNode? Named(JsonNode schema) =>
        schema["$ref"]?.GetValue<string>() is { } reference ? api.Document["components"]!["schemas"]![NameOf(reference)] : null;

    public static string NameOf(string reference) => reference[(reference.LastIndexOf('/') + 1)..];

    /// <summary>Its type; of several the first that is not null.</summary>
    public static string? TypeOf(JsonNode schema) => schema["type"] switch
    {
        JsonArray types => types.Select(type => type!.GetValue<string>()).FirstOrDefault(type => type != "null"),
        { } type => type.GetValue<string>(),
        _ => null,
    };

    private JsonNode? OfType(JsonNode schema) => TypeOf(schema) switch
    {
        "object" => new JsonObject((schema["required"]?.AsArray() ?? []).Select(name => name!.GetValue<string>())
            .Select(name => new KeyValuePair<string, JsonNode?>(name, Smallest(schema["properties"]![name]!)))),
        "array" => new JsonArray([.. Enumerable.Repeat(schema, schema["minItems"]?.GetValue<int>() ?? 0).Select(list => Smallest(list["items"]!))]),
        "string" => OfFormat(schema["format"]?.GetValue<string>()),
        "integer" or "number" => schema["minimum"]?.DeepClone() ?? 1,
        "boolean" => true,
        _ => null,
    };

    private static JsonNode OfFormat(string? format) => format switch
    {
        "date" => "2027-01-04",
        "date-time" => "2027-01-04T12:00:00Z",
        "uri" => "https://example.com/",
        _ => "a",
    };
}
