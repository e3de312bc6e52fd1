using System.Diagnostics;
using System.Text.Json;
using Portfolio.Server.Tests.Hosting;

namespace Portfolio.Server.Tests.Runs;

/// <summary>Runs in the words of the tests.</summary>
internal static class RunCalls
{
    private static readonly TimeSpan Look = TimeSpan.FromMilliseconds(50);

    // Far more than any run of the tests takes on a busy machine: what waits longer waits for something that does not come.
    private static readonly TimeSpan Longest = TimeSpan.FromMinutes(4);

    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    public static Task<HttpResponseMessage> PostRunAsync(this HttpClient client, string portfolio, string json = "{}") =>
        client.PostAsync($"/v1/portfolios/{portfolio}/runs", new StringContent(json, null, "application/json"), Cancellation);

    /// <summary>Asks for a run and returns its id.</summary>
    public static async Task<string> RunAsync(this HttpClient client, string portfolio, string json = "{}")
    {
        var response = await client.PostRunAsync(portfolio, json);
        Assert.True((int)response.StatusCode == 202, await response.TextAsync());
        return (await response.JsonAsync()).GetProperty("id").GetString()!;
    }

    public static async Task<JsonElement> ReadRunAsync(this HttpClient client, string portfolio, string run)
    {
        var response = await client.ReadAsync($"/v1/portfolios/{portfolio}/runs/{run}");
        Assert.True((int)response.StatusCode == 200, await response.TextAsync());
        return await response.JsonAsync();
    }

    /// <summary>Waits until the run is in one of these states.</summary>
    public static async Task<JsonElement> UntilAsync(this HttpClient client, string portfolio, string run, params string[] states)
    {
        var waited = Stopwatch.StartNew();
        while (true)
        {
            var found = await client.ReadRunAsync(portfolio, run);
            var state = found.State();
            if (states.Contains(state))
                return found;
            Assert.True(state is "queued" or "running", found.ToString());
            Assert.True(waited.Elapsed < Longest, $"After {waited.Elapsed} the run is not yet {string.Join(" or ", states)}: {found}");
            await Task.Delay(Look, Cancellation);
        }
    }

    /// <summary>Waits until a fifth of the run is stored, which is more than is worked but not stored yet.</summary>
    public static async Task UntilSomeBlocksAreStoredAsync(this HttpClient client, string portfolio, string run)
    {
        while (await client.ReadRunAsync(portfolio, run) is var now && now.GetProperty("progress").GetDouble() < 0.2)
        {
            Assert.True(now.State() is "queued" or "running", now.ToString());
            await Task.Delay(20, Cancellation);
        }
    }

    public static async Task<JsonElement> SucceedAsync(this HttpClient client, string portfolio, string json = "{}") =>
        await client.UntilAsync(portfolio, await client.RunAsync(portfolio, json), "succeeded");

    public static string State(this JsonElement run) => run.GetProperty("state").GetString()!;

    public static string Text(this JsonElement json, string member) => json.GetProperty(member).GetString()!;
}
