using System.Text.Json;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Parts;

namespace Portfolio.Server.Tests.Updates;

/// <summary>Updates in the words of the tests.</summary>
internal static class UpdateCalls
{
    public static Task<HttpResponseMessage> UpdateAsync(
        this HttpClient client, string portfolio, string json, string query = "", string? ifMatch = null) =>
        client.SendAsync(HttpMethod.Post, $"{portfolio}/updates{query}", json, ifMatch);

    public static Task<HttpResponseMessage> UpdateTableAsync(this HttpClient client, string portfolio, string csv, string query = "") =>
        client.SendAsync(HttpMethod.Post, $"{portfolio}/updates{query}", csv, mediaType: "text/csv");

    public static async Task<string> DocumentAsync(this HttpClient client, string portfolio) =>
        await (await client.ReadAsync($"{portfolio}/document")).TextAsync();

    /// <summary>Code, and pointer or line and cell, of every fault.</summary>
    public static async Task<IReadOnlyList<string>> WhereAsync(this HttpResponseMessage response, int status = 422, string slug = "refused") =>
        [.. (await response.ProblemAsync(status, slug)).GetProperty("errors").EnumerateArray().Select(Where)];

    private static string Where(JsonElement fault) =>
        $"{fault.GetProperty("code")} " + (fault.TryGetProperty("path", out var path) ? $"{path}" : $"{fault.GetProperty("line")}:{fault.GetProperty("column")}");
}
