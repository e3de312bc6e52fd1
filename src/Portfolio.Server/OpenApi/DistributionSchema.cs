using Microsoft.OpenApi;
using Portfolio.Server.Contracts.Document;

namespace Portfolio.Server.OpenApi;

/// <summary>
/// A distribution: a number or one of eight closed objects told apart by their type. Written from the table that the reader goes by.
/// </summary>
internal static class DistributionSchema
{
    public static void Write(OpenApiSchema schema)
    {
        schema.Type = null;
        schema.OneOf =
        [
            Number(),
            .. DistributionForm.All.GroupBy(form => form.Type).Select(forms => Object([.. forms])),
        ];
    }

    private static OpenApiSchema Object(IReadOnlyList<DistributionForm> forms)
    {
        var schema = Closed(new Dictionary<string, IOpenApiSchema>
        {
            ["type"] = new OpenApiSchema { Type = JsonSchemaType.String, Const = forms[0].Type },
        });
        foreach (var name in forms.SelectMany(form => DistributionForm.NamesOf(form.Needs | form.May)).Distinct())
            schema.Properties!.Add(name, Number());
        if (forms[0].List is { } list)
            schema.Properties!.Add(list.List, Pairs(list));
        if (forms.Count == 1)
            schema.Required = Needed(forms[0]);
        else
            // Several forms of one type: exactly the members of one of them, beside the type.
            schema.OneOf = [.. forms.Select(form => new OpenApiSchema { Required = Needed(form), MaxProperties = Needed(form).Count })];
        return schema;
    }

    private static OpenApiSchema Pairs(PairNames names)
    {
        var pair = Closed(new Dictionary<string, IOpenApiSchema> { [names.First] = Number(), [names.Second] = Number() });
        pair.Required = new HashSet<string> { names.First, names.Second };
        return new OpenApiSchema { Type = JsonSchemaType.Array, Items = pair };
    }

    private static HashSet<string> Needed(DistributionForm form) =>
        ["type", .. DistributionForm.NamesOf(form.Needs), .. form.List is { } list ? [list.List] : Array.Empty<string>()];

    public static OpenApiSchema Number() => new() { Type = JsonSchemaType.Number };

    public static OpenApiSchema Closed(Dictionary<string, IOpenApiSchema> properties) =>
        new() { Type = JsonSchemaType.Object, Properties = properties, AdditionalPropertiesAllowed = false };
}

/// <summary>A predecessor: the id of an activity, or an object.</summary>
internal static class LinkSchema
{
    public static void Write(OpenApiSchema schema)
    {
        var link = DistributionSchema.Closed(new Dictionary<string, IOpenApiSchema>
        {
            ["activity"] = new OpenApiSchema { Type = JsonSchemaType.String },
            ["type"] = new OpenApiSchema
            {
                Type = JsonSchemaType.String,
                Enum = [.. Contracts.Json.Words.LinkTypes.All.Select(word => (System.Text.Json.Nodes.JsonNode)word)],
            },
            ["lag"] = DistributionSchema.Number(),
        });
        link.Required = new HashSet<string> { "activity" };
        schema.Type = null;
        schema.OneOf = [new OpenApiSchema { Type = JsonSchemaType.String }, link];
    }
}
