using System.Text.Json;
using System.Xml.Linq;

namespace Portfolio.Server.Reference;

/// <summary>What a schema says, in words with links to the schemas it names.</summary>
internal static class SchemaText
{
    private const string Schemas = "#/components/schemas/";

    public static string IdOf(string schema) => "schema-" + schema;

    /// <summary>One line: <c>text (date) or null</c>, <c>list of Activity</c>, <c>"FS" or "SS"</c>; null comes last.</summary>
    public static IEnumerable<object> Type(JsonElement schema)
    {
        if (schema.ValueKind != JsonValueKind.Object)
            return ["any"];
        if (Text(schema, "$ref") is { } reference)
            return [Page.Link("#" + IdOf(reference[Schemas.Length..]), reference[Schemas.Length..])];
        if (schema.TryGetProperty("const", out var only))
            return [Page.Code(only.GetRawText())];
        if (schema.TryGetProperty("enum", out var words))
            return Joined(words.EnumerateArray().Select(word => (IEnumerable<object>)[Page.Code(word.GetRawText())]));
        var forms = schema.TryGetProperty("oneOf", out var one) ? one : schema.TryGetProperty("anyOf", out var any) ? any : default;
        if (forms.ValueKind == JsonValueKind.Array && !schema.TryGetProperty("properties", out _))
            return Joined(forms.EnumerateArray().Select(form => Type(form).ToList())
                .DistinctBy(string.Concat).OrderBy(form => form is ["null"]));
        return Joined(Types(schema).Select(type => Plain(type, schema)));
    }

    /// <summary>The members of an object, one row each; of a choice, those of each form.</summary>
    public static IEnumerable<XElement?> Members(JsonElement schema, string caption)
    {
        if (schema.TryGetProperty("properties", out var members))
        {
            var needed = schema.TryGetProperty("required", out var names)
                ? names.EnumerateArray().Select(name => name.GetString()).ToHashSet(StringComparer.Ordinal) : [];
            yield return Page.Table(caption, ["Member", "Type", "Needed", "Meaning"], members.EnumerateObject().Select(member => new object[]
            {
                Page.Code(member.Name), Type(member.Value).ToArray(), needed.Contains(member.Name) ? "yes" : "no", Meaning(member.Value),
            }));
            yield break;
        }
        if (!schema.TryGetProperty("oneOf", out var forms))
            yield break;
        foreach (var form in forms.EnumerateArray().Where(form => form.TryGetProperty("properties", out _)))
            foreach (var table in Members(form, Text(form, "description") ?? NameOf(form)))
                yield return table;
    }

    private static string NameOf(JsonElement form) =>
        form.GetProperty("properties").TryGetProperty("type", out var type) && type.TryGetProperty("const", out var name)
            ? $"With type {name.GetString()}" : "As an object";

    private static string Meaning(JsonElement member)
    {
        if (Text(member, "description") is { } own)
            return own;
        return member.TryGetProperty("oneOf", out var forms)
            ? string.Join(" ", forms.EnumerateArray().Select(form => Text(form, "description")).OfType<string>()) : "";
    }

    private static IEnumerable<object> Plain(string type, JsonElement schema) => type switch
    {
        "array" => ["list of ", .. Type(schema.TryGetProperty("items", out var items) ? items : default)],
        "object" when schema.TryGetProperty("additionalProperties", out var values) && values.ValueKind == JsonValueKind.Object =>
            ["object of ", .. Type(values)],
        "null" => ["null"],
        "object" => ["object"],
        _ => [(type == "string" ? "text" : type) + Narrowed(schema)],
    };

    private static string Narrowed(JsonElement schema)
    {
        string[] keys = ["format", "minimum", "maximum", "exclusiveMinimum", "exclusiveMaximum", "minLength", "maxLength", "pattern"];
        var said = keys.Where(key => schema.TryGetProperty(key, out _))
            .Select(key => key == "format" ? Text(schema, key)! : $"{key} {schema.GetProperty(key)}").ToList();
        return said.Count == 0 ? "" : $" ({string.Join(", ", said)})";
    }

    private static IEnumerable<string> Types(JsonElement schema)
    {
        if (!schema.TryGetProperty("type", out var type))
            return ["any"];
        return type.ValueKind == JsonValueKind.Array
            ? type.EnumerateArray().Select(each => each.GetString()!).OrderBy(each => each == "null") : [type.GetString()!];
    }

    private static IEnumerable<object> Joined(IEnumerable<IEnumerable<object>> forms) =>
        forms.SelectMany((form, i) => i == 0 ? form : form.Prepend(" or "));

    private static string? Text(JsonElement schema, string member) =>
        schema.TryGetProperty(member, out var text) && text.ValueKind == JsonValueKind.String ? text.GetString() : null;
}
