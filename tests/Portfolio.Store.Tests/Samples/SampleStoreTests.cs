using Portfolio.Store.Access;
using Portfolio.Store.Runs;
using Portfolio.Store.Samples;
using Portfolio.Store.Tests.Testing;

namespace Portfolio.Store.Tests.Samples;

public abstract class SampleStoreTests(StoreKind kind)
{
    public sealed class OnSqlite() : SampleStoreTests(StoreKind.Sqlite);

    public sealed class OnPostgres() : SampleStoreTests(StoreKind.Postgres);

    private async Task<(TestStore Store, RunLease Held)> RunningAsync()
    {
        var store = await TestStore.OpenAsync(kind);
        await store.WriteAsync("works", ("", "s"));
        await store.QueueAsync(RunScenes.Asked(RunScenes.Today));
        return (store, (await store.ClaimAsync())!);
    }

    private static Task<int[]?> MinutesAsync(TestStore store, RunLease held, string series = "finish/lock") =>
        store.Samples.ReadMinutesAsync(Caller.System, "works", held.Run.Id, series, TestStore.Cancellation);

    [Fact]
    public async Task Blocks_read_in_their_order_whatever_the_order_of_writing()
    {
        var (store, held) = await RunningAsync();
        await using var _ = store;
        foreach (var block in new[] { 2, 0, 11, 1 })
            Assert.True(await store.Samples.WriteBlockAsync(held, block, 3, RunScenes.Block(block), TestStore.Cancellation));
        Assert.Equal([0, 1, 2, 11], await store.Samples.ListBlocksAsync(held, TestStore.Cancellation));
        var minutes = await MinutesAsync(store, held);
        Assert.Equal([0, int.MinValue, 7, 1, int.MinValue, 8, 2, int.MinValue, 9, 11, int.MinValue, 18], minutes!);
        var money = await store.Samples.ReadMoneyAsync(Caller.System, "works", held.Run.Id, "cost/lock", TestStore.Cancellation);
        Assert.Equal([0, 12_345_678_901, 3, 100, 12_345_678_901, 3], money![..6]);
        Assert.Null(await MinutesAsync(store, held, "finish/quay"));
    }

    [Fact]
    public async Task Many_series_are_written_and_read_at_once()
    {
        var (store, held) = await RunningAsync();
        await using var _ = store;
        string[] names = [.. Enumerable.Range(0, 700).Select(number => $"milestone/p/M{number}")];
        foreach (var block in new[] { 1, 0 })
            Assert.True(await store.Samples.WriteBlockAsync(
                held, block, 1, [.. names.Select((name, number) => SeriesBlock.OfMinutes(name, new[] { number + 1000 * block }))],
                TestStore.Cancellation));
        Assert.Equal(1400, await store.CountAsync("sample"));
        var kept = await store.Samples.ReadSeriesAsync(held, [.. names[..40], "finish/none"], TestStore.Cancellation);
        Assert.Equal(names[..40].Order(), kept.Keys.Order());
        Assert.Equal([39, 1039], kept[names[39]].ToMinutes());

        await store.RawAsync<long>($"update sample set checksum = checksum + 1 where series = '{names[7]}'");
        await Assert.ThrowsAsync<StoreDamagedException>(() => store.Samples.ReadSeriesAsync(held, names[..16], TestStore.Cancellation));
        Assert.Equal(16, (await store.Samples.ReadSeriesAsync(held, names[16..32], TestStore.Cancellation)).Count);
    }

    [Fact]
    public async Task A_block_that_is_there_is_left_alone()
    {
        var (store, held) = await RunningAsync();
        await using var _ = store;
        await store.Samples.WriteBlockAsync(held, 0, 3, RunScenes.Block(0), TestStore.Cancellation);
        var before = await store.DumpAsync();
        Assert.True(await store.Samples.WriteBlockAsync(held, 0, 3, RunScenes.Block(5), TestStore.Cancellation));
        Assert.Equal(before, await store.DumpAsync());
    }

    [Theory]
    [InlineData("""
        update sample set bytes = (select c.bytes from sample c where c.series = 'cost/lock' and c.block = sample.block)
        where series = 'finish/lock'
        """)]
    [InlineData("update sample set checksum = checksum + 1")]
    [InlineData("update sample set block = block + 10")]
    public async Task Damage_is_noticed_and_named(string damage)
    {
        var (store, held) = await RunningAsync();
        await using var _ = store;
        await store.Samples.WriteBlockAsync(held, 4, 3, RunScenes.Block(4), TestStore.Cancellation);
        await store.Samples.WriteBlockAsync(held, 5, 3, RunScenes.Block(5), TestStore.Cancellation);
        await store.RawAsync<long>($"{store.Place.WithoutReferencesSql}; {damage}");
        var noticed = await Assert.ThrowsAsync<StoreDamagedException>(() => MinutesAsync(store, held));
        Assert.Contains("finish/lock", noticed.Message, StringComparison.Ordinal);
        Assert.Contains(held.Run.Id, noticed.Message, StringComparison.Ordinal);
    }

    [Fact]
    public async Task Minutes_and_money_are_not_mixed_up()
    {
        var (store, held) = await RunningAsync();
        await using var _ = store;
        await store.Samples.WriteBlockAsync(held, 0, 2, [SeriesBlock.OfMoney("cost/lock", new[] { 0.5, 1 })], TestStore.Cancellation);
        await Assert.ThrowsAsync<InvalidOperationException>(() => MinutesAsync(store, held, "cost/lock"));
    }

    [Fact]
    public async Task A_large_run_of_normal_finishes_and_costs_stays_small()
    {
        // A tenth of 200 projects × (finish, cost, 10 milestones) × 10,000 iterations; finishes with a standard deviation of 60 days,
        // costs of 2 million in cents.
        var (store, held) = await RunningAsync();
        await using var _ = store;
        await store.Database.MaintainAsync(TestStore.Cancellation);
        var before = await store.Place.SizeAsync();
        var seed = new CsCheck.PCG(1);
        foreach (var (block, count) in new[] { (0, 4096), (1, 4096), (2, 1808) })
        {
            var series = new List<SeriesBlock>();
            for (var project = 0; project < 20; project++)
            {
                series.Add(SeriesBlock.OfMinutes($"finish/p{project}", Normal(seed, count, 30_000_000, 86_400)));
                series.Add(SeriesBlock.OfMoney(
                    $"cost/p{project}", Array.ConvertAll(Normal(seed, count, 1_900_000_000, 200_000_000), value => (double)value)));
                for (var milestone = 0; milestone < 10; milestone++)
                    series.Add(SeriesBlock.OfMinutes($"milestone/p{project}/M{milestone}", Normal(seed, count, 29_500_000, 86_400)));
            }
            await store.Samples.WriteBlockAsync(held, block, count, series, TestStore.Cancellation);
        }
        await store.Database.MaintainAsync(TestStore.Cancellation);
        var grown = await store.Place.SizeAsync() - before;
        TestContext.Current.TestOutputHelper?.WriteLine($"{grown:N0} bytes, {8.0 * grown / (240 * 10_000):F2} bits a value");
        Assert.InRange(grown, 1_000_000, 7_000_000);
        Assert.Equal(10_000, (await MinutesAsync(store, held, "milestone/p19/M9"))!.Length);
    }

    /// <summary>Sums of twelve uniforms: near enough to normal for a question of size.</summary>
    private static int[] Normal(CsCheck.PCG seed, int count, int mean, int sd)
    {
        var values = new int[count];
        for (var i = 0; i < count; i++)
        {
            var sum = -6.0;
            for (var k = 0; k < 12; k++)
                sum += seed.Next() / (double)uint.MaxValue;
            values[i] = (int)(mean + sd * sum);
        }
        return values;
    }
}
