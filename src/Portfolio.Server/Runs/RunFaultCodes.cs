namespace Portfolio.Server.Runs;

/// <summary>Codes of faults in what runs and schedules are asked for with. A code never changes meaning.</summary>
internal static class RunFaultCodes
{
    public const string OutOfRange = "number.range";
    public const string DateInFuture = "date.future";
    public const string RevisionUnknown = "revision.unknown";
    public const string RecordedSeed = "run.recorded-seed";
    public const string ReplacesUnknown = "run.replaces-unknown";
    public const string ReplacesUnrecorded = "run.replaces-unrecorded";
    public const string NothingToRun = "run.nothing";
    public const string CronFormat = "cron.format";
}
