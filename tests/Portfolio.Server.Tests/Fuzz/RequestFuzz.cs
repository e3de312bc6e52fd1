using System.Net.Http.Headers;
using System.Text;
using Portfolio.Server.Tests.Contract;
using Portfolio.Server.Tests.Outside;

namespace Portfolio.Server.Tests.Fuzz;

/// <summary>Requests made from the description of the API: the same number makes the same request.</summary>
internal sealed class RequestFuzz(DescribedApi api, FuzzScene scene)
{
    private static readonly string[] Tags = ["\"0\"", "W/\"0\"", "\"", "x", "\"a\", \"b\"", "*, \"a\""];

    private static readonly string[] Accepts =
        ["application/json", "text/csv", "*/*", "text/*;q=0.1", "image/png", "text/csv;q=2", "x", ";;", "application/problem+json"];

    private static readonly string[] Types =
        ["text/plain", "text/csv", "application/merge-patch+json", "application/json; charset=utf-16", "application/jsonx", "x"];

    private readonly FuzzNames names = new(api, scene);
    private readonly FuzzBodies bodies = new(api);

    private readonly List<DescribedOperation> operations =
        [.. api.Operations.SelectMany(operation => Enumerable.Repeat(operation, Weight(operation)))];

    public FuzzedRequest Make(int seed)
    {
        var dice = new Dice(seed);
        var operation = dice.Pick(operations);
        var request = new HttpRequestMessage(new HttpMethod(operation.Method), Address(operation, dice));
        if (dice.Pick(scene.Keys) is { } key && !dice.Chance(0.02))
            request.Headers.Authorization = new AuthenticationHeaderValue("Bearer", key);
        Headers(request, operation, dice);
        if (operation.BodyType is not null)
        {
            var type = dice.Pick(operation.BodyTypes);
            request.Content = new ByteArrayContent(bodies.Of(operation, type, dice));
            request.Content.Headers.TryAddWithoutValidation("Content-Type", dice.Chance(0.03) ? dice.Pick(Types) : type);
        }
        return new(seed, operation, request);
    }

    private static int Weight(DescribedOperation operation) => operation.Method == "DELETE" ? 1 : operation.BodyType is null ? 3 : 6;

    private string Address(DescribedOperation operation, Dice dice)
    {
        var chosen = names.Address(operation, dice);
        var path = string.Join('/', operation.Template.Split('/').Select(segment =>
            segment.StartsWith('{') ? FuzzNames.Escaped(chosen[segment.Trim('{', '}')]) : segment));
        var query = operation.Query.Where(_ => dice.Chance(0.2))
            .Select(name => $"{name}={FuzzNames.Escaped(names.Value(name, dice))}").ToList();
        if (dice.Chance(0.03))
            query.Add($"{Uri.EscapeDataString(dice.Pick(NastyValues.Texts))}={Uri.EscapeDataString(dice.Pick(NastyValues.Texts))}");
        return query.Count > 0 ? $"{path}?{string.Join('&', query)}" : path;
    }

    private static void Headers(HttpRequestMessage request, DescribedOperation operation, Dice dice)
    {
        if (dice.Chance(0.05))
            request.Headers.TryAddWithoutValidation("Accept", dice.Pick(Accepts));
        foreach (var header in operation.Headers.Where(header => dice.Chance(header == "If-Match" ? 0.7 : 0.2)))
            request.Headers.TryAddWithoutValidation(header, header switch
            {
                "If-Match" when dice.Chance(0.8) => "*",
                _ when header.StartsWith("If-", StringComparison.Ordinal) => dice.Pick(Tags),
                // Few enough to come again, with the same request or another.
                _ => $"\"{dice.Whole(0, 9_999)}\"",
            });
    }
}

internal sealed record FuzzedRequest(int Seed, DescribedOperation Operation, HttpRequestMessage Message)
{
    public async Task<string> TextAsync() =>
        $"request {Seed}: {Message.Method} {Message.RequestUri}\n{Message.Headers}{Message.Content?.Headers}"
        + (Message.Content is null ? "" : Encoding.UTF8.GetString(await Message.Content.ReadAsByteArrayAsync()));
}
