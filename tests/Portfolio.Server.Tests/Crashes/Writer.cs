using System.Globalization;
using System.Text;
using Portfolio.Server.Tests.Hosting;

namespace Portfolio.Server.Tests.Crashes;

/// <summary>
/// Writes to a portfolio of its own, one write after the other, each with a number as note and under an idempotency key. A write without an
/// answer is sent again, as clients do, until it has one.
/// </summary>
internal sealed class Writer(string portfolio)
{
    private int next = 1;

    public string Portfolio { get; } = portfolio;

    /// <summary>Numbers whose writes were answered, with the revision that the first answer named.</summary>
    public Dictionary<int, long> Acknowledged { get; } = [];

    /// <summary>Ids of runs that were answered, by the same numbers.</summary>
    public Dictionary<int, string> Runs { get; } = [];

    /// <summary>Writes until the server no longer answers.</summary>
    public async Task WriteAsync(HttpClient client)
    {
        try
        {
            for (; ; next++)
            {
                var written = await SendAsync(client, HttpMethod.Put, $"document?note={next}", Samples.Document(days: next), "document");
                // Sent again because its run had no answer, it gets the first answer again.
                var revision = written.GetProperty("revision").GetInt64();
                Assert.Equal(revision, Acknowledged.GetValueOrDefault(next, revision));
                Acknowledged[next] = revision;
                var run = await SendAsync(client, HttpMethod.Post, "runs", """{"iterations":10,"recorded":false}""", "run");
                Runs[next] = run.GetProperty("id").GetString()!;
            }
        }
        catch (HttpRequestException)
        {
            // Killed.
        }
    }

    private async Task<System.Text.Json.JsonElement> SendAsync(HttpClient client, HttpMethod method, string address, string json, string what)
    {
        var request = new HttpRequestMessage(method, $"/v1/portfolios/{Portfolio}/{address}") { Content = new StringContent(json, Encoding.UTF8, "application/json") };
        request.Headers.TryAddWithoutValidation("Idempotency-Key", $"\"{Portfolio}-{what}-{next.ToString(CultureInfo.InvariantCulture)}\"");
        if (method == HttpMethod.Put && next > 1)
            request.Headers.TryAddWithoutValidation("If-Match", "*");
        using var response = await client.SendAsync(request, TestContext.Current.CancellationToken);
        Assert.True(response.IsSuccessStatusCode, $"{Portfolio} {next}: {await response.TextAsync()}");
        return await response.JsonAsync();
    }
}
