using System.ComponentModel;

namespace Portfolio.Model.Faults;

/// <summary>
/// Codes of the faults that the rules of the model find; beside them <see cref="FaultCodes.NumberNotFinite"/> and
/// <see cref="FaultCodes.MoneyDecimals"/>. A code never changes meaning; a new meaning gets a new code.
/// </summary>
public static class RuleCodes
{
    // Identifiers, text, limits.
    [Description("The id is not 1 to 64 letters, digits, dots, hyphens and underscores that begin with a letter or a digit.")]
    public const string IdFormat = "id.format";

    [Description("The id is used twice; the path is that of the second.")]
    public const string IdDuplicate = "id.duplicate";

    [Description("The id belongs to something that always exists.")]
    public const string IdReserved = "id.reserved";

    [Description("The text is too long.")]
    public const string TextLength = "text.length";

    [Description("The text holds a control character, such as a line break or a tab.")]
    public const string TextControl = "text.control";

    [Description("There are more entries than are allowed; the message names the limit.")]
    public const string LimitExceeded = "limit.exceeded";

    // References to things that are not there, or there twice.
    [Description("There is no such calendar in the settings.")]
    public const string CalendarUnknown = "calendar.unknown";

    [Description("There is no such pool in the settings.")]
    public const string PoolUnknown = "pool.unknown";

    [Description("There is no such driver in the settings.")]
    public const string DriverUnknown = "driver.unknown";

    [Description("The driver is listed twice; a driver acts once.")]
    public const string DriverRepeated = "driver.repeated";

    [Description("There is no such activity in the project.")]
    public const string ActivityUnknown = "activity.unknown";

    [Description("There is no such project.")]
    public const string ProjectUnknown = "project.unknown";

    [Description("No project belongs to this programme.")]
    public const string ProgrammeUnknown = "programme.unknown";

    // Plain values.
    [Description("The date lies outside the years 1970 to 2199.")]
    public const string DateRange = "date.range";

    [Description("The date is listed twice.")]
    public const string DateRepeated = "date.repeated";

    [Description("The amount is larger than any that can be stated.")]
    public const string MoneyRange = "money.range";

    [Description("The amount must not be negative.")]
    public const string MoneyNegative = "money.negative";

    [Description("A probability must lie between 0 and 1.")]
    public const string ProbabilityRange = "probability.range";

    [Description("The probabilities of all outcomes or branches must add up to 1.")]
    public const string ProbabilitySum = "probability.sum";

    // Settings.
    [Description("The text is not an ISO 4217 code of a currency with a minor unit.")]
    public const string CurrencyUnknown = "currency.unknown";

    [Description("The text is not an IANA time zone.")]
    public const string TimeZoneUnknown = "time-zone.unknown";

    [Description("The fiscal year cannot start on a day that not every year has.")]
    public const string FiscalYearStart = "fiscal-year.start";

    [Description("A confidence level must be above 0 and below 100.")]
    public const string ConfidenceRange = "confidence.range";

    [Description("The confidence level is listed twice.")]
    public const string ConfidenceRepeated = "confidence.repeated";

    [Description("The seed is negative or too large.")]
    public const string SeedRange = "seed.range";

    [Description("The number of iterations is out of range; the message names the range.")]
    public const string IterationsRange = "iterations.range";

    [Description("The calendar has no working day, so work on it would never end.")]
    public const string CalendarNoWork = "calendar.no-working-day";

    [Description("The capacity of a pool is negative or too large.")]
    public const string CapacityRange = "capacity.range";

    [Description("Changes of capacity must be listed by date, one a day.")]
    public const string CapacityOrder = "capacity.order";

    [Description("The driver has neither a duration factor nor a cost factor, so it would do nothing.")]
    public const string DriverNoFactor = "driver.no-factor";

    // Dependence between projects and drivers.
    [Description("The correlation between projects is out of range.")]
    public const string DependenceRange = "dependence.range";

    [Description("The correlation within a programme is below the one between any projects; it must be at least as high.")]
    public const string DependenceWithin = "dependence.within-below-between";

    [Description("The text names nothing that can be paired: driver/…, project/…, programme/… or portfolio.")]
    public const string PairForm = "pair.form";

    [Description("These two kinds cannot be paired: only drivers and projects can, and a driver with the portfolio or a programme.")]
    public const string PairKinds = "pair.kinds";

    [Description("A node is paired with itself.")]
    public const string PairSelf = "pair.self";

    [Description("The same two nodes are paired twice.")]
    public const string PairRepeated = "pair.repeated";

    [Description("A rank correlation must lie between -1 and 1.")]
    public const string RankRange = "rank.range";

    // Projects.
    [Description("A priority must be 1 or more; 1 is the first.")]
    public const string PriorityRange = "priority.range";

    [Description("The correlation within a project is out of range.")]
    public const string CorrelationRange = "correlation.range";

    // Activities and their progress.
    [Description("A milestone cannot have a duration, a cost, demands or anything else that belongs to work.")]
    public const string MilestoneWork = "milestone.work";

    [Description("A milestone has no start, only an actual finish.")]
    public const string MilestoneStart = "milestone.start";

    [Description("Only a milestone can carry a commitment.")]
    public const string CommitmentPlace = "commitment.not-milestone";

    [Description("Work that is not finished needs a duration.")]
    public const string DurationMissing = "duration.missing";

    [Description("Work that has started and is not finished must say how much is remaining.")]
    public const string RemainingMissing = "remaining.missing";

    [Description("Work that has not started cannot have remaining work; before the start only the duration counts.")]
    public const string RemainingNotStarted = "remaining.not-started";

    [Description("Finished work cannot have remaining work.")]
    public const string RemainingFinished = "remaining.finished";

    [Description("Finished work must also say when it started.")]
    public const string ActualStartMissing = "actual.start-missing";

    [Description("The actual date is not before the status date; progress is reported up to the beginning of that day.")]
    public const string ActualNotBeforeStatus = "actual.not-before-status";

    [Description("The activity finishes before it starts.")]
    public const string ActualOrder = "actual.finish-before-start";

    // Links and demands.
    [Description("The activity is linked to itself.")]
    public const string LinkSelf = "link.self";

    [Description("The same link stands twice, with the same type and lag.")]
    public const string LinkRepeated = "link.repeated";

    [Description("The links run in a circle, so that nothing on it could start; the message names it.")]
    public const string LinkCycle = "link.cycle";

    [Description("The lag is out of range.")]
    public const string LagRange = "lag.range";

    [Description("The units drawn from a pool must be more than 0, and not more than any pool could hold.")]
    public const string UnitsRange = "units.range";

    [Description("The activity draws on one pool twice; add the units up.")]
    public const string DemandRepeated = "demand.repeated";

    [Description("The activity needs more of a pool than it has in the end, so it could never start.")]
    public const string DemandNeverFits = "demand.never-fits";

    // Risk events and chance branches.
    [Description("The impact has neither a delay nor a cost, so it would do nothing.")]
    public const string ImpactEmpty = "impact.empty";

    [Description("A delay needs an activity that it delays; a project as a whole can only bear a cost.")]
    public const string ImpactDelay = "impact.delay-without-activity";

    [Description("The impact does not name one thing that the event can act on.")]
    public const string ImpactTarget = "impact.target";

    [Description("More than one response to an event is taken.")]
    public const string ResponseSeveralTaken = "response.several-taken";

    [Description("Who pays for the response is missing, or named where only the project can pay.")]
    public const string ResponsePayer = "response.payer";

    [Description("The activity is on more than one branch.")]
    public const string BranchActivityRepeated = "branch.activity-repeated";

    [Description("Work has started on two branches of one fork; exactly one can happen.")]
    public const string BranchSeveralStarted = "branch.several-started";

    [Description("Every activity of the project is on a branch; at least one must happen in any case.")]
    public const string BranchNoRest = "branch.no-rest";

    // Distributions.
    [Description("The values of the distribution are not in order from low to high.")]
    public const string DistributionOrder = "distribution.order";

    [Description("The distribution reaches below 0, which this quantity cannot.")]
    public const string DistributionNegative = "distribution.negative";

    [Description("The distribution reaches values so large that they are taken for a slip.")]
    public const string DistributionRange = "distribution.range";

    [Description("The percentiles at which low and high are stated are not in order or out of range.")]
    public const string DistributionPercentile = "distribution.percentile";

    [Description("The weight of the mode is out of range.")]
    public const string DistributionWeight = "distribution.weight";

    [Description("The standard deviation is negative.")]
    public const string DistributionSpread = "distribution.spread";

    [Description("The limits at which the distribution is cut off are not in order, or leave nothing of it.")]
    public const string DistributionTruncation = "distribution.truncation";

    [Description("The mean or the low value of a lognormal distribution must be above 0.")]
    public const string DistributionPositive = "distribution.positive";

    [Description("The points or outcomes are too few, or their percentages do not rise from 0 to 100.")]
    public const string DistributionPoints = "distribution.points";
}
