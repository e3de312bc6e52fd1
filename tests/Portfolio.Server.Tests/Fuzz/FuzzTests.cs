using System.Collections.Concurrent;
using Microsoft.AspNetCore.Hosting;
using Microsoft.Extensions.DependencyInjection;
using Portfolio.Server.Tests.Contract;
using Portfolio.Server.Tests.Hosting;

namespace Portfolio.Server.Tests.Fuzz;

/// <summary>
/// Random requests to every operation: nothing fails inside, every answer is as described, none takes long, and nothing is left in memory.
/// Seeds: <c>PORTFOLIO_SEED</c>, else a fixed one; in the long search a fresh one. How many: <c>PORTFOLIO_REQUESTS</c>.
/// </summary>
[Collection(nameof(Alone))]
public sealed class FuzzTests
{
    private const long LargestGrowth = 30 * 1024 * 1024;

    private static readonly TimeSpan Longest = TimeSpan.FromSeconds(2);

    private static readonly bool IsLong = Environment.GetEnvironmentVariable("PORTFOLIO_LONG") == "1";

    private readonly int seed = Given("PORTFOLIO_SEED") ?? (IsLong ? Environment.TickCount & 0xFFFFFF : 20270104);
    private readonly int requests = Given("PORTFOLIO_REQUESTS") ?? (IsLong ? 200_000 : 20_000);

    // Code is compiled when first needed, and the rarer paths are met late: what is resident grows by some 35 MB up to the 60,000th request,
    // all of it compiled code (the collected heap stays at 30 MB), and stands from there on.
    private int WarmUp => Math.Max(8_000, Math.Min(requests / 3, 60_000));

    private readonly ServerTimes times = new(Longest);
    private readonly ConcurrentDictionary<(string Operation, int Status), int> answers = [];
    private readonly ConcurrentQueue<string> flaws = [];

    private static int? Given(string variable) => int.TryParse(Environment.GetEnvironmentVariable(variable), out var given) ? given : null;

    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    [Fact]
    public async Task RandomRequestsAreAnsweredAsDescribedSoonAndWithoutLeftovers()
    {
        using var folder = new QuickFolder();
        await using var server = new PortfolioServer(
            folder.Path, ("Roles", "api"), ("Limits:RequestsPerSecond", "1000000"), ("Limits:QueuedRuns", "100000"),
            ("Webhooks:AllowedHosts", "localhost"), ("Webhooks:Subscriptions", "10000"))
        {
            Outside = services => services.AddSingleton<IStartupFilter>(times),
        };
        var api = await server.ApiAsync();
        var fuzz = new RequestFuzz(api, await FuzzScene.MakeAsync(server));
        var client = server.Client(key: null);
        client.Timeout = TimeSpan.FromSeconds(60);
        await EachAsync(client, fuzz, 0, WarmUp);
        var before = Resident();
        await EachAsync(client, fuzz, WarmUp, Math.Max(requests - WarmUp, 1));
        var growth = Resident() - before;
        TestContext.Current.TestOutputHelper?.WriteLine(Summary(growth));
        Assert.True(flaws.IsEmpty, $"Seed {seed}, {flaws.Count} flaws: {string.Join("\n\n", flaws.Take(5))}");
        await SlowOnesAreQuickAloneAsync(client, fuzz);
        Assert.True(growth <= LargestGrowth, $"Seed {seed}: {growth / 1024 / 1024} MB more are resident after the requests.");
        EnoughIsAccepted(api);
    }

    // Otherwise refusals alone would have been tried. What is asked seldom (deletions, mostly of what others need) may miss by chance.
    private const int OftenEnough = 150;

    private void EnoughIsAccepted(DescribedApi api)
    {
        var accepted = answers.Where(answer => answer.Key.Status < 300).ToList();
        var all = answers.Values.Sum();
        Assert.True(accepted.Sum(answer => answer.Value) > all / 4, $"Seed {seed}: too little is accepted to prove anything.");
        var asked = answers.GroupBy(answer => answer.Key.Operation)
            .ToDictionary(group => group.Key, group => group.Sum(each => each.Value));
        Assert.All(api.Operations, operation => Assert.Contains(operation.Name, asked.Keys));
        var never = asked.Where(each => each.Value >= OftenEnough).Select(each => each.Key)
            .Except(accepted.Select(answer => answer.Key.Operation)).ToList();
        Assert.True(
            never.Count == 0,
            $"Seed {seed}: never accepted: {string.Join(", ", never)}. {nameof(FuzzScene)} or {nameof(FuzzNames)} lacks what they need.");
    }

    private Task EachAsync(HttpClient client, RequestFuzz fuzz, int first, int count) => Parallel.ForEachAsync(
        Enumerable.Range(first, count),
        new ParallelOptions { MaxDegreeOfParallelism = 8, CancellationToken = Cancellation },
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
        foreach (var number in times.Slow.Keys.ToList())
        {
            for (var again = 0; again < 3 && times.Slow.TryRemove(number, out _); again++)
                await AskAsync(client, fuzz.Make(unchecked(seed + number)), number);
            var asked = fuzz.Make(unchecked(seed + number));
            Assert.False(times.Slow.TryGetValue(number, out var taken), $"Seed {seed}: took {taken}: {await asked.TextAsync()}");
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
        var statuses = answers.GroupBy(answer => answer.Key.Status).OrderBy(group => group.Key)
            .Select(group => $"{group.Key}: {group.Sum(answer => answer.Value)}");
        var costs = $"longest {times.Most.TotalMilliseconds:0} ms, {growth / 1024} KB more resident";
        return $"Seed {seed}. {string.Join(", ", statuses)}; {costs}.";
    }
}
