using Portfolio.Store.Access;
using Portfolio.Store.Schedules;
using Portfolio.Store.Tests.Testing;

namespace Portfolio.Store.Tests.Schedules;

public abstract class ScheduleStoreTests(StoreKind kind)
{
    public sealed class OnSqlite() : ScheduleStoreTests(StoreKind.Sqlite);

    public sealed class OnPostgres() : ScheduleStoreTests(StoreKind.Postgres);

    private static async Task<SchedulePutOutcome> PutAsync(
        TestStore store, string portfolio, string cron, bool enabled, int? iterations = null) =>
        (await store.Schedules.PutAsync(Caller.System, portfolio, cron, iterations, enabled, null, TestStore.Cancellation)).Outcome;

    [Fact]
    public async Task A_schedule_is_kept_changed_and_told_to_the_audit_trail()
    {
        await using var store = await TestStore.OpenAsync(kind);
        await store.WriteAsync("works", ("", "s"));
        Assert.Null(await store.Schedules.FindAsync(Caller.System, "works", TestStore.Cancellation));
        Assert.Equal(SchedulePutOutcome.Stored, await PutAsync(store, "works", "0 2 * * *", enabled: true));
        store.Clock.Advance(TimeSpan.FromHours(1));
        Assert.Equal(SchedulePutOutcome.Unchanged, await PutAsync(store, "works", "0 2 * * *", enabled: true));
        var first = (await store.Schedules.FindAsync(Caller.System, "works", TestStore.Cancellation))!;
        Assert.Equal(new StoredSchedule { Portfolio = "works", Cron = "0 2 * * *", Enabled = true, ChangedAt = TestStore.Start }, first);
        Assert.Equal(SchedulePutOutcome.Stored, await PutAsync(store, "works", "0 3 * * 1-5", enabled: false, iterations: 20_000));
        var second = (await store.Schedules.FindAsync(Caller.System, "works", TestStore.Cancellation))!;
        Assert.Equal(("0 3 * * 1-5", 20_000, false, TestStore.Start.AddHours(1)), (
            second.Cron, second.Iterations!.Value, second.Enabled, second.ChangedAt));
        var entries = await store.Audit.ListAsync(Caller.System, null, 10, TestStore.Cancellation);
        Assert.Equal(2, entries.Count(entry => entry.Action == "schedule.put"));
    }

    [Fact]
    public async Task Enabled_ones_are_listed_unless_archived()
    {
        await using var store = await TestStore.OpenAsync(kind);
        foreach (var portfolio in new[] { "works", "harbour", "basin" })
        {
            await store.WriteAsync(portfolio, ("", "s"));
            await PutAsync(store, portfolio, "0 2 * * *", enabled: portfolio != "basin");
        }
        Assert.Equal(["harbour", "works"], (await store.Schedules.ListEnabledAsync(Caller.System, TestStore.Cancellation)).Select(
            schedule => schedule.Portfolio));
        await store.RawAsync<long>("update portfolio set archived_at = 1 where id = 'works'");
        Assert.Equal(["harbour"], (await store.Schedules.ListEnabledAsync(Caller.System, TestStore.Cancellation)).Select(
            schedule => schedule.Portfolio));
        Assert.Equal(SchedulePutOutcome.Archived, await PutAsync(store, "works", "0 4 * * *", enabled: true));
        Assert.Equal(SchedulePutOutcome.NotFound, await PutAsync(store, "nowhere", "0 4 * * *", enabled: true));
    }
}
