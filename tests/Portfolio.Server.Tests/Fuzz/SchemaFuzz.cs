using System.Text.Json.Nodes;
using Portfolio.Server.Tests.Contract;
using Portfolio.Server.Tests.Outside;

namespace Portfolio.Server.Tests.Fuzz;

/// <summary>Random JSON that mostly fits a schema of the description.</summary>
internal sealed class SchemaFuzz(DescribedApi api, Dice dice)
{
    private const int Deepest = 9;

    private static readonly string[] Ids =
        ["A0", "A1", "first", "M", "A", "weir", "project-0", "project-1", "north", "driver-0", "driver/driver-0", "project/project-0"];

    private readonly SchemaSamples samples = new(api);

    public JsonNode? Any(JsonNode schema, int depth = 0)
    {
        if (dice.Chance(0.03) || depth > Deepest || schema is not JsonObject)
            return NastyValues.Any(dice);
        if (samples.Named(schema) is { } named)
            return Any(named, depth + 1);
        if (schema["const"] is { } constant)
            return constant.DeepClone();
        if (schema["enum"] is JsonArray words)
            return dice.Pick(words)!.DeepClone();
        return schema["oneOf"] is JsonArray forms && schema["properties"] is null
            ? Any(dice.Pick(forms)!, depth + 1)
            : OfType(schema, depth);
    }

    private JsonNode? OfType(JsonNode schema, int depth) => SchemaSamples.TypeOf(schema) switch
    {
        "object" => Object(schema, depth),
        "array" => Dice.List(Enumerable.Range(0, dice.Whole(0, 3)).Select(_ => Any(schema["items"] ?? new JsonObject(), depth + 1))),
        "string" => Text(schema["format"]?.GetValue<string>()),
        "integer" => dice.Chance(0.2) ? NastyValues.Number(dice) : dice.Whole(0, 200),
        "number" => dice.Chance(0.2) ? NastyValues.Number(dice) : dice.Money(0, 100, 2),
        "boolean" => dice.Chance(0.5),
        _ => NastyValues.Any(dice),
    };

    private JsonObject Object(JsonNode schema, int depth)
    {
        var required = (schema["required"] as JsonArray ?? []).Select(name => name!.GetValue<string>()).ToHashSet(StringComparer.Ordinal);
        var made = new JsonObject();
        foreach (var (name, member) in schema["properties"] as JsonObject ?? [])
            if (dice.Chance(required.Contains(name) ? 0.97 : 0.4))
                made[name] = Any(member!, depth + 1);
        if (dice.Chance(0.03) || (schema["additionalProperties"] is JsonObject && dice.Chance(0.5)))
            made[dice.Chance(0.5) ? "more" : dice.Pick(NastyValues.Texts)] = dice.Pick(Ids);
        return made;
    }

    private string Text(string? format) => format switch
    {
        _ when dice.Chance(0.15) => dice.Pick(NastyValues.Texts),
        "date" => Dice.Date(RandomDocument.FirstStatus.AddDays(dice.Whole(-30, 400))),
        "date-time" => Dice.Date(RandomDocument.FirstStatus.AddDays(dice.Whole(-30, 400))) + "T12:00:00Z",
        _ => dice.Pick(Ids),
    };
}
