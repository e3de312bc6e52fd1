using Portfolio.Store.Access;
using Portfolio.Store.Audit;

namespace Portfolio.Server.Audit;

/// <summary>
/// Says at the start and once a day in the log where the audit trail has come to. Logs are kept elsewhere: a trail that was cut short, or
/// written anew from some entry on, contradicts them.
/// </summary>
internal sealed partial class HeadInLog(AuditStore audit, ILogger<HeadInLog> log) : BackgroundService
{
    private static readonly TimeSpan Daily = TimeSpan.FromDays(1);

    protected override async Task ExecuteAsync(CancellationToken stoppingToken)
    {
        using var timer = new PeriodicTimer(Daily);
        do
        {
            try
            {
                if (await audit.ListAsync(Caller.System, null, 1, stoppingToken) is [var head])
                    LogHead(head.Sequence, head.Hash);
            }
            catch (Exception failure) when (failure is not OperationCanceledException)
            {
                LogUnknown(failure);
            }
        }
        while (await timer.WaitForNextTickAsync(stoppingToken));
    }

    [LoggerMessage(2200, LogLevel.Information, "The audit trail has {Entries} entries, head {Hash}.")]
    private partial void LogHead(long entries, string hash);

    [LoggerMessage(2201, LogLevel.Error, "The head of the audit trail cannot be told; tomorrow it is tried again.")]
    private partial void LogUnknown(Exception failure);
}
