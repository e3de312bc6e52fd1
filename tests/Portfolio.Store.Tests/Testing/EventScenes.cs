using Portfolio.Store.Access;
using Portfolio.Store.Deliveries;
using Portfolio.Store.Outbox;
using Portfolio.Store.Subscriptions;

namespace Portfolio.Store.Tests.Testing;

/// <summary>Subscriptions of the portfolio works, and events on their way to them.</summary>
internal static class EventScenes
{
    public static readonly SubscriptionContent Content = new("https://hooks.harbour.example/", """[{"type":"revision.created"}]""", true);

    public static readonly TimeSpan Lease = TimeSpan.FromSeconds(30);
    public static readonly TimeSpan TriedFor = TimeSpan.FromHours(24);

    public static Task<SubscriptionResult> SubscribeAsync(this TestStore store, string id) => store.Subscriptions.CreateAsync(
        Caller.System, "works", id, Content, "whsec_Zmlyc3Q=", 99, null, TestStore.Cancellation);

    public static Task<SubscriptionResult> ReplaceAsync(this TestStore store, string id, SubscriptionContent content) =>
        store.Subscriptions.ReplaceAsync(Caller.System, "works", id, content, _ => null, null, TestStore.Cancellation);

    /// <summary>Something happens, and is handed on to these.</summary>
    public static async Task<OutboxEvent> HandOnAsync(this TestStore store, params string[] subscriptions)
    {
        await store.WriteAsync("works", ("lock", Guid.NewGuid().ToString()));
        return await store.HandOnLastAsync(subscriptions);
    }

    /// <summary>What happened last is handed on to these.</summary>
    public static async Task<OutboxEvent> HandOnLastAsync(this TestStore store, params string[] subscriptions)
    {
        var told = (await store.Distribution.ListNextAsync(Caller.System, 1000, TestStore.Cancellation))[^1];
        Assert.True(await store.Distribution.HandOnAsync(told, [], subscriptions, TriedFor, TestStore.Cancellation));
        return told;
    }

    public static Task<DeliveryLease?> SendingAsync(this TestStore store, bool failing = true) =>
        store.DeliveryClaims.ClaimAsync(Caller.System, "sender", Lease, failing, TestStore.Cancellation);

    public static async Task<StoredDelivery> DeliveryAsync(this TestStore store, string subscription = "office") =>
        (await store.Deliveries.ListAsync(Caller.System, "works", subscription, null, null, 1, TestStore.Cancellation))[0];
}
