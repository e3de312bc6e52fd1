using System.Net.Http.Headers;
using System.Text;
using System.Text.Json.Nodes;
using Portfolio.Server.Tests.Contract;
using Portfolio.Server.Tests.Outside;

namespace Portfolio.Server.Tests.Fuzz;

/// <summary>Requests made from the description of the API: the same number makes the same request.</summary>
/// <param name="run">Id of a run that has ended, of the portfolio <c>works</c>.</param>
/// <param name="keys">Keys that may be presented; null: none.</param>
internal sealed class RequestFuzz(DescribedApi api, string run, IReadOnlyList<string?> keys)
{
    private static readonly string[] Tags = ["*", "\"0\"", "W/\"0\"", "\"", "x", "\"a\", \"b\"", "*, \"a\""];
    private static readonly string[] Accepts = ["application/json", "text/csv", "*/*", "text/*;q=0.1", "image/png", "text/csv;q=2", "x", ";;", "application/problem+json"];
    private static readonly string[] Types = ["text/plain", "text/csv", "application/merge-patch+json", "application/json; charset=utf-16", "application/jsonx", "x"];

    private static readonly string[] Documents =
        [.. Enumerable.Range(0, 40).Select(seed => RandomDocument.Of(seed, seed % 2 == 0 ? "passing" : "inOrder").ToJsonString())];

    private readonly Dictionary<string, string[]> names = new()
    {
        ["portfolio"] = ["works", "works", "works", "works", "works", "fuzz-0", "fuzz-1", "fuzz-2", "fuzz-3", "absent"],
        ["run"] = [run, run, "latest", "01a2e092-1600-7dae-8e69-da9ed7b6b060"],
        ["number"] = ["1", "2", "0"],
        ["programme"] = ["locks", "north"],
        ["project"] = ["weir", "quay", "project-0", "project-1", "nothing-yet", "new"],
        ["activity"] = ["M", "A", "A0", "A1", "first", "new"],
        ["scope"] = ["portfolio", "programme/locks", "project/weir", "milestone/weir/M"],
        ["metric"] = ["finish", "cost", "contingency"],
        ["level"] = ["80", "50", "82.5", "99.5", "12.25"],
        ["levels"] = ["80", "5,10,99.5"],
        ["bin"] = ["day", "week", "month", "10"],
        ["every"] = ["run", "day", "week", "month"],
        ["format"] = ["json", "csv"],
        ["asOf"] = ["2027-01-03", "2027-01-04", "2020-01-01"],
        ["limit"] = ["1", "10", "1000"],
    };

    private readonly List<DescribedOperation> operations =
        [.. api.Operations.SelectMany(operation => Enumerable.Repeat(operation, operation.Method == "DELETE" ? 1 : operation.BodyType is null ? 3 : 6))];

    public FuzzedRequest Make(int seed)
    {
        var dice = new Dice(seed);
        var operation = dice.Pick(operations);
        var request = new HttpRequestMessage(new HttpMethod(operation.Method), Address(operation, dice));
        if (dice.Pick(keys) is { } key && !dice.Chance(0.02))
            request.Headers.Authorization = new AuthenticationHeaderValue("Bearer", key);
        Headers(request, operation, dice);
        if (operation.BodyType is { } type)
        {
            request.Content = new ByteArrayContent(Body(operation, dice));
            request.Content.Headers.TryAddWithoutValidation("Content-Type", dice.Chance(0.03) ? dice.Pick(Types) : type);
        }
        return new(seed, operation, request);
    }

    private string Address(DescribedOperation operation, Dice dice)
    {
        var path = string.Join('/', operation.Template.Split('/').Select(segment => segment.StartsWith('{') ? Value(segment.Trim('{', '}'), operation, dice) : segment));
        var query = operation.Query.Where(_ => dice.Chance(0.3)).Select(name => $"{name}={Value(name, operation, dice)}").ToList();
        if (dice.Chance(0.03))
            query.Add($"{Uri.EscapeDataString(dice.Pick(NastyValues.Texts))}={Uri.EscapeDataString(dice.Pick(NastyValues.Texts))}");
        return query.Count > 0 ? $"{path}?{string.Join('&', query)}" : path;
    }

    private string Value(string parameter, DescribedOperation operation, Dice dice)
    {
        var value = dice.Chance(0.12) || !names.TryGetValue(parameter, out var usual) ? dice.Pick(NastyValues.Texts) : dice.Pick(usual);
        // What can be read back of a run that has ended shall stay.
        if (value == "works" && operation.Method == "DELETE")
            value = "fuzz-0";
        // The test's own client takes no null character in a path; what the server does with it is tested with sockets.
        return Uri.EscapeDataString(value.Replace("\0", "", StringComparison.Ordinal));
    }

    private static void Headers(HttpRequestMessage request, DescribedOperation operation, Dice dice)
    {
        if (dice.Chance(0.1))
            request.Headers.TryAddWithoutValidation("Accept", dice.Pick(Accepts));
        foreach (var header in operation.Headers.Where(_ => dice.Chance(0.4)))
            request.Headers.TryAddWithoutValidation(header, header.StartsWith("If-", StringComparison.Ordinal) ? dice.Pick(Tags) : $"\"{dice.Whole(0, 999_999)}\"");
    }

    private byte[] Body(DescribedOperation operation, Dice dice)
    {
        var sound = Sound(operation, dice);
        return dice.Whole(0, 9) switch
        {
            < 2 => Encoding.UTF8.GetBytes(sound.ToJsonString()),
            < 5 => Damage.Members(sound, dice),
            < 7 => Damage.Bytes(Encoding.UTF8.GetBytes(sound.ToJsonString()), dice),
            _ => Encoding.UTF8.GetBytes(new SchemaFuzz(api, dice).Any(operation.BodySchema!)?.ToJsonString() ?? "null"),
        };
    }

    private JsonNode Sound(DescribedOperation operation, Dice dice)
    {
        var document = JsonNode.Parse(dice.Pick(Documents))!;
        var project = dice.Pick(document["projects"]!.AsArray())!;
        return operation.BodyName switch
        {
            "Document" => document,
            "Settings" => document["settings"]!.DeepClone(),
            "Project" => project.DeepClone(),
            "Activity" when project["activities"] is JsonArray { Count: > 0 } activities => dice.Pick(activities)!.DeepClone(),
            _ => JsonNode.Parse(new RequestSamples(api, new Dictionary<string, string>()).BodyOf(operation)) ?? new JsonObject(),
        };
    }
}

internal sealed record FuzzedRequest(int Seed, DescribedOperation Operation, HttpRequestMessage Message)
{
    public async Task<string> TextAsync() =>
        $"request {Seed}: {Message.Method} {Message.RequestUri}\n{Message.Headers}{Message.Content?.Headers}"
        + (Message.Content is null ? "" : Encoding.UTF8.GetString(await Message.Content.ReadAsByteArrayAsync()));
}
