using Hangfire;
using Portfolio.Store;
using Portfolio.Store.Access;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Jobs.Waking;

/// <summary>
/// At the start: where one process owns the storage, whoever held a lease is gone and its runs go on at once; where several share it, the
/// lease of one that is gone runs out. Then a first sweep, which also catches up what became due meanwhile.
/// </summary>
internal sealed class JobStart(
    Database database, RunClaims claims, IBackgroundJobClient client, IRecurringJobManager recurring, ILogger<JobStart> log) : IHostedService
{
    public async Task StartAsync(CancellationToken cancellation)
    {
        if (!database.IsShared && await claims.ExpireAllAsync(Caller.System, cancellation) is > 0 and var count)
            RunLog.Resumed(log, count);
        recurring.AddOrUpdate<WokenJobs>("sweep", jobs => jobs.Sweep(CancellationToken.None), Cron.Minutely);
        client.Enqueue<WokenJobs>(jobs => jobs.Sweep(CancellationToken.None));
    }

    public Task StopAsync(CancellationToken cancellation) => Task.CompletedTask;
}
