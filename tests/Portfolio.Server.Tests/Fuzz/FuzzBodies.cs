using System.Text;
using System.Text.Json.Nodes;
using Portfolio.Server.Tests.Contract;
using Portfolio.Server.Tests.Outside;

namespace Portfolio.Server.Tests.Fuzz;

/// <summary>Bodies: sound ones, made of real documents where they can be, the same with something done to them, and random ones.</summary>
internal sealed class FuzzBodies(DescribedApi api)
{
    // Few, so that a part of one often fits into what is stored; of one currency, which cannot change once there are runs.
    public static readonly IReadOnlyList<string> Documents =
    [
        .. Enumerable.Range(0, 1000).Select(seed => RandomDocument.Of(seed, seed % 2 == 0 ? "passing" : "inOrder"))
            .Where(document => (string?)document["settings"]!["currency"] == "EUR")
            .Select(document => document.ToJsonString()).Where(document => document.Length < 14_000).Take(6),
    ];

    // Of each thread its own: looking into one changes what it keeps of itself.
    [ThreadStatic]
    private static List<JsonNode>? parsed;

    private static List<JsonNode> Parsed => parsed ??= [.. Documents.Select(document => JsonNode.Parse(document)!)];

    private readonly RequestSamples samples = new(api, new Dictionary<string, string>());

    public byte[] Of(DescribedOperation operation, string type, Dice dice)
    {
        if (type == "text/csv")
            return RandomTable.Of(dice);
        Assert.True(
            type.EndsWith("json", StringComparison.Ordinal),
            $"{operation.Name} takes {type}: make bodies of that type in {nameof(FuzzBodies)}.");
        return dice.Whole(0, 9) switch
        {
            < 4 => Bytes(Sound(operation, type, dice)),
            < 6 => Damage.Members(Sound(operation, type, dice), dice),
            < 8 => Damage.Bytes(Bytes(Sound(operation, type, dice)), dice),
            _ => Bytes(new SchemaFuzz(api, dice).Any(operation.BodySchema ?? new JsonObject())),
        };
    }

    private static byte[] Bytes(JsonNode? json) => Encoding.UTF8.GetBytes(json?.ToJsonString() ?? "null");

    private JsonNode Sound(DescribedOperation operation, string type, Dice dice)
    {
        if (operation.BodyName.Length > 0)
            return Named(operation, dice);
        // A patch holds some members of what stands at its address.
        var whole = api.Operations.FirstOrDefault(other => other.Method == "PUT" && other.Template == operation.Template);
        return type == "application/merge-patch+json" && whole is not null
            ? Some(Named(whole, dice), dice)
            : JsonNode.Parse(samples.BodyOf(operation)) ?? new JsonObject();
    }

    private JsonNode Named(DescribedOperation operation, Dice dice)
    {
        var document = Parsed[dice.Whole(0, Parsed.Count - 1)];
        var project = dice.Pick(document["projects"]!.AsArray())!;
        return operation.BodyName switch
        {
            "Document" => document.DeepClone(),
            "Settings" => document["settings"]!.DeepClone(),
            "Project" => Nameless(project, dice),
            "Activity" when project["activities"] is JsonArray { Count: > 0 } activities => Nameless(dice.Pick(activities)!, dice),
            "Updates" => Updates(document, dice),
            "RunRequest" => new JsonObject { ["iterations"] = dice.Whole(10, 500), ["seed"] = dice.Whole(0, 9) },
            _ => JsonNode.Parse(samples.BodyOf(operation)) ?? new JsonObject(),
        };
    }

    // The address names it already.
    private static JsonNode Nameless(JsonNode part, Dice dice)
    {
        var named = part.DeepClone().AsObject();
        if (dice.Chance(0.8))
            named.Remove("id");
        return named;
    }

    private static JsonObject Updates(JsonNode document, Dice dice) => new()
    {
        ["updates"] = Dice.List(document["projects"]!.AsArray().Take(dice.Whole(1, 3)).Select(project => Update(project!, dice))),
    };

    private static JsonObject Update(JsonNode project, Dice dice)
    {
        var made = Some(project, dice);
        made.Remove("id");
        made["project"] = dice.Chance(0.2) ? "weir" : project["id"]!.DeepClone();
        if (project["activities"] is JsonArray activities)
            made["activities"] = Dice.List(activities.Take(dice.Whole(0, 2)).Select(activity => activity!.DeepClone()));
        if (dice.Chance(0.5))
            made["create"] = true;
        return made;
    }

    private static JsonObject Some(JsonNode whole, Dice dice)
    {
        var made = new JsonObject();
        foreach (var (name, member) in whole.AsObject().Where(_ => dice.Chance(0.2)))
            made[name] = dice.Chance(0.1) ? null : member?.DeepClone();
        return made;
    }
}
