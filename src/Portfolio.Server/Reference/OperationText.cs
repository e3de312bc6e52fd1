using System.Text.Json;
using System.Xml.Linq;
using Portfolio.Server.OpenApi;

namespace Portfolio.Server.Reference;

/// <summary>One operation: address, what it does, who may, what it takes and what it answers.</summary>
internal sealed record OperationText(string Method, string Address, JsonElement Operation)
{
    public string Id => Operation.GetProperty("operationId").GetString()!;

    public string Tag => Operation.GetProperty("tags")[0].GetString()!;

    public string Summary => Text(Operation, "summary");

    public XElement Section() => Page.Section(
        Id, 3, new object[] { Page.Code($"{Method} {Address}") },
        Page.Text(Summary), Page.Text(Text(Operation, "description")),
        new XElement("p", "Right needed: ", Rights()),
        Parameters(), Body(), Answers());

    private string Rights() => Operation.TryGetProperty(DescribeRights.Name, out var rights)
        ? string.Join(" or ", rights.EnumerateArray().Select(right => right.GetString())) : "any valid key";

    private XElement? Parameters() => Page.Table(
        $"Parameters of {Id}", ["Name", "In", "Type", "Needed", "Meaning"],
        Members(Operation, "parameters").Select(parameter => new object[]
        {
            Page.Code(Text(parameter, "name")), Text(parameter, "in"),
            SchemaText.Type(parameter.GetProperty("schema")).ToArray(), Needed(parameter), Text(parameter, "description"),
        }));

    private XElement? Body() => !Operation.TryGetProperty("requestBody", out var body) ? null : Page.Table(
        $"Body of {Id}", ["Media type", "Type", "Needed", "Meaning"],
        body.GetProperty("content").EnumerateObject().Select(content => new object[]
        {
            Page.Code(content.Name), Schema(content.Value), Needed(body), Text(body, "description"),
        }));

    private XElement? Answers() => Page.Table(
        $"Answers of {Id}", ["Status", "Meaning", "Body", "Headers"],
        Operation.GetProperty("responses").EnumerateObject().OrderBy(answer => answer.Name, StringComparer.Ordinal)
            .Select(answer => new object[]
            {
                answer.Name, Text(answer.Value, "description"), Contents(answer.Value).ToArray(), Headers(answer.Value),
            }));

    private static IEnumerable<object> Contents(JsonElement answer)
    {
        if (!answer.TryGetProperty("content", out var contents))
            return ["none"];
        return contents.EnumerateObject().SelectMany((content, i) => new object[]
        {
            i == 0 ? "" : "; ", Page.Code(content.Name), " ", Schema(content.Value),
        });
    }

    private static string Headers(JsonElement answer) => answer.TryGetProperty("headers", out var headers)
        ? string.Join(", ", headers.EnumerateObject().Select(header => header.Name)) : "";

    private static object[] Schema(JsonElement content) =>
        content.TryGetProperty("schema", out var schema) ? [.. SchemaText.Type(schema)] : ["any"];

    private static string Needed(JsonElement owner) =>
        owner.TryGetProperty("required", out var needed) && needed.ValueKind == JsonValueKind.True ? "yes" : "no";

    private static IEnumerable<JsonElement> Members(JsonElement owner, string member) =>
        owner.TryGetProperty(member, out var list) ? list.EnumerateArray() : Enumerable.Empty<JsonElement>();

    private static string Text(JsonElement owner, string member) =>
        owner.TryGetProperty(member, out var text) ? text.GetString() ?? "" : "";
}
