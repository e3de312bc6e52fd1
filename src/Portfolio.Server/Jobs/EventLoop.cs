using Microsoft.Extensions.Options;
using Portfolio.Server.Events;
using Portfolio.Store.Access;
using Portfolio.Store.Outbox;

namespace Portfolio.Server.Jobs;

/// <summary>
/// Tells and sends beside the runs, in loops of its own that look again at every signal and every second. Real time, whatever clock the
/// rest is given: they ask only whether there is something to do.
/// </summary>
internal sealed class EventLoop(
    EventWorker events, DeliveryWorker deliveries, EstimateAges ages, OutboxStore outbox, EventSignal signal, TimeProvider clock,
    IOptions<EventOptions> options, ILogger<EventLoop> log) : BackgroundService
{
    private static readonly TimeSpan Often = TimeSpan.FromSeconds(1);
    private static readonly TimeSpan Seldom = TimeSpan.FromSeconds(30);
    private static readonly TimeSpan Hourly = TimeSpan.FromHours(1);

    protected override async Task ExecuteAsync(CancellationToken stoppingToken)
    {
        await Task.WhenAll(
            EveryAsync(Often, TellAsync, EventLog.HandOnFailed, stoppingToken),
            EveryAsync(Often, deliveries.StartDueAsync, EventLog.LookedInVain, stoppingToken),
            EveryAsync(Seldom, ages.LookAsync, EventLog.HandOnFailed, stoppingToken),
            EveryAsync(Hourly, ForgetAsync, EventLog.HandOnFailed, stoppingToken));
        await deliveries.FinishAsync();
    }

    private async Task TellAsync(CancellationToken stopping)
    {
        if (await events.WorkAsync(stopping))
            signal.Give();
    }

    private async Task ForgetAsync(CancellationToken stopping)
    {
        if (await outbox.ForgetAsync(Caller.System, clock.GetUtcNow() - options.Value.Kept, stopping) is > 0 and var count)
            EventLog.Forgotten(log, count);
    }

    private async Task EveryAsync(
        TimeSpan wait, Func<CancellationToken, Task> look, Action<ILogger, Exception> failed, CancellationToken stopping)
    {
        while (!stopping.IsCancellationRequested)
        {
            var given = signal.Next;
            try
            {
                await look(stopping);
            }
            catch (Exception failure) when (!stopping.IsCancellationRequested)
            {
                failed(log, failure);
            }
            catch (OperationCanceledException)
            {
                return;
            }
            using var over = CancellationTokenSource.CreateLinkedTokenSource(stopping);
            var waited = Task.Delay(wait, over.Token);
            await Task.WhenAny(waited, wait == Often ? given : waited);
            await over.CancelAsync();
        }
    }
}
