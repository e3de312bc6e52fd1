using System.Text.Json.Nodes;

namespace Portfolio.Server.Tests.Contract;

/// <summary>
/// What a client of one description of the API could trip over in a later one: less is offered, less is taken, or more is asked for.
/// Additions pass: clients ignore members and words of answers that they do not know.
/// </summary>
internal sealed class BreakingChanges
{
    private readonly JsonObject before;
    private readonly JsonObject after;
    private readonly List<string> found = [];

    // Schemas refer to each other in circles; each pair is compared once for each direction.
    private readonly HashSet<(string, string, bool)> compared = [];

    private BreakingChanges(JsonObject before, JsonObject after) => (this.before, this.after) = (before, after);

    public static IReadOnlyList<string> Between(JsonObject before, JsonObject after)
    {
        var changes = new BreakingChanges(before, after);
        changes.Paths();
        return changes.found;
    }

    private void Paths()
    {
        foreach (var (path, operations) in Members(before["paths"]))
        {
            if (after["paths"]?[path] is not { } now)
                found.Add($"{path}: the path is gone");
            else
                foreach (var (method, operation) in Members(operations))
                    if (now[method] is { } kept)
                        Operation($"{method.ToUpperInvariant()} {path}", operation!, kept);
                    else
                        found.Add($"{method.ToUpperInvariant()} {path}: the operation is gone");
        }
    }

    private void Operation(string at, JsonNode old, JsonNode now)
    {
        Parameters(at, Items(old["parameters"]), Items(now["parameters"]));
        Body(at, old["requestBody"], now["requestBody"]);
        foreach (var right in Words(old["x-rights"]).Except(now["x-rights"] is null ? Words(old["x-rights"]) : Words(now["x-rights"])))
            found.Add($"{at}: the right '{right}' no longer opens it");
        if (old["x-rights"] is null && now["x-rights"] is not null)
            found.Add($"{at}: a right is needed now");
        foreach (var (status, answer) in Members(old["responses"]))
        {
            if (now["responses"]?[status] is not { } kept)
            {
                found.Add($"{at}: the status {status} is gone");
                continue;
            }
            Contents($"{at} {status}", answer!["content"], kept["content"], asked: false);
            foreach (var header in Required(answer["headers"]).Except(Required(kept["headers"])))
                found.Add($"{at} {status}: the header {header} is no longer promised");
        }
    }

    private void Parameters(string at, IReadOnlyList<JsonNode> old, IReadOnlyList<JsonNode> now)
    {
        foreach (var parameter in old)
            if (now.FirstOrDefault(each => Name(each) == Name(parameter)) is { } kept)
                Schema($"{at} {Name(parameter)}", parameter["schema"], kept["schema"], asked: true);
            else
                found.Add($"{at}: the parameter {Name(parameter)} is gone");
        foreach (var parameter in now.Where(each => IsTrue(each["required"])))
            if (!IsTrue(old.FirstOrDefault(each => Name(each) == Name(parameter))?["required"]))
                found.Add($"{at}: the parameter {Name(parameter)} is required now");
    }

    private void Body(string at, JsonNode? old, JsonNode? now)
    {
        if (!IsTrue(old?["required"]) && IsTrue(now?["required"]))
            found.Add($"{at}: a body is required now");
        Contents($"{at} body", old?["content"], now?["content"], asked: true);
    }

    private void Contents(string at, JsonNode? old, JsonNode? now, bool asked)
    {
        foreach (var (type, content) in Members(old))
            if (now?[type] is { } kept)
                Schema(at, content!["schema"], kept["schema"], asked);
            else
                found.Add($"{at}: the media type {type} is gone");
    }

    /// <param name="asked">True of what clients send: it may only widen. False of what they receive: it may only narrow.</param>
    private void Schema(string at, JsonNode? old, JsonNode? now, bool asked)
    {
        if (old is null || now is null || !compared.Add(($"{old["$ref"] ?? at}", $"{now["$ref"] ?? at}", asked)))
            return;
        (old, now) = (Resolved(before, old), Resolved(after, now));
        var (narrow, wide) = asked ? (old, now) : (now, old);
        foreach (var type in Types(narrow).Where(type => Types(wide).Count > 0 && !Types(wide).Contains(type) && !(type == "integer" && Types(wide).Contains("number"))))
            found.Add($"{at}: {(asked ? "no longer takes" : "may now be")} {type}");
        Limits(at, old, now, asked);
        AllWords(at, old, now, asked);
        Properties(at, old, now, asked);
        Schema($"{at}[]", old["items"], now["items"], asked);
        Forms(at, Items(old["oneOf"]), Items(now["oneOf"]), asked);
    }

    private void Limits(string at, JsonNode old, JsonNode now, bool asked)
    {
        foreach (var (limit, sign) in new[] { ("maximum", 1), ("maxLength", 1), ("maxItems", 1), ("minimum", -1), ("minLength", -1), ("minItems", -1) })
        {
            var (was, limited) = (Number(old[limit]) * sign ?? double.PositiveInfinity, Number(now[limit]) * sign ?? double.PositiveInfinity);
            if (asked ? limited < was : limited > was)
                found.Add($"{at}: {limit} was {old[limit] ?? "absent"} and is {now[limit] ?? "absent"}");
        }
        foreach (var rule in new[] { "format", "pattern" })
            if ((asked ? now : old)[rule] is { } stated && $"{old[rule]}" != $"{now[rule]}")
                found.Add($"{at}: {rule} {(asked ? "is now" : "is no longer")} {stated}");
    }

    // Answers may use new words; clients are told to expect that.
    private void AllWords(string at, JsonNode old, JsonNode now, bool asked)
    {
        if (!asked || now["enum"] is null)
            return;
        if (old["enum"] is null)
            found.Add($"{at}: takes only certain words now");
        foreach (var word in Words(old["enum"]).Except(Words(now["enum"])))
            found.Add($"{at}: no longer takes '{word}'");
    }

    private void Properties(string at, JsonNode old, JsonNode now, bool asked)
    {
        foreach (var (name, member) in Members(old["properties"]))
            if (now["properties"]?[name] is { } kept)
                Schema($"{at}.{name}", member, kept, asked);
            else
                found.Add($"{at}: the member {name} is gone");
        var (was, required) = (Words(old["required"]), Words(now["required"]));
        foreach (var name in asked ? required.Except(was) : was.Except(required))
            found.Add($"{at}: the member {name} is {(asked ? "required now" : "no longer promised")}");
        if (asked && $"{old["additionalProperties"]}" != "false" && $"{now["additionalProperties"]}" == "false")
            found.Add($"{at}: other members are no longer taken");
    }

    private void Forms(string at, IReadOnlyList<JsonNode> old, IReadOnlyList<JsonNode> now, bool asked)
    {
        foreach (var form in old)
            if (now.FirstOrDefault(each => Mark(after, each) == Mark(before, form)) is { } kept)
                Schema($"{at}/{Mark(before, form)}", form, kept, asked);
            else if (asked)
                found.Add($"{at}: no longer takes {Mark(before, form)}");
        if (!asked && old.Count > 0)
            foreach (var form in now.Where(each => old.All(one => Mark(before, one) != Mark(after, each))))
                found.Add($"{at}: may now be {Mark(after, form)}");
    }

    /// <summary>By what one form of several is recognised in both descriptions.</summary>
    private static string Mark(JsonObject description, JsonNode form) =>
        form["$ref"]?.GetValue<string>() ?? Resolved(description, form)["properties"]?["type"]?["const"]?.GetValue<string>()
        ?? (Types(form) is { Count: > 0 } types ? string.Join('|', types) : form["required"]?.ToJsonString() ?? "anything");

    private static JsonNode Resolved(JsonObject description, JsonNode schema) =>
        schema["$ref"]?.GetValue<string>() is { } reference ? description["components"]!["schemas"]![SchemaSamples.NameOf(reference)]! : schema;

    private static IReadOnlyList<string> Types(JsonNode schema) => schema["type"] is JsonArray ? Words(schema["type"]) : schema["type"] is { } type ? [$"{type}"] : [];

    private static IEnumerable<string> Required(JsonNode? headers) => Members(headers).Where(header => IsTrue(header.Value?["required"])).Select(header => header.Key);

    private static List<string> Words(JsonNode? list) => [.. Items(list).Select(word => word.ToString())];

    private static List<JsonNode> Items(JsonNode? list) => [.. (list as JsonArray ?? []).OfType<JsonNode>()];

    private static IEnumerable<KeyValuePair<string, JsonNode?>> Members(JsonNode? node) => node as JsonObject ?? [];

    private static string Name(JsonNode parameter) => $"{parameter["in"]}:{parameter["name"]}";

    private static bool IsTrue(JsonNode? node) => node is JsonValue value && value.TryGetValue<bool>(out var flag) && flag;

    private static double? Number(JsonNode? node) => node is null ? null : double.Parse($"{node}", System.Globalization.CultureInfo.InvariantCulture);
}
