using System.Text.Json;
using System.Text.Json.Nodes;
using Json.Schema;

namespace Portfolio.Server.Tests.Contract;

/// <summary>What the API's description promises, made ready for checking answers: operations by address, schemas compiled once.</summary>
internal sealed class DescribedApi
{
    private const string Id = "https://portfolio.invalid/api";

    private readonly BuildOptions building = new() { SchemaRegistry = new SchemaRegistry() };

    public DescribedApi(string description)
    {
        Document = JsonNode.Parse(description)!.AsObject();
        var schemas = Document["components"]?["schemas"]?.DeepClone() ?? new JsonObject();
        Compile(new JsonObject { ["$id"] = Id, ["$defs"] = schemas });
        Problem = Compile(new JsonObject { ["$ref"] = $"{Id}#/$defs/Problem" });
        Operations = [.. Document["paths"]!.AsObject().SelectMany(path => OperationsOf(path.Key, path.Value!.AsObject()))];
    }

    public JsonObject Document { get; }

    public IReadOnlyList<DescribedOperation> Operations { get; }

    public JsonSchema Problem { get; }

    /// <summary>The operations at an address, one of each method: as in routing, that of the template with the most literal segments.</summary>
    public IReadOnlyList<DescribedOperation> At(string path) =>
        [.. Operations.Where(operation => operation.Fits(path)).OrderBy(operation => operation.Parameters).DistinctBy(operation => operation.Method)];

    private IEnumerable<DescribedOperation> OperationsOf(string template, JsonObject path) =>
        path.Where(member => member.Key is "get" or "put" or "post" or "patch" or "delete")
            .Select(member => (Method: member.Key.ToUpperInvariant(), Operation: member.Value!.AsObject()))
            .Select(member => new DescribedOperation(template, member.Method, member.Operation, ResponsesOf(member.Operation)));

    private Dictionary<int, DescribedResponse> ResponsesOf(JsonNode operation) => operation["responses"]!.AsObject().ToDictionary(
        response => int.Parse(response.Key, System.Globalization.CultureInfo.InvariantCulture),
        response => new DescribedResponse(
            [.. Members(response.Value!["headers"]).Where(header => (bool?)header.Value!["required"] == true).Select(header => header.Key)],
            Members(response.Value["content"]).ToDictionary(
                content => content.Key,
                content => content.Value!["schema"] is { } schema ? Compile(schema.DeepClone().AsObject()) : null)));

    private static JsonObject Members(JsonNode? node) => node as JsonObject ?? [];

    private JsonSchema Compile(JsonObject schema)
    {
        schema["$schema"] = "https://json-schema.org/draft/2020-12/schema";
        var text = schema.ToJsonString().Replace("\"#/components/schemas/", $"\"{Id}#/$defs/", StringComparison.Ordinal);
        return JsonSchema.Build(JsonDocument.Parse(text).RootElement, building);
    }
}

/// <param name="Template">As in <c>/v1/portfolios/{portfolio}</c>.</param>
/// <param name="Description">The operation as it is described.</param>
internal sealed record DescribedOperation(
    string Template, string Method, JsonObject Description, IReadOnlyDictionary<int, DescribedResponse> Responses)
{
    private readonly string[] segments = Template.Split('/');

    public string Name => Description["operationId"]?.GetValue<string>() ?? $"{Method} {Template}";

    /// <summary>The rights of which any one opens it; null when any key does.</summary>
    public IReadOnlyList<string>? Rights => Description["x-rights"]?.AsArray().Select(right => right!.GetValue<string>()).ToList();

    /// <summary>The media type in which a body is sent, JSON where it may be; null when it takes none.</summary>
    public string? BodyType => BodyTypes.OrderBy(type => type.EndsWith("json", StringComparison.Ordinal) ? 0 : 1).FirstOrDefault();

    /// <summary>Every media type in which a body may be sent.</summary>
    public IReadOnlyList<string> BodyTypes => [.. Content?.Select(type => type.Key) ?? []];

    /// <summary>Names of the parameters of the query, and of headers.</summary>
    public IReadOnlyList<string> Query => ParametersIn("query");

    public IReadOnlyList<string> Headers => ParametersIn("header");

    /// <summary>Names of the parameters of the address.</summary>
    public IReadOnlyList<string> PathParameters => [.. segments.Where(IsParameter).Select(segment => segment.Trim('{', '}'))];

    /// <summary>The schema's name; empty when it has none.</summary>
    public string BodyName => BodySchema?["$ref"]?.GetValue<string>() is { } reference ? SchemaSamples.NameOf(reference) : "";

    public JsonNode? BodySchema => BodyType is { } type ? Content![type]!["schema"] : null;

    private IReadOnlyList<string> ParametersIn(string place) =>
        [.. (Description["parameters"] as JsonArray ?? []).Where(each => each!["in"]!.GetValue<string>() == place)
            .Select(each => each!["name"]!.GetValue<string>())];

    private JsonObject? Content => Description["requestBody"]?["content"]?.AsObject();

    /// <summary>How many segments are parameters.</summary>
    public int Parameters => segments.Count(IsParameter);

    public bool Fits(string path)
    {
        var asked = path.TrimEnd('/').Split('/');
        return asked.Length == segments.Length
            && segments.Zip(asked).All(pair => IsParameter(pair.First) ? pair.Second.Length > 0 : pair.First == pair.Second);
    }

    private static bool IsParameter(string segment) => segment.StartsWith('{');
}

/// <param name="Headers">Those that every such answer carries.</param>
/// <param name="Content">Schemas by media type; null for a type without one.</param>
internal sealed record DescribedResponse(IReadOnlyList<string> Headers, IReadOnlyDictionary<string, JsonSchema?> Content);
