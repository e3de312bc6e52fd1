using System.Collections.Concurrent;
using Microsoft.Extensions.Options;
using Portfolio.Server.Events;
using Portfolio.Server.Webhooks;
using Portfolio.Store;
using Portfolio.Store.Access;
using Portfolio.Store.Deliveries;

namespace Portfolio.Server.Jobs;

/// <summary>
/// Sends deliveries that are due, some at a time, one to a subscription. Targets whose last attempt failed get at most half of the
/// senders, so that those which hang never keep the others waiting. Claims first, finishes last; to be killed at any point does no harm:
/// a delivery that was sent and not yet recorded is sent again.
/// </summary>
internal sealed class DeliveryWorker(
    Database database, DeliveryClaims claims, DeliveryEndings endings, WebhookSender sender, EventSignal signal, TimeProvider clock,
    IOptions<WebhookOptions> options, ILogger<DeliveryWorker> log)
{
    private readonly WebhookOptions settings = options.Value;
    private readonly string owner = $"{Environment.MachineName}/{Environment.ProcessId}";
    private readonly ConcurrentDictionary<string, (Task Work, bool Failing)> working = new(StringComparer.Ordinal);
    private bool begun;

    /// <summary>Starts whatever is due as far as senders are free. When one becomes free the signal is given.</summary>
    /// <param name="stopping">The process ends: what is being sent goes back.</param>
    public async Task StartDueAsync(CancellationToken stopping)
    {
        await BeginAsync(stopping);
        while (working.Count < settings.Senders && !stopping.IsCancellationRequested)
        {
            var failing = working.Values.Count(work => work.Failing) < settings.Senders / 2;
            if (await claims.ClaimAsync(Caller.System, owner, settings.Lease, failing, stopping) is not { } held)
                return;
            var started = new TaskCompletionSource();
            var work = Task.Run(() => WorkAsync(started.Task, held, stopping), CancellationToken.None);
            working[$"{held.Id}/{held.Fence}"] = (work, held.Failing);
            started.SetResult();
        }
    }

    /// <summary>Where one process owns the storage, whoever held a lease before it is gone.</summary>
    private async Task BeginAsync(CancellationToken stopping)
    {
        if (!begun && !database.IsShared)
            await claims.ExpireAllAsync(Caller.System, stopping);
        begun = true;
    }

    /// <summary>Waits for what was started.</summary>
    public Task FinishAsync() => Task.WhenAll(working.Values.Select(work => work.Work));

    private async Task WorkAsync(Task started, DeliveryLease held, CancellationToken stopping)
    {
        await started;
        try
        {
            await EndAsync(held, await sender.SendAsync(held, stopping));
        }
        catch (OperationCanceledException) when (stopping.IsCancellationRequested)
        {
            await claims.ReleaseAsync(held, CancellationToken.None);
        }
        catch (Exception failure)
        {
            // The lease runs out, and another attempt is made.
            EventLog.SendFailed(log, held.Id, failure);
        }
        finally
        {
            working.TryRemove($"{held.Id}/{held.Fence}", out _);
            signal.Give();
        }
    }

    private async Task EndAsync(DeliveryLease held, AttemptResult result)
    {
        if (result.Error is null)
        {
            await endings.DeliveredAsync(held, result, CancellationToken.None);
            return;
        }
        EventLog.AttemptFailed(log, held.Id, held.Subscription, held.Attempt, result.Error);
        if (result.Status == (int)System.Net.HttpStatusCode.Gone)
        {
            if (await endings.GoneAsync(held, result, CancellationToken.None))
                EventLog.SubscriptionEnded(log, held.Subscription);
            return;
        }
        var next = RetryTimes.Next(held.Id, held.Attempt, clock.GetUtcNow(), held.GiveUpAt, settings, result.RetryAt);
        if (await endings.FailedAsync(held, result, next, CancellationToken.None) && next is null)
            EventLog.GivenUp(log, held.Id, held.Subscription, held.Attempt);
    }
}
