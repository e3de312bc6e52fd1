using System.Text.Json;
using System.Xml.Linq;
using Microsoft.AspNetCore.OpenApi;
using Microsoft.OpenApi;

namespace Portfolio.Server.Reference;

/// <summary>The reference of all operations and schemas, made once from the description that the server gives of itself.</summary>
internal sealed class ApiReference([FromKeyedServices("v1")] IOpenApiDocumentProvider description)
{
    private string? page;

    /// <summary>Two first readers may both make it: they make the same.</summary>
    public async Task<string> PageAsync(CancellationToken cancellation)
    {
        if (page is null)
        {
            var document = await description.GetOpenApiDocumentAsync(cancellation);
            using var json = JsonDocument.Parse(await document.SerializeAsJsonAsync(OpenApiSpecVersion.OpenApi3_1, cancellation));
            page = Write(json.RootElement);
        }
        return page;
    }

    private static string Write(JsonElement api)
    {
        var operations = api.GetProperty("paths").EnumerateObject().SelectMany(path => path.Value.EnumerateObject()
            .Select(method => new OperationText(method.Name.ToUpperInvariant(), path.Name, method.Value))).ToLookup(each => each.Tag);
        var tags = api.GetProperty("tags").EnumerateArray().ToList();
        return Page.Of(
            "API reference",
            Page.Text(api.GetProperty("info").GetProperty("description").GetString()),
            new XElement(
                "p", "Present a key as ", Page.Code("Authorization: Bearer"), ", or as the password of Basic. What a refusal means stands under ",
                Page.Link("/problems", "problems"), "."),
            Contents(tags.Select(NameOf), operations),
            tags.Select(tag => Resource(tag, operations[NameOf(tag)])),
            Page.Section("schemas", 2, "Schemas", api.GetProperty("components").GetProperty("schemas").EnumerateObject().Select(Schema)));
    }

    private static XElement Contents(IEnumerable<string> tags, ILookup<string, OperationText> operations) => new(
        "nav", new XAttribute("aria-label", "Operations"),
        new XElement("h2", "Operations"),
        tags.Select(tag => Page.Table(
            tag, ["Operation", "Summary"],
            operations[tag].Select(each => new object[] { Page.Link("#" + each.Id, $"{each.Method} {each.Address}"), each.Summary }))));

    private static XElement Resource(JsonElement tag, IEnumerable<OperationText> operations) => Page.Section(
        "resource-" + NameOf(tag), 2, NameOf(tag),
        Page.Text(tag.TryGetProperty("description", out var text) ? text.GetString() : null),
        operations.Select(each => each.Section()));

    private static XElement Schema(JsonProperty schema) => Page.Section(
        SchemaText.IdOf(schema.Name), 3, schema.Name,
        Page.Text(schema.Value.TryGetProperty("description", out var text) ? text.GetString() : null),
        new XElement("p", "Type: ", SchemaText.Type(schema.Value)),
        SchemaText.Members(schema.Value, $"Members of {schema.Name}"));

    private static string NameOf(JsonElement tag) => tag.GetProperty("name").GetString()!;
}
