using Hangfire.Logging;
using Microsoft.Extensions.Logging.Abstractions;

namespace Portfolio.Server.Jobs.Waking;

/// <summary>
/// Hangfire keeps one log for the whole program, for ever; a host's own ends with the host. What is said after that is nobody's to hear.
/// </summary>
internal sealed class WakeUpLogs(ILoggerFactory logs) : ILogProvider
{
    public ILog GetLogger(string name)
    {
        try
        {
            return new Log(logs.CreateLogger(name));
        }
        catch (ObjectDisposedException)
        {
            return new Log(NullLogger.Instance);
        }
    }

    private sealed class Log(ILogger log) : ILog
    {
        bool ILog.Log(Hangfire.Logging.LogLevel level, Func<string>? message, Exception? exception)
        {
            // Both count the same six levels from trace upwards.
            var asked = (Microsoft.Extensions.Logging.LogLevel)(int)level;
            try
            {
                if (message is not null && log.IsEnabled(asked))
                    WakeUpLog.Said(log, asked, message(), exception);
                return log.IsEnabled(asked);
            }
            catch (Exception)
            {
                // A log that cannot be written, such as that of a host that has ended, must not keep another host's jobs from starting.
                return false;
            }
        }
    }
}

internal static partial class WakeUpLog
{
    [LoggerMessage(EventId = 2020, Message = "{Text}")]
    public static partial void Said(ILogger log, Microsoft.Extensions.Logging.LogLevel level, string text, Exception? exception);
}
