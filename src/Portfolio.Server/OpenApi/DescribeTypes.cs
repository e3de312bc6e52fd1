using System.Text.Json.Serialization;
using Microsoft.AspNetCore.OpenApi;
using Microsoft.OpenApi;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Json;
using Portfolio.Server.Contracts.Results;

namespace Portfolio.Server.OpenApi;

/// <summary>Schemas of what is read by hand, which the generator cannot know, and what texts of the document may say.</summary>
internal static class DescribeTypes
{
    public static async Task Apply(OpenApiSchema schema, OpenApiSchemaTransformerContext context, CancellationToken cancellation)
    {
        var type = context.JsonTypeInfo.Type;
        if (type == typeof(DistributionJson))
            DistributionSchema.Write(schema);
        else if (type == typeof(DateTimeOffset) || type == typeof(DateTimeOffset?))
            (schema.Type, schema.Format) = (JsonSchemaType.String, "date-time");
        else if (type == typeof(LinkJson))
            LinkSchema.Write(schema);
        else if (type == typeof(DateOrMoney) || type == typeof(DateOrMoney?))
            DateOrMoneySchema.Write(schema);
        else if (DocumentMembers.Required.TryGetValue(type, out var required))
            Require(schema, required);
        // A nullable list of a type that is read by hand loses its items.
        if (context.JsonTypeInfo.ElementType is { } element && (element == typeof(LinkJson) || element == typeof(DistributionJson)))
            schema.Items = await context.GetOrCreateSchemaAsync(element, null, cancellation);
        if (context.JsonPropertyInfo is { } member && member.DeclaringType.Namespace == typeof(DocumentJson).Namespace)
            Describe(schema, member.Name, Converter(member.AttributeProvider));
    }

    private static void Require(OpenApiSchema schema, IReadOnlyList<string> members)
    {
        schema.Required = members.ToHashSet(StringComparer.Ordinal);
        foreach (var name in members)
            if (schema.Properties?[name] is OpenApiSchema member)
                member.Type &= ~JsonSchemaType.Null;
    }

    private static void Describe(OpenApiSchema schema, string member, Type? converter)
    {
        if (converter == typeof(WholeNumberConverter))
            (schema.Type, schema.Format) = (JsonSchemaType.Integer | JsonSchemaType.Null, "int64");
        else if (converter == typeof(AmountConverter))
            schema.Type = JsonSchemaType.Number | JsonSchemaType.Null;
        else if (DocumentMembers.Dates.Contains(member))
            Text(schema).Format = "date";
        else if (DocumentMembers.Words.TryGetValue(member, out var words))
            Text(schema).Enum = [.. words.Select(word => (System.Text.Json.Nodes.JsonNode)word)];
    }

    /// <summary>The schema itself, or that of its items when it is a list.</summary>
    private static OpenApiSchema Text(OpenApiSchema schema)
    {
        if (schema.Type?.HasFlag(JsonSchemaType.Array) != true)
            return schema;
        var items = new OpenApiSchema { Type = JsonSchemaType.String };
        schema.Items = items;
        return items;
    }

    private static Type? Converter(System.Reflection.ICustomAttributeProvider? member) =>
        member?.GetCustomAttributes(typeof(JsonConverterAttribute), inherit: false)
            .OfType<JsonConverterAttribute>().FirstOrDefault()?.ConverterType;
}
