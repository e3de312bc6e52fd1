using System.Text;
using System.Text.Json.Nodes;
using Portfolio.Server.Tests.Outside;

namespace Portfolio.Server.Tests.Fuzz;

/// <summary>Sound JSON with a few things done to it: to its members, or to its bytes.</summary>
internal static class Damage
{
    private static readonly char[] Signs = ['[', '{', '"', '\\', '0', '-', ' ', ',', '\n'];

    /// <summary>Still JSON: members taken away, renamed, replaced or doubled, things put in the place of others.</summary>
    public static byte[] Members(JsonNode json, Dice dice)
    {
        for (var times = dice.Whole(1, 3); times > 0; times--)
            Once(Somewhere(json, dice), dice);
        var text = json.ToJsonString();
        return Encoding.UTF8.GetBytes(dice.Chance(0.1) ? Doubled(text, dice) : text);
    }

    private static JsonNode Somewhere(JsonNode json, Dice dice)
    {
        while (Containers(json) is { Count: > 0 } inside && !dice.Chance(0.15))
            json = dice.Pick(inside);
        return json;
    }

    private static List<JsonNode> Containers(JsonNode json) =>
        [.. ((json as JsonObject)?.Select(member => member.Value) ?? json as JsonArray ?? []).OfType<JsonNode>().Where(IsContainer)];

    private static bool IsContainer(JsonNode json) => json is JsonObject or JsonArray;

    private static void Once(JsonNode json, Dice dice)
    {
        if (json is JsonArray { Count: > 0 } list)
        {
            var place = dice.Whole(0, list.Count - 1);
            if (dice.Chance(0.3))
                list.RemoveAt(place);
            else
                list.Insert(place, dice.Chance(0.5) ? list[place]?.DeepClone() : NastyValues.Any(dice));
        }
        else if (json is JsonObject { Count: > 0 } things)
        {
            var name = dice.Pick(things.Select(member => member.Key).ToList());
            var value = things[name]?.DeepClone();
            switch (dice.Whole(0, 5))
            {
                case 0: things.Remove(name); break;
                case 1: things[name] = NastyValues.Any(dice); break;
                case 2: things[name] = NastyValues.Number(dice); break;
                case 3: things[name] = new JsonArray(value); break;
                case 4: things[name + "s"] = value; break;
                default: things[name] = things[dice.Pick(things.Select(member => member.Key).ToList())]?.DeepClone(); break;
            }
        }
    }

    // No node of ours can hold a member twice.
    private static string Doubled(string text, Dice dice)
    {
        var place = text.IndexOf('{', dice.Whole(0, text.Length - 1));
        return place < 0 ? text : text.Insert(place + 1, """ "id":"a","id":"b",""");
    }

    /// <summary>Perhaps no longer JSON, nor UTF-8.</summary>
    public static byte[] Bytes(byte[] json, Dice dice)
    {
        var bytes = json.ToList();
        for (var times = dice.Whole(1, 4); times > 0; times--)
        {
            var place = dice.Whole(0, bytes.Count);
            var length = Math.Min(dice.Whole(1, 200), bytes.Count - place);
            switch (dice.Whole(0, 5))
            {
                case 0: bytes.RemoveRange(place, bytes.Count - place); break;
                case 1: bytes.RemoveRange(place, length); break;
                case 2: bytes.InsertRange(place, bytes.Skip(place).Take(length).ToArray()); break;
                case 3: bytes.InsertRange(place, Enumerable.Range(0, dice.Whole(1, 8)).Select(_ => (byte)dice.Whole(0, 255))); break;
                case 4: bytes.InsertRange(place, Enumerable.Repeat((byte)dice.Pick(Signs), dice.Pick(1, 2, 20, 2000))); break;
                default: if (place < bytes.Count) bytes[place] = (byte)dice.Whole(0, 255); break;
            }
        }
        return [.. bytes];
    }
}
