namespace Portfolio.Server.Jobs;

/// <summary>What the jobs say in the log. Event ids 2000…2099 are theirs and never change meaning.</summary>
internal static partial class RunLog
{
    [LoggerMessage(2000, LogLevel.Information, "Run {Run} is worked (attempt {Attempt}; {Done} of {Iterations} iterations are there).")]
    public static partial void Begun(ILogger log, string run, int attempt, int done, int iterations);

    [LoggerMessage(2001, LogLevel.Information, "Run {Run}: {Outcome}.")]
    public static partial void Ended(ILogger log, string run, string outcome);

    [LoggerMessage(2002, LogLevel.Error, "Run {Run} failed.")]
    public static partial void Failed(ILogger log, string run, Exception failure);

    [LoggerMessage(2003, LogLevel.Information, "{Count} runs of a process that is gone go on here.")]
    public static partial void Resumed(ILogger log, int count);

    [LoggerMessage(2004, LogLevel.Warning, "Run {Run} cannot succeed: {Reason}")]
    public static partial void CannotSucceed(ILogger log, string run, string reason);

    [LoggerMessage(2005, LogLevel.Error, "Looking for runs failed; the next look tries again.")]
    public static partial void LookedInVain(ILogger log, Exception failure);

    [LoggerMessage(2006, LogLevel.Warning, "No worker could be woken; it will look by itself.")]
    public static partial void NotWoken(ILogger log, Exception failure);

    [LoggerMessage(2010, LogLevel.Information, "The schedule of {Portfolio} made run {Run} for {Date}.")]
    public static partial void Due(ILogger log, string portfolio, string run, DateOnly date);

    [LoggerMessage(2011, LogLevel.Error, "The schedule of {Portfolio} could not be looked at; the next sweep tries again.")]
    public static partial void DueFailed(ILogger log, string portfolio, Exception failure);
}
