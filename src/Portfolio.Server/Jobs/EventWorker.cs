using Microsoft.Extensions.Options;
using Portfolio.Server.Events;
using Portfolio.Server.Webhooks;
using Portfolio.Store.Access;
using Portfolio.Store.Outbox;
using Portfolio.Store.Subscriptions;

namespace Portfolio.Server.Jobs;

/// <summary>
/// Hands events on to those who subscribed, in the order in which they happened, with what follows from them. Safe to run by several at
/// once and to be killed at any point.
/// </summary>
internal sealed class EventWorker(
    EventDistribution distribution, SubscriptionStore subscriptions, PointWatch points, IOptions<WebhookOptions> options)
{
    // More are read in the next turn.
    private const int Batch = 200;

    /// <summary>Hands on until nothing is left; says whether anybody wanted anything.</summary>
    public async Task<bool> WorkAsync(CancellationToken cancellation)
    {
        var wanted = false;
        while (await distribution.ListNextAsync(Caller.System, Batch, cancellation) is { Count: > 0 } events)
        {
            OutboxEvent? passed = null;
            foreach (var told in events)
            {
                passed = await HandOnAsync(told, cancellation) ? null : told;
                wanted |= passed is null;
            }
            // What nobody wants is passed over in one step.
            if (passed is not null)
                await distribution.HandOnAsync(passed, [], [], options.Value.TriedFor, cancellation);
        }
        return wanted;
    }

    /// <summary>False when nobody wants the event and nothing follows from it: then nothing is written.</summary>
    private async Task<bool> HandOnAsync(OutboxEvent told, CancellationToken cancellation)
    {
        var active = await subscriptions.ListActiveAsync(Caller.System, told.Portfolio, cancellation);
        if (active.Count == 0)
            return false;
        Listener[] listeners = [.. active.Select(Listener.Of)];
        var noticed = await points.LookAsync(told, listeners.SelectMany(listener => listener.Wishes), cancellation);
        string[] wanting = [.. listeners.Where(listener => listener.Wants(told)).Select(listener => listener.Id)];
        if (noticed.Count == 0 && wanting.Length == 0)
            return false;
        await distribution.HandOnAsync(told, noticed, wanting, options.Value.TriedFor, cancellation);
        return true;
    }
}
