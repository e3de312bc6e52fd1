using System.Net.Http.Headers;
using System.Text;
using Portfolio.Server.Tests.Hosting;

namespace Portfolio.Server.Tests.Parts;

/// <summary>Requests for parts, and a portfolio of two linked projects to make them on.</summary>
internal static class PartCalls
{
    /// <summary>The weir's lock waits for the quay; a driver, a calendar and a pool are in use.</summary>
    public const string Settings =
        """{"name":"Harbour","currency":"EUR","calendars":[{"id":"five-day","workingWeekdays":["mon","tue","wed","thu","fri"]}],"pools":[{"id":"crane","capacity":2}],"drivers":[{"id":"ground","durationFactor":1.1}]}""";

    public const string Weir =
        """{"id":"weir","name":"Weir","programme":"river","statusDate":"2027-01-04","calendar":"five-day","overhead":{"perDay":100,"actual":5},"activities":[{"id":"A10","duration":5,"demands":[{"pool":"crane","units":2}],"drivers":["ground"]},{"id":"A20","duration":{"type":"pert","low":2,"mode":3,"high":6},"predecessors":["A10","quay/B10"]}]}""";

    public const string Quay =
        """{"id":"quay","name":"Quay","programme":"river","statusDate":"2027-01-04","activities":[{"id":"B10","duration":4},{"id":"B20","duration":3,"predecessors":["B10"]}]}""";

    public static async Task<string> PortfolioAsync(this HttpClient client, string id, string settings = Settings)
    {
        var created = await client.PutJsonAsync(
            $"/v1/portfolios/{id}/document", $$"""{"settings":{{settings}},"projects":[{{Weir}},{{Quay}}]}""");
        Assert.True(created.IsSuccessStatusCode, await created.TextAsync());
        return $"/v1/portfolios/{id}";
    }

    public static Task<HttpResponseMessage> SendAsync(
        this HttpClient client, HttpMethod method, string address, string? json = null, string? ifMatch = null,
        string mediaType = "application/json", string? ifNoneMatch = null)
    {
        var request = new HttpRequestMessage(method, address);
        if (json is not null)
            request.Content = new ByteArrayContent(Encoding.UTF8.GetBytes(json)) { Headers = { ContentType = new MediaTypeHeaderValue(mediaType) } };
        if (ifMatch is not null)
            request.Headers.TryAddWithoutValidation("If-Match", ifMatch);
        if (ifNoneMatch is not null)
            request.Headers.TryAddWithoutValidation("If-None-Match", ifNoneMatch);
        return client.SendAsync(request, TestContext.Current.CancellationToken);
    }

    public static Task<HttpResponseMessage> RemoveAsync(this HttpClient client, string address, string? ifMatch = null) =>
        client.SendAsync(HttpMethod.Delete, address, ifMatch: ifMatch);

    public static Task<HttpResponseMessage> PatchAsync(
        this HttpClient client, string address, string json, string? ifMatch = null, string mediaType = "application/merge-patch+json") =>
        client.SendAsync(HttpMethod.Patch, address, json, ifMatch, mediaType);

    /// <summary>Asserts the answer to an accepted write.</summary>
    public static async Task WrittenAsync(this HttpResponseMessage response, int status, int revision, bool changed = true)
    {
        var text = await response.TextAsync();
        Assert.True(status == (int)response.StatusCode, text);
        Assert.EndsWith($"\"revision\":{revision},\"changed\":{(changed ? "true" : "false")}}}", text);
    }

    /// <summary>Code, subject and path of every fault.</summary>
    public static async Task<IReadOnlyList<(string Code, string Subject, string Path)>> RefusedAsync(
        this HttpResponseMessage response, int status = 422, string slug = "refused") =>
        [.. (await response.ProblemAsync(status, slug)).GetProperty("errors").EnumerateArray().Select(fault =>
            (fault.GetProperty("code").GetString()!, fault.GetProperty("subject").GetString()!, fault.GetProperty("path").GetString()!))];
}
