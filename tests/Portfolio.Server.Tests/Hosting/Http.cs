using System.Net;
using System.Net.Http.Headers;
using System.Text;
using System.Text.Json;
using Portfolio.Server.Problems;

namespace Portfolio.Server.Tests.Hosting;

/// <summary>Requests and answers in the words of the tests.</summary>
internal static class Http
{
    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    public static Task<HttpResponseMessage> PutJsonAsync(this HttpClient client, string address, string json, string? ifMatch = null) =>
        client.PutBytesAsync(address, Encoding.UTF8.GetBytes(json), ifMatch);

    public static Task<HttpResponseMessage> PutBytesAsync(this HttpClient client, string address, byte[] json, string? ifMatch = null)
    {
        var request = new HttpRequestMessage(HttpMethod.Put, address) { Content = new ByteArrayContent(json) };
        request.Content.Headers.ContentType = new MediaTypeHeaderValue("application/json");
        if (ifMatch is not null)
            request.Headers.TryAddWithoutValidation("If-Match", ifMatch);
        return client.SendAsync(request, Cancellation);
    }

    public static Task<HttpResponseMessage> ReadAsync(this HttpClient client, string address, string? ifNoneMatch = null)
    {
        var request = new HttpRequestMessage(HttpMethod.Get, address);
        if (ifNoneMatch is not null)
            request.Headers.TryAddWithoutValidation("If-None-Match", ifNoneMatch);
        return client.SendAsync(request, Cancellation);
    }

    public static async Task<string> TextAsync(this HttpResponseMessage response) => await response.Content.ReadAsStringAsync(Cancellation);

    public static async Task<JsonElement> JsonAsync(this HttpResponseMessage response) => JsonDocument.Parse(await response.TextAsync()).RootElement;

    public static string? Tag(this HttpResponseMessage response) => response.Headers.ETag?.ToString();

    /// <summary>Asserts a problem document of this status and type, and returns it.</summary>
    public static async Task<JsonElement> ProblemAsync(this HttpResponseMessage response, int status, string slug)
    {
        Assert.Equal(((HttpStatusCode)status, "application/problem+json"), (response.StatusCode, response.Content.Headers.ContentType?.MediaType));
        var problem = await response.JsonAsync();
        Assert.Equal("/problems/" + slug, problem.GetProperty("type").GetString());
        Assert.Equal(status, problem.GetProperty("status").GetInt32());
        Assert.False(string.IsNullOrEmpty(problem.GetProperty("traceId").GetString()));
        Assert.Contains(ProblemKinds.All, kind => kind.Slug == slug && (kind.Status == 0 || kind.Status == status));
        return problem;
    }

    public static IReadOnlyList<(string Path, string Code)> Faults(this JsonElement problem) =>
        [.. problem.GetProperty("errors").EnumerateArray().Select(fault => (fault.GetProperty("path").GetString()!, fault.GetProperty("code").GetString()!))];
}
