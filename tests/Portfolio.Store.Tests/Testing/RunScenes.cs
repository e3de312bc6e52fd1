using System.Text;
using Portfolio.Store.Access;
using Portfolio.Store.Results;
using Portfolio.Store.Runs;
using Portfolio.Store.Samples;

namespace Portfolio.Store.Tests.Testing;

/// <summary>Runs in the states that tests begin from.</summary>
internal static class RunScenes
{
    public const string Engine = "1.0";
    public static readonly TimeSpan Lease = TimeSpan.FromSeconds(8);
    public static readonly DateOnly Today = DateOnly.FromDateTime(TestStore.Start.UtcDateTime);
    public static readonly string Digest = new('d', 64);

    public static NewRun Asked(DateOnly asOf, string portfolio = "works", bool recorded = true, string? replaces = null) => new()
    {
        Portfolio = portfolio,
        AsOf = asOf,
        DateEndsAt = new DateTimeOffset(asOf.AddDays(1).ToDateTime(TimeOnly.MinValue), TimeSpan.Zero),
        Revision = 1,
        Seed = 1,
        Iterations = 100,
        Recorded = recorded,
        Replaces = replaces,
    };

    public static async Task<StoredRun> QueueAsync(this TestStore store, NewRun run)
    {
        var made = await store.Requests.CreateAsync(Caller.System, run, null, TestStore.Cancellation);
        Assert.Equal(RunRequestOutcome.Created, made.Outcome);
        return made.Run!;
    }

    public static Task<RunLease?> ClaimAsync(this TestStore store, string engine = Engine) =>
        store.Claims.ClaimAsync(Caller.System, "worker", engine, Lease, TestStore.Cancellation);

    /// <summary>Claims whatever is next and lets it succeed.</summary>
    public static async Task<RunLease> WorkAsync(this TestStore store)
    {
        var held = await store.ClaimAsync();
        Assert.NotNull(held);
        Assert.True(await store.Endings.SucceedAsync(held, Result(held.Run.Id), TestStore.Cancellation));
        return held;
    }

    public static async Task<StoredRun> FindAsync(this TestStore store, string run, string portfolio = "works") =>
        (await store.Runs.FindAsync(Caller.System, portfolio, run, TestStore.Cancellation))!;

    public static RunResult Result(string mark) => new()
    {
        ResultDigest = Digest,
        InputsDigest = Digest,
        Warnings = "[]",
        Rows = [Row("portfolio", mark), Row("project/lock", mark), Row("milestone/lock/M1", mark)],
        Grids = [Grid("portfolio", "finish", mark), Grid("project/lock", "finish", mark), Grid("project/lock", "cost", mark)],
        Allocations = [new AllocationRow(80, Encoding.UTF8.GetBytes(mark))],
    };

    public static SeriesBlock[] Block(int block) =>
    [
        SeriesBlock.OfMinutes("finish/lock", new[] { block, int.MinValue, block + 7 }),
        SeriesBlock.OfMoney("cost/lock", new[] { block * 100.0, 12_345_678_901.0, 3.0 }),
    ];

    private static ResultRow Row(string scope, string mark) => new(scope, Encoding.UTF8.GetBytes($"{scope} {mark}"));

    private static GridRow Grid(string scope, string metric, string mark) =>
        new(scope, metric, 1, 2, metric == "cost" ? null : 3, 1, Encoding.UTF8.GetBytes($"{scope} {metric} {mark}"));
}
