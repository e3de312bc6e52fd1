using System.Runtime.InteropServices;
using System.Text.Json;

namespace Portfolio.Server.Contracts.Json;

/// <summary>A place at which two JSON values differ; no value: it is not there.</summary>
public readonly record struct JsonChange(string Path, JsonElement? Old, JsonElement? New);

/// <summary>
/// What differs between two JSON values, as pointers in which lists of things with ids are taken as objects by id, so that a thing put in
/// between does not make all that follow look changed.
/// </summary>
public static class JsonChanges
{
    /// <param name="path">Pointer of the two.</param>
    /// <param name="old">Null: it was not there.</param>
    /// <param name="now">Null: it is there no longer.</param>
    /// <returns>In the order of the members now, what is gone last in its owner.</returns>
    public static IEnumerable<JsonChange> Between(string path, JsonElement? old, JsonElement? now)
    {
        if (old is not { } before || now is not { } after)
            return old is null && now is null ? [] : [new JsonChange(path, old, now)];
        if (JsonMarshal.GetRawUtf8Value(before).SequenceEqual(JsonMarshal.GetRawUtf8Value(after)))
            return [];
        if (before.ValueKind == JsonValueKind.Object && after.ValueKind == JsonValueKind.Object)
            return OfMembers(path, Members(before), Members(after));
        return Things(before) is { } things && Things(after) is { } left
            ? [.. Order(path, things, left), .. OfMembers(path, things, left)]
            : [new JsonChange(path, before, after)];
    }

    /// <summary>One change of the list when those that stay stand in another order.</summary>
    /// <param name="old">Ids before, in order.</param>
    /// <param name="now">Ids now, in order.</param>
    public static IEnumerable<JsonChange> Order(string path, IEnumerable<string> old, IReadOnlyCollection<string> now)
    {
        string[] before = [.. old.Intersect(now, StringComparer.Ordinal)];
        string[] after = [.. now.Intersect(before, StringComparer.Ordinal)];
        return before.SequenceEqual(after, StringComparer.Ordinal) ? [] : [new JsonChange(path, Texts(before), Texts(after))];
    }

    private static IEnumerable<JsonChange> Order(
        string path, OrderedDictionary<string, JsonElement> old, OrderedDictionary<string, JsonElement> now) =>
        Order(path, old.Keys, now.Keys);

    private static IEnumerable<JsonChange> OfMembers(
        string path, OrderedDictionary<string, JsonElement> old, OrderedDictionary<string, JsonElement> now) =>
        now.Keys.Concat(old.Keys.Where(name => !now.ContainsKey(name)))
            .SelectMany(name => Between($"{path}/{Place.Escape(name)}", Find(old, name), Find(now, name)));

    private static JsonElement? Find(OrderedDictionary<string, JsonElement> members, string name) =>
        members.TryGetValue(name, out var value) ? value : null;

    private static OrderedDictionary<string, JsonElement> Members(JsonElement owner)
    {
        var members = new OrderedDictionary<string, JsonElement>(StringComparer.Ordinal);
        foreach (var member in owner.EnumerateObject())
            members[member.Name] = member.Value;
        return members;
    }

    /// <summary>The things of a list by id; null when it is no list of things each with an id of its own.</summary>
    private static OrderedDictionary<string, JsonElement>? Things(JsonElement list)
    {
        if (list.ValueKind != JsonValueKind.Array)
            return null;
        var things = new OrderedDictionary<string, JsonElement>(StringComparer.Ordinal);
        foreach (var thing in list.EnumerateArray())
        {
            if (thing.ValueKind != JsonValueKind.Object || !thing.TryGetProperty("id", out var id)
                || id.ValueKind != JsonValueKind.String || !things.TryAdd(id.GetString()!, thing))
                return null;
        }
        return things;
    }

    private static JsonElement Texts(string[] texts)
    {
        using var stream = new MemoryStream();
        using (var writer = new Utf8JsonWriter(stream))
        {
            writer.WriteStartArray();
            foreach (var text in texts)
                writer.WriteStringValue(text);
            writer.WriteEndArray();
        }
        return JsonElement.Parse(stream.ToArray());
    }
}
