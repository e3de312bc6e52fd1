using System.Text;
using Portfolio.Store.Access;
using Portfolio.Store.Results;
using Portfolio.Store.Tests.Testing;

namespace Portfolio.Store.Tests.Results;

public abstract class ResultStoreTests(StoreKind kind)
{
    public sealed class OnSqlite() : ResultStoreTests(StoreKind.Sqlite);

    public sealed class OnPostgres() : ResultStoreTests(StoreKind.Postgres);

    private async Task<TestStore> WithPointsAsync(int days)
    {
        var store = await TestStore.OpenAsync(kind);
        await store.WriteAsync("works", ("", "s"), ("lock", "a"));
        for (var day = days - 1; day >= 0; day--)
        {
            await store.QueueAsync(RunScenes.Asked(RunScenes.Today.AddDays(-day)));
            await store.WorkAsync();
        }
        return store;
    }

    private static string Text(byte[]? bytes) => Encoding.UTF8.GetString(bytes!);

    [Fact]
    public async Task Rows_come_back_whole_and_in_their_order()
    {
        await using var store = await WithPointsAsync(1);
        var run = (await store.Runs.FindLatestAsync(Caller.System, "works", TestStore.Cancellation))!.Id;
        var rows = await store.Results.ListAsync(Caller.System, "works", run, 0, 1000, TestStore.Cancellation);
        Assert.Equal([$"portfolio {run}", $"project/lock {run}", $"milestone/lock/M1 {run}"], rows.Select(row => Text(row.Json)));
        var page = await store.Results.ListAsync(Caller.System, "works", run, 1, 1, TestStore.Cancellation);
        Assert.Equal("project/lock", Assert.Single(page).Scope);
        Assert.Equal($"project/lock {run}", Text(
            (await store.Results.FindAsync(Caller.System, "works", run, "project/lock", TestStore.Cancellation))?.Json));
        Assert.Null(await store.Results.FindAsync(Caller.System, "works", run, "project/quay", TestStore.Cancellation));
        Assert.Null(await store.Results.FindAsync(Caller.System, "harbour", run, "portfolio", TestStore.Cancellation));
    }

    [Fact]
    public async Task Grids_and_allocations_come_back_whole()
    {
        await using var store = await WithPointsAsync(1);
        var run = (await store.Runs.FindLatestAsync(Caller.System, "works", TestStore.Cancellation))!.Id;
        var cost = (await store.Results.FindGridAsync(Caller.System, "works", run, "project/lock", "cost", TestStore.Cancellation))!;
        Assert.Equal((1.0, 2.0, (double?)null, 1.0, $"project/lock cost {run}"), (
            cost.Base!.Value, cost.Mean!.Value, cost.Sd, cost.Happens, Text(cost.Bytes)));
        var all = await store.Results.ListGridsAsync(Caller.System, "works", run, TestStore.Cancellation);
        Assert.Equal(
            [("portfolio", "finish"), ("project/lock", "finish"), ("project/lock", "cost")], all.Select(grid => (grid.Scope, grid.Metric)));
        Assert.Equal(run, Text((await store.Results.FindAllocationAsync(Caller.System, "works", run, 80, TestStore.Cancellation))?.Bytes));
        Assert.Null(await store.Results.FindAllocationAsync(Caller.System, "works", run, 80.5, TestStore.Cancellation));
    }

    [Fact]
    public async Task A_series_has_one_grid_for_each_point_in_date_order()
    {
        await using var store = await WithPointsAsync(5);
        await store.QueueAsync(RunScenes.Asked(RunScenes.Today.AddDays(-2), recorded: false));
        await store.WorkAsync();
        var points = await store.Results.ListSeriesAsync(
            Caller.System, "works", "project/lock", "cost", null, null, TestStore.Cancellation);
        Assert.Equal(Enumerable.Range(-4, 5).Select(RunScenes.Today.AddDays), points.Select(point => point.AsOf));
        Assert.All(points, point => Assert.Equal(($"project/lock cost {point.Run}", 1), (Text(point.Grid.Bytes), point.Revision)));
        var some = await store.Results.ListSeriesAsync(
            Caller.System, "works", "project/lock", "cost", RunScenes.Today.AddDays(-3), RunScenes.Today.AddDays(-1), TestStore.Cancellation);
        Assert.Equal(points.Skip(1).Take(3).Select(point => point.Run), some.Select(point => point.Run));
        Assert.Empty(await store.Results.ListSeriesAsync(Caller.System, "works", "portfolio", "cost", null, null, TestStore.Cancellation));
    }

    [Fact]
    public async Task A_scope_that_cannot_be_read_back_is_refused_with_the_whole_ending()
    {
        await using var store = await TestStore.OpenAsync(kind);
        await store.WriteAsync("works", ("", "s"));
        await store.QueueAsync(RunScenes.Asked(RunScenes.Today));
        var held = (await store.ClaimAsync())!;
        var before = await store.DumpAsync();
        var wrong = RunScenes.Result("r") with { Rows = [new ResultRow("projects/lock", [1])] };
        await Assert.ThrowsAsync<ArgumentException>(() => store.Endings.SucceedAsync(held, wrong, TestStore.Cancellation));
        Assert.Equal(before, await store.DumpAsync());
    }
}
