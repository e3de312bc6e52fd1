namespace Portfolio.Server.Jobs;

/// <summary>
/// Looks for runs every half minute by itself, so that work goes on even if the wake-ups fell silent. Real time, whatever clock the rest is
/// given: it asks only whether there is something to do.
/// </summary>
internal sealed class SecondLook(RunWorker worker, ILogger<SecondLook> log) : BackgroundService
{
    private static readonly TimeSpan Every = TimeSpan.FromSeconds(30);

    protected override async Task ExecuteAsync(CancellationToken stoppingToken)
    {
        using var timer = new PeriodicTimer(Every);
        while (await timer.WaitForNextTickAsync(stoppingToken))
        {
            try
            {
                await worker.WorkAsync(stoppingToken);
            }
            catch (Exception failure) when (failure is not OperationCanceledException)
            {
                RunLog.LookedInVain(log, failure);
            }
        }
    }
}
