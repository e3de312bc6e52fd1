using System.Collections.Concurrent;
using Microsoft.Extensions.DependencyInjection;
using Portfolio.Server.Tests.Contract;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Outside;
using Portfolio.Server.Tests.Results;
using Portfolio.Store.Access;

namespace Portfolio.Server.Tests.Fuzz;

/// <summary>
/// Random requests to every operation: nothing fails inside, every answer is as described, none takes long, and nothing is left in memory.
/// Seeds: <c>PORTFOLIO_SEED</c>, else a fixed one; in the long search a fresh one. How many: <c>PORTFOLIO_REQUESTS</c>.
/// </summary>
[Collection(nameof(Alone))]
public sealed class FuzzTests
{
    private const int WarmUp = 4_000;
    private const long LargestGrowth = 30 * 1024 * 1024;

    private static readonly TimeSpan Longest = TimeSpan.FromSeconds(2);

    private static readonly bool IsLong = Environment.GetEnvironmentVariable("PORTFOLIO_LONG") == "1";

    private readonly int seed = int.TryParse(Environment.GetEnvironmentVariable("PORTFOLIO_SEED"), out var given) ? given
        : IsLong ? Environment.TickCount & 0xFFFFFF : 20270104;

    private readonly int requests = int.TryParse(Environment.GetEnvironmentVariable("PORTFOLIO_REQUESTS"), out var given) ? given
        : IsLong ? 200_000 : 20_000;

    private readonly ServerTimes times = new();
    private readonly ConcurrentDictionary<(string Operation, int Status), int> answers = [];
    private readonly ConcurrentQueue<string> flaws = [];

    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    [Fact]
    public async Task RandomRequestsAreAnsweredAsDescribedSoonAndWithoutLeftovers()
    {
        await using var server = new PortfolioServer(null, ("Roles", "api"), ("Limits:RequestsPerSecond", "1000000"), ("Limits:QueuedRuns", "10000"))
        {
            Outside = services => services.AddSingleton<Microsoft.AspNetCore.Hosting.IStartupFilter>(times),
        };
        var fuzz = await PrepareAsync(server);
        var client = server.Client(key: null);
        client.Timeout = TimeSpan.FromSeconds(60);
        await EachAsync(client, fuzz, 0, WarmUp);
        var before = Resident();
        await EachAsync(client, fuzz, WarmUp, requests);
        var growth = Resident() - before;
        TestContext.Current.TestOutputHelper?.WriteLine(Summary(growth));
        Assert.True(flaws.IsEmpty, $"Seed {seed}, {flaws.Count} flaws: {string.Join("\n\n", flaws.Take(5))}");
        await SlowOnesAreQuickAloneAsync(client, fuzz);
        Assert.True(growth <= LargestGrowth, $"Seed {seed}: {growth / 1024 / 1024} MB more are resident after the requests.");
        var asked = answers.Keys.Select(answer => answer.Operation).ToHashSet();
        Assert.All((await server.ApiAsync()).Operations, operation => Assert.Contains(operation.Name, asked));
        Assert.True(answers.Where(answer => answer.Key.Status < 300).Sum(answer => answer.Value) > requests / 10, "Too little is accepted to prove anything.");
    }

    private static async Task<RequestFuzz> PrepareAsync(PortfolioServer server)
    {
        await FinishedRuns.PutAsync(server, "works");
        var run = await FinishedRuns.MakeAsync(server, "works", new(2027, 1, 3));
        for (var i = 0; i < 4; i++)
            Assert.True((await server.Client().PutBytesAsync($"/v1/portfolios/fuzz-{i}/document", RandomDocument.Json(i, "passing"))).IsSuccessStatusCode);
        var store = server.Services.GetRequiredService<KeyStore>();
        var limited = await store.CreateAsync(
            Caller.System, "limited", [new(Right.Read, "works", ["weir"]), new(Right.Submit, "fuzz-1")], expiresAt: null, Cancellation);
        return new(await server.ApiAsync(), run, [.. Enumerable.Repeat(PortfolioServer.AdminKey, 20), limited!.Secret, limited.Secret, null]);
    }

    private Task EachAsync(HttpClient client, RequestFuzz fuzz, int first, int count) => Parallel.ForEachAsync(
        Enumerable.Range(first, count),
        new ParallelOptions { MaxDegreeOfParallelism = 4, CancellationToken = Cancellation },
        async (number, _) => await AskAsync(client, fuzz.Make(unchecked(seed + number)), number));

    private async Task AskAsync(HttpClient client, FuzzedRequest asked, int number)
    {
        asked.Message.Headers.Add(ServerTimes.Header, $"{number}");
        try
        {
            using var response = await client.SendAsync(asked.Message, Cancellation);
            answers.AddOrUpdate((asked.Operation.Name, (int)response.StatusCode), 1, (_, count) => count + 1);
            if ((int)response.StatusCode >= 500)
                flaws.Enqueue($"{(int)response.StatusCode} {await response.TextAsync()}\n{await asked.TextAsync()}");
        }
        catch (Exception flaw) when (flaw is not OperationCanceledException || !Cancellation.IsCancellationRequested)
        {
            flaws.Enqueue($"{flaw.Message}\n{await asked.TextAsync()}");
        }
    }

    // The machine may be busy with other things: slow is what is slow again and again.
    private async Task SlowOnesAreQuickAloneAsync(HttpClient client, RequestFuzz fuzz)
    {
        foreach (var (number, _) in times.Taken.Where(request => request.Value > Longest).ToList())
        {
            for (var again = 0; again < 3 && times.Taken[number] > Longest; again++)
                await AskAsync(client, fuzz.Make(unchecked(seed + number)), number);
            var asked = fuzz.Make(unchecked(seed + number));
            Assert.True(times.Taken[number] <= Longest, $"Seed {seed}: took {times.Taken[number]}: {await asked.TextAsync()}");
        }
    }

    private static long Resident()
    {
        for (var i = 0; i < 2; i++)
        {
            GC.Collect(GC.MaxGeneration, GCCollectionMode.Aggressive, blocking: true, compacting: true);
            GC.WaitForPendingFinalizers();
        }
        return Environment.WorkingSet;
    }

    private string Summary(long growth)
    {
        var statuses = answers.GroupBy(answer => answer.Key.Status).OrderBy(group => group.Key).Select(group => $"{group.Key}: {group.Sum(answer => answer.Value)}");
        return $"Seed {seed}. {string.Join(", ", statuses)}. Longest {times.Taken.Values.Max().TotalMilliseconds:0} ms, {growth / 1024} KB more resident.";
    }
}
