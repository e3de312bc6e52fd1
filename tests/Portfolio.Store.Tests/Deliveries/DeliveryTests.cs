using Portfolio.Store.Access;
using Portfolio.Store.Deliveries;
using Portfolio.Store.Outbox;
using Portfolio.Store.Tests.Testing;

namespace Portfolio.Store.Tests.Deliveries;

/// <summary>Events handed on, claimed, sent and given up.</summary>
public abstract class DeliveryTests(StoreKind kind)
{
    public sealed class OnSqlite() : DeliveryTests(StoreKind.Sqlite);

    public sealed class OnPostgres() : DeliveryTests(StoreKind.Postgres);

    private static readonly AttemptResult Ok = new(204, null);
    private static readonly AttemptResult Failed = new(500, "The target answered 500.");

    private async Task<TestStore> BeginAsync(params string[] subscriptions)
    {
        var store = await TestStore.OpenAsync(kind);
        await store.WriteAsync("works", ("", "s"), ("lock", "a"));
        foreach (var subscription in subscriptions)
            await store.SubscribeAsync(subscription);
        return store;
    }

    [Fact]
    public async Task An_event_is_handed_on_once_and_not_to_who_came_after_it()
    {
        await using var store = await BeginAsync("office");
        var first = Assert.Single(await store.Distribution.ListNextAsync(Caller.System, 9, TestStore.Cancellation));
        Assert.True(await store.Distribution.HandOnAsync(first, [], ["office"], EventScenes.TriedFor, TestStore.Cancellation));
        Assert.Empty(await store.Deliveries.ListAsync(Caller.System, "works", "office", null, null, 9, TestStore.Cancellation));
        var second = await store.HandOnAsync("office", "nobody");
        Assert.False(await store.Distribution.HandOnAsync(second, [], ["office"], EventScenes.TriedFor, TestStore.Cancellation));
        Assert.Empty(await store.Distribution.ListNextAsync(Caller.System, 9, TestStore.Cancellation));
        Assert.Equal(second.Id, (await store.DeliveryAsync()).Event.Id);
        Assert.Equal(1, await store.CountAsync("delivery"));
    }

    [Fact]
    public async Task What_was_noticed_is_told_once_whoever_notices_it()
    {
        await using var store = await BeginAsync("office");
        var notice = new NoticedEvent("level/1", "level.moved", "project/lock", "lock", new { days = 9 });
        var told = await store.HandOnAsync();
        Assert.True(await store.Distribution.TellAsync("works", "look/1", [notice], TestStore.Cancellation));
        Assert.True(await store.Distribution.TellAsync("works", "look/2", [notice], TestStore.Cancellation));
        Assert.False(await store.Distribution.TellAsync("works", "look/2", [notice with { Once = "level/2" }], TestStore.Cancellation));
        Assert.True(await store.Distribution.IsTakenAsync("works", "look/2", TestStore.Cancellation));
        Assert.False(await store.Distribution.IsTakenAsync("works", "level/2", TestStore.Cancellation));
        var after = await store.Outbox.ReadAfterAsync(Caller.System, "works", told.Id, 9, TestStore.Cancellation);
        var moved = Assert.Single(after.Events);
        Assert.Equal(("level.moved", "project/lock", "lock", """{"days":9}"""), (moved.Kind, moved.Subject, moved.Project, moved.Payload));
    }

    [Fact]
    public async Task Of_one_subscription_one_is_sent_at_a_time_the_oldest_first()
    {
        await using var store = await BeginAsync("office", "other");
        var first = await store.HandOnAsync("office", "other");
        var second = await store.HandOnAsync("office");
        var one = (await store.SendingAsync())!;
        var two = (await store.SendingAsync())!;
        Assert.Equal([(first.Id, "office"), (first.Id, "other")], new[] { one, two }.Select(held => (held.Event.Id, held.Subscription)).Order());
        Assert.Null(await store.SendingAsync());
        var office = one.Subscription == "office" ? one : two;
        Assert.True(await store.DeliveryEndings.DeliveredAsync(office, Ok, TestStore.Cancellation));
        Assert.Equal(second.Id, (await store.SendingAsync())!.Event.Id);
    }

    [Fact]
    public async Task A_sender_that_vanished_loses_its_lease_and_its_say()
    {
        await using var store = await BeginAsync("office");
        await store.HandOnAsync("office");
        var gone = (await store.SendingAsync())!;
        store.Clock.Advance(EventScenes.Lease);
        var held = (await store.SendingAsync())!;
        Assert.Equal((gone.Id, gone.Fence + 1, 2), (held.Id, held.Fence, held.Attempt));
        Assert.False(await store.DeliveryEndings.DeliveredAsync(gone, Ok, TestStore.Cancellation));
        Assert.False(await store.DeliveryEndings.FailedAsync(gone, Failed, null, TestStore.Cancellation));
        Assert.False(await store.DeliveryEndings.GoneAsync(gone, Failed, TestStore.Cancellation));
        Assert.False(await store.DeliveryClaims.ReleaseAsync(gone, TestStore.Cancellation));
        Assert.True(await store.DeliveryEndings.DeliveredAsync(held, Ok, TestStore.Cancellation));
        var delivery = await store.DeliveryAsync();
        Assert.Equal((DeliveryState.Delivered, 204, TestStore.Start + EventScenes.Lease), (delivery.State, delivery.LastStatus, delivery.DeliveredAt));
    }

    [Fact]
    public async Task A_failed_attempt_waits_and_its_target_stands_behind_those_that_answer()
    {
        await using var store = await BeginAsync("office", "zebra");
        await store.HandOnAsync("office");
        var held = (await store.SendingAsync())!;
        await store.DeliveryEndings.FailedAsync(held, Failed, TestStore.Start.AddSeconds(10), TestStore.Cancellation);
        Assert.Null(await store.SendingAsync());
        store.Clock.Advance(TimeSpan.FromSeconds(10));
        await store.HandOnAsync("zebra");
        Assert.Null((await store.SendingAsync(failing: false))!.Subscription == "zebra" ? await store.SendingAsync(failing: false) : held);
        var again = (await store.SendingAsync())!;
        Assert.Equal(("office", 2, true), (again.Subscription, again.Attempt, again.Failing));
        Assert.True(await store.DeliveryClaims.ReleaseAsync(again, TestStore.Cancellation));
        Assert.Equal(1, (await store.DeliveryAsync()).Attempt);
        await store.DeliveryEndings.FailedAsync((await store.SendingAsync())!, Failed, null, TestStore.Cancellation);
        Assert.Equal(DeliveryState.Dead, (await store.DeliveryAsync()).State);
        Assert.Equal(2, (await store.Subscriptions.FindAsync(Caller.System, "works", "office", TestStore.Cancellation))!.Failures);
    }

    [Fact]
    public async Task A_target_that_wants_to_wait_is_sent_nothing_until_then_or_until_somebody_asks()
    {
        await using var store = await BeginAsync("office", "zebra");
        await store.HandOnAsync("office");
        await store.HandOnAsync("office", "zebra");
        var later = TestStore.Start.AddMinutes(10);
        var busy = new AttemptResult(429, "The target answered 429.", later);
        await store.DeliveryEndings.FailedAsync((await store.SendingAsync())!, busy, later, TestStore.Cancellation);
        var other = (await store.SendingAsync())!;
        Assert.Equal("zebra", other.Subscription);
        Assert.True(await store.DeliveryEndings.DeliveredAsync(other, Ok, TestStore.Cancellation));
        Assert.Null(await store.SendingAsync());
        var newest = await store.DeliveryAsync();
        await store.Deliveries.RedeliverAsync(
            Caller.System, "works", "office", newest.Id, EventScenes.TriedFor, null, TestStore.Cancellation);
        await store.DeliveryEndings.FailedAsync((await store.SendingAsync())!, busy, later, TestStore.Cancellation);
        Assert.Null(await store.SendingAsync());
        store.Clock.SetUtcNow(later);
        Assert.Equal("office", (await store.SendingAsync())!.Subscription);
    }

    [Fact]
    public async Task What_waits_for_a_subscription_that_is_switched_off_is_dead()
    {
        await using var store = await BeginAsync("office");
        await store.HandOnAsync("office");
        await store.HandOnAsync("office");
        var held = (await store.SendingAsync())!;
        await store.ReplaceAsync("office", EventScenes.Content with { Active = false });
        var waited = await store.DeliveryAsync();
        Assert.Equal(
            (DeliveryState.Dead, "The subscription was switched off before it could be sent."), (waited.State, waited.LastError));
        await store.DeliveryEndings.FailedAsync(held, Failed, TestStore.Start.AddSeconds(10), TestStore.Cancellation);
        await store.ReplaceAsync("office", EventScenes.Content);
        store.Clock.Advance(TimeSpan.FromMinutes(1));
        Assert.Null(await store.SendingAsync());
        Assert.Equal(2, await store.RawAsync<long>("select count(*) from delivery where state = 'dead'"));
    }

    [Fact]
    public async Task What_an_earlier_target_says_of_itself_does_not_end_the_subscription()
    {
        await using var store = await BeginAsync("office");
        await store.HandOnAsync("office");
        var held = (await store.SendingAsync())!;
        await store.ReplaceAsync("office", EventScenes.Content with { Url = "https://hooks.harbour.example/new" });
        var gone = new AttemptResult(410, "The target answered 410: it is gone for good.");
        Assert.False(await store.DeliveryEndings.GoneAsync(held, gone, TestStore.Cancellation));
        var again = (await store.SendingAsync())!;
        Assert.Equal((held.Id, "https://hooks.harbour.example/new"), (again.Id, again.Url));
        Assert.True(await store.DeliveryEndings.GoneAsync(again, gone, TestStore.Cancellation));
        Assert.True((await store.Subscriptions.FindAsync(Caller.System, "works", "office", TestStore.Cancellation))!.Gone);
    }

    [Fact]
    public async Task What_is_asked_anew_every_day_or_minute_leaves_nothing_for_ever()
    {
        await using var store = await BeginAsync("office");
        var notice = new NoticedEvent("stale/1", "estimates.stale", "project/lock", "lock", new { days = 9 });
        for (var minute = 0; minute < 3; minute++)
        {
            for (var post = 0; post < 2; post++)
                await store.Audit.AppendRefusedPostAsync(Caller.System, "works", "document.put", "portfolios/works", new { }, TestStore.Cancellation);
            await store.Distribution.TellAsync("works", $"look/{minute}", [notice], TestStore.Cancellation);
            store.Clock.Advance(TimeSpan.FromMinutes(1));
        }
        Assert.Equal(3, await store.RawAsync<long>("select count(*) from outbox where kind = 'post.refused'"));
        Assert.Equal(5, await store.CountAsync("event_marker"));
        await store.Outbox.ForgetAsync(Caller.System, store.Clock.GetUtcNow(), TestStore.Cancellation);
        Assert.Equal("stale/1", await store.RawAsync<string>("select name from event_marker"));
        await store.Distribution.TellAsync("works", "look/0", [notice], TestStore.Cancellation);
        Assert.Equal(1, await store.RawAsync<long>("select count(*) from event_marker where name = 'stale/1'"));
    }

    [Fact]
    public async Task A_secret_that_was_replaced_signs_until_its_time_is_over()
    {
        await using var store = await BeginAsync("office");
        await store.Subscriptions.RotateAsync(
            Caller.System, "works", "office", "whsec_c2Vjb25k", TimeSpan.FromMinutes(5), _ => null, null, TestStore.Cancellation);
        await store.HandOnAsync("office");
        var held = (await store.SendingAsync())!;
        Assert.Equal(new SigningSecrets("whsec_c2Vjb25k", "whsec_Zmlyc3Q="), held.Secrets);
        Assert.DoesNotContain("whsec", held.ToString(), StringComparison.Ordinal);
        store.Clock.Advance(TimeSpan.FromMinutes(5));
        Assert.Equal(new SigningSecrets("whsec_c2Vjb25k", null), (await store.SendingAsync())!.Secrets);
    }

    [Theory]
    [InlineData("update delivery set state = 'sent'")]
    [InlineData("update delivery set lease_until = 1")]
    [InlineData("update delivery set state = 'dead', next_attempt_at = null")]
    [InlineData("update delivery set state = 'delivered', next_attempt_at = null")]
    [InlineData("update subscription set ended = 'gone'")]
    [InlineData("update subscription set previous_secret = 'x'")]
    public async Task States_that_do_not_exist_cannot_be_kept(string tampering)
    {
        await using var store = await BeginAsync("office");
        await store.HandOnAsync("office");
        await Assert.ThrowsAnyAsync<System.Data.Common.DbException>(() => store.RawAsync<long>(tampering));
    }
}
