using System.Text.Json;
using System.Text.Json.Nodes;
using Json.Schema;

namespace Portfolio.Server.Tests.Contract;

/// <summary>
/// Stands in every client of the tests and holds each answer against the API's description: the operation, the status, the headers, the
/// media type and the body. An answer that differs fails the test that asked.
/// </summary>
/// <param name="given">A description to go by; null: what the server says of itself.</param>
internal sealed class ContractCheck(DescribedApi? given = null) : DelegatingHandler
{
    // That the committed description is the one served is a test of its own.
    private static DescribedApi? described;

    private static readonly HashSet<string> Codes = Problems.CodeMeanings.OfFaults.Select(each => each.Code).ToHashSet(StringComparer.Ordinal);

    protected override async Task<HttpResponseMessage> SendAsync(HttpRequestMessage request, CancellationToken cancellationToken)
    {
        var response = await base.SendAsync(request, cancellationToken);
        var path = request.RequestUri!.AbsolutePath;
        // HEAD is GET without the body, which is what is described.
        if (!path.StartsWith("/v1/", StringComparison.Ordinal) || request.Method == HttpMethod.Head)
            return response;
        var api = given ?? (described ??= new DescribedApi(await DescriptionAsync(request.RequestUri, cancellationToken)));
        if (await FlawAsync(api, request, response, cancellationToken) is { } flaw)
            Assert.Fail($"{request.Method} {path} answered {(int)response.StatusCode}: {flaw}");
        return response;
    }

    private async Task<string> DescriptionAsync(Uri server, CancellationToken cancellation)
    {
        var request = new HttpRequestMessage(HttpMethod.Get, new Uri(server, "/openapi.json"));
        using var response = await base.SendAsync(request, cancellation);
        return await response.Content.ReadAsStringAsync(cancellation);
    }

    /// <summary>What the answer does not keep of what is described; null when it keeps everything.</summary>
    private static async Task<string?> FlawAsync(
        DescribedApi api, HttpRequestMessage request, HttpResponseMessage response, CancellationToken cancellation)
    {
        var status = (int)response.StatusCode;
        var operations = api.At(request.RequestUri!.AbsolutePath);
        if (operations.Count == 0)
            return status is 404 or 401 ? await OfProblemAsync(api, response, cancellation) : "no such path is described; only 404 would do.";
        if (operations.FirstOrDefault(operation => operation.Method == request.Method.Method) is not { } described)
            return status is 405 or 401 ? await OfProblemAsync(api, response, cancellation) : "no such method is described; only 405 would do.";
        if (!described.Responses.TryGetValue(status, out var promised))
            return $"{described.Name} describes only {string.Join(", ", described.Responses.Keys.Order())}.";
        if (promised.Headers.FirstOrDefault(header => !Has(response, header)) is { } missing)
            return $"{described.Name} promises the header {missing}, which is missing.";
        return promised.Content.Count == 0
            ? await OfNothingAsync(response, cancellation)
            : await OfContentAsync(promised.Content, response, cancellation);
    }

    private static bool Has(HttpResponseMessage response, string header) =>
        response.Headers.NonValidated.Contains(header) || response.Content.Headers.NonValidated.Contains(header);

    private static async Task<string?> OfNothingAsync(HttpResponseMessage response, CancellationToken cancellation) =>
        (await response.Content.ReadAsByteArrayAsync(cancellation)).Length == 0 ? null : "a body is not described.";

    private static async Task<string?> OfContentAsync(
        IReadOnlyDictionary<string, JsonSchema?> content, HttpResponseMessage response, CancellationToken cancellation)
    {
        var type = response.Content.Headers.ContentType?.MediaType ?? "none";
        if (!content.TryGetValue(type, out var schema))
            return $"the media type {type} is not described, but {string.Join(", ", content.Keys)}.";
        if (schema is null || !type.EndsWith("json", StringComparison.Ordinal))
            return null;
        var body = await JsonAsync(response, cancellation);
        if (type == Problems.Problem.MediaType && (int?)body?["status"] != (int)response.StatusCode)
            return "the problem's status is another.";
        if (type == Problems.Problem.MediaType && CodesOf(body).FirstOrDefault(code => !Codes.Contains(code)) is { } unknown)
            return $"the code {unknown} stands in no class named …Codes, so nothing explains it.";
        return AgainstSchema(schema, body);
    }

    private static IEnumerable<string> CodesOf(JsonNode? problem) =>
        problem?["errors"] is JsonArray faults ? faults.Select(fault => (string?)fault?["code"] ?? "") : [];

    private static async Task<string?> OfProblemAsync(DescribedApi api, HttpResponseMessage response, CancellationToken cancellation) =>
        response.Content.Headers.ContentType?.MediaType != Problems.Problem.MediaType
            ? "it is no problem document."
            : AgainstSchema(api.Problem, await JsonAsync(response, cancellation));

    // Buffered, so that the test can read it too.
    private static async Task<JsonNode?> JsonAsync(HttpResponseMessage response, CancellationToken cancellation)
    {
        await response.Content.LoadIntoBufferAsync(cancellation);
        return Thinned.Json(JsonNode.Parse(await response.Content.ReadAsByteArrayAsync(cancellation)));
    }

    private static string? AgainstSchema(JsonSchema schema, JsonNode? body)
    {
        var options = new EvaluationOptions { OutputFormat = OutputFormat.Flag, RequireFormatValidation = true };
        var element = JsonSerializer.SerializeToElement(body);
        if (schema.Evaluate(element, options).IsValid)
            return null;
        options.OutputFormat = OutputFormat.List;
        var faults = (schema.Evaluate(element, options).Details ?? []).Where(detail => detail.Errors?.Count > 0)
            .SelectMany(detail => detail.Errors!.Values.Select(error => $"{detail.InstanceLocation}: {error}"));
        return $"the body does not fit its schema: {string.Join("; ", faults.Take(5))}\n{element}";
    }
}
