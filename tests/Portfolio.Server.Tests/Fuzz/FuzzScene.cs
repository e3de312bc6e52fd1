using Microsoft.Extensions.DependencyInjection;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Results;
using Portfolio.Server.Tests.Runs;
using Portfolio.Server.Tests.Subscriptions;
using Portfolio.Store.Access;

namespace Portfolio.Server.Tests.Fuzz;

/// <summary>
/// What the random requests find: portfolio <c>works</c> with a finished run, a subscription and a delivery, <c>fuzz-0</c> to <c>fuzz-3</c>
/// to be written to, <c>fuzz-old</c> to be archived, keys to be changed and revoked, and keys to ask with.
/// </summary>
internal sealed class FuzzScene
{
    private const string Wanted = """{"id":"office","url":"http://localhost:1/","events":[{"type":"run.succeeded"}]}""";

    /// <summary>Id of the run of <c>works</c> that has ended.</summary>
    public required string Run { get; init; }

    /// <summary>Ids of runs of <c>fuzz-0</c> that nobody works on.</summary>
    public required IReadOnlyList<string> Waiting { get; init; }

    public required string Delivery { get; init; }

    public required IReadOnlyList<string> KeyIds { get; init; }

    /// <summary>Keys that may be presented; null: none.</summary>
    public required IReadOnlyList<string?> Keys { get; init; }

    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    public static async Task<FuzzScene> MakeAsync(PortfolioServer server)
    {
        var admin = server.Client();
        await FinishedRuns.PutAsync(server, "works");
        await SubscribeAsync(admin, "works");
        var run = await FinishedRuns.MakeAsync(server, "works", new(2027, 1, 3));
        await server.DeliverAsync("office");
        var delivery = (await admin.ItemsAsync("/v1/portfolios/works/subscriptions/office/deliveries"))[0].Text("id");
        foreach (var (name, i) in new[] { "fuzz-0", "fuzz-1", "fuzz-2", "fuzz-3", "fuzz-old" }.Select((name, i) => (name, i)))
        {
            var put = await admin.PutJsonAsync($"/v1/portfolios/{name}/document", FuzzBodies.Documents[i]);
            Assert.True(put.IsSuccessStatusCode, await put.TextAsync());
            await SubscribeAsync(admin, name);
        }
        var waiting = new List<string>();
        for (var i = 0; i < 8; i++)
            waiting.Add(await admin.RunAsync("fuzz-0"));
        var keys = server.Services.GetRequiredService<KeyStore>();
        var limited = await KeyAsync(keys, new(Right.Read, "works", ["weir"]), new(Right.Submit, "fuzz-1"));
        var changed = new List<string>();
        for (var i = 0; i < 8; i++)
            changed.Add((await KeyAsync(keys, new Grant(Right.Read, "works"))).Key.Id);
        return new()
        {
            Run = run,
            Waiting = waiting,
            Delivery = delivery,
            KeyIds = changed,
            Keys = [.. Enumerable.Repeat(PortfolioServer.AdminKey, 30), limited.Secret, limited.Secret, null],
        };
    }

    private static async Task SubscribeAsync(HttpClient admin, string portfolio)
    {
        var answer = await admin.PostJsonAsync($"/v1/portfolios/{portfolio}/subscriptions", Wanted);
        Assert.True(answer.IsSuccessStatusCode, await answer.TextAsync());
    }

    private static async Task<NewKey> KeyAsync(KeyStore keys, params Grant[] grants) =>
        (await keys.CreateAsync(Caller.System, "of the fuzz", grants, expiresAt: null, Cancellation))!;
}
