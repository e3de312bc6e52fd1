using System.Net.Http.Headers;
using System.Text;

namespace Portfolio.Server.Tests.Hosting;

/// <summary>Writes other than PUT.</summary>
internal static class Sending
{
    public static Task<HttpResponseMessage> WriteAsync(
        this HttpClient client, HttpMethod method, string address, string? json = null, string type = "application/json", string? ifMatch = null)
    {
        var request = new HttpRequestMessage(method, address);
        if (json is not null)
            request.Content = new ByteArrayContent(Encoding.UTF8.GetBytes(json)) { Headers = { ContentType = new MediaTypeHeaderValue(type) } };
        if (ifMatch is not null)
            request.Headers.TryAddWithoutValidation("If-Match", ifMatch);
        return client.SendAsync(request, TestContext.Current.CancellationToken);
    }

    public static Task<HttpResponseMessage> PostJsonAsync(this HttpClient client, string address, string? json = null) =>
        client.WriteAsync(HttpMethod.Post, address, json);

    public static Task<HttpResponseMessage> MergeAsync(this HttpClient client, string address, string json) =>
        client.WriteAsync(HttpMethod.Patch, address, json, "application/merge-patch+json");

    public static Task<HttpResponseMessage> RemoveAsync(this HttpClient client, string address, string? ifMatch = null) =>
        client.WriteAsync(HttpMethod.Delete, address, ifMatch: ifMatch);
}
