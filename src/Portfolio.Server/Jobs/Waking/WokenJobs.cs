using Hangfire;

namespace Portfolio.Server.Jobs.Waking;

/// <summary>
/// The two jobs as Hangfire sees them. Not retried: the next sweep is the retry. Names of type and methods are kept with wake-ups that wait.
/// </summary>
[AutomaticRetry(Attempts = 0, LogEvents = false, OnAttemptsExceeded = AttemptsExceededAction.Delete)]
internal sealed class WokenJobs(Sweep sweep, RunWorker worker, IHostApplicationLifetime process)
{
    // Beside the host's own sign, because Hangfire's comes only when its turn to stop has come.
    public async Task Work(CancellationToken cancellation)
    {
        using var stopping = CancellationTokenSource.CreateLinkedTokenSource(cancellation, process.ApplicationStopping);
        await worker.WorkAsync(stopping.Token).ConfigureAwait(ConfigureAwaitOptions.None);
    }

    public async Task Sweep(CancellationToken cancellation)
    {
        await sweep.RunAsync(cancellation);
        await Work(cancellation);
    }
}
