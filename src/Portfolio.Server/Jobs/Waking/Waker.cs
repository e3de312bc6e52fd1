using Hangfire;

namespace Portfolio.Server.Jobs.Waking;

/// <summary>
/// Turns a signal into a wake-up. Beside the thread that gives it, which must not wait: the storage of wake-ups may be a server, and away.
/// </summary>
internal sealed class Waker(RunSignal signal, IBackgroundJobClient client, ILogger<Waker> log) : IHostedService
{
    private int underWay;

    public Task StartAsync(CancellationToken cancellation)
    {
        signal.Given += Wake;
        return Task.CompletedTask;
    }

    public Task StopAsync(CancellationToken cancellation)
    {
        signal.Given -= Wake;
        return Task.CompletedTask;
    }

    private void Wake()
    {
        if (Interlocked.Exchange(ref underWay, 1) == 0)
            _ = Task.Run(Enqueue);
    }

    private void Enqueue()
    {
        // Before, not after: a signal given from here on may tell of something that this wake-up does not see any more.
        Volatile.Write(ref underWay, 0);
        try
        {
            client.Enqueue<WokenJobs>(jobs => jobs.Work(CancellationToken.None));
        }
        catch (Exception failure)
        {
            RunLog.NotWoken(log, failure);
        }
    }
}
