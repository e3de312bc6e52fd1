using System.ComponentModel;

namespace Portfolio.Server.Runs;

/// <summary>Codes of faults in what runs and schedules are asked for with. A code never changes meaning.</summary>
internal static class RunFaultCodes
{
    [Description("The number or date is out of range; the message names the range.")]
    public const string OutOfRange = "number.range";

    [Description("The date lies in the future of the portfolio's time zone.")]
    public const string DateInFuture = "date.future";

    [Description("The portfolio has no such revision.")]
    public const string RevisionUnknown = "revision.unknown";

    [Description("A recorded run takes the seed of the settings; another can be asked for with a run that is not recorded.")]
    public const string RecordedSeed = "run.recorded-seed";

    [Description("'replaces' does not name a recorded run of the same date.")]
    public const string ReplacesUnknown = "run.replaces-unknown";

    [Description("Only a recorded run can replace another.")]
    public const string ReplacesUnrecorded = "run.replaces-unrecorded";

    [Description("The revision holds no activity whose finish could be forecast.")]
    public const string NothingToRun = "run.nothing";

    [Description("The text is not a cron expression of five fields that names a time which comes.")]
    public const string CronFormat = "cron.format";
}
