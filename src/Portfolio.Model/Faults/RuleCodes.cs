namespace Portfolio.Model.Faults;

/// <summary>
/// Codes of the faults that the rules of the model find; beside them <see cref="FaultCodes.NumberNotFinite"/> and
/// <see cref="FaultCodes.MoneyDecimals"/>. A code never changes meaning; a new meaning gets a new code.
/// </summary>
public static class RuleCodes
{
    // Identifiers, text, limits.
    public const string IdFormat = "id.format";
    public const string IdDuplicate = "id.duplicate";
    public const string IdReserved = "id.reserved";
    public const string TextLength = "text.length";
    public const string TextControl = "text.control";
    public const string LimitExceeded = "limit.exceeded";

    // References to things that are not there, or there twice.
    public const string CalendarUnknown = "calendar.unknown";
    public const string PoolUnknown = "pool.unknown";
    public const string DriverUnknown = "driver.unknown";
    public const string DriverRepeated = "driver.repeated";
    public const string ActivityUnknown = "activity.unknown";
    public const string ProjectUnknown = "project.unknown";
    public const string ProgrammeUnknown = "programme.unknown";

    // Plain values.
    public const string DateRange = "date.range";
    public const string DateRepeated = "date.repeated";
    public const string MoneyRange = "money.range";
    public const string MoneyNegative = "money.negative";
    public const string ProbabilityRange = "probability.range";
    public const string ProbabilitySum = "probability.sum";

    // Settings.
    public const string CurrencyUnknown = "currency.unknown";
    public const string TimeZoneUnknown = "time-zone.unknown";
    public const string FiscalYearStart = "fiscal-year.start";
    public const string ConfidenceRange = "confidence.range";
    public const string ConfidenceRepeated = "confidence.repeated";
    public const string SeedRange = "seed.range";
    public const string IterationsRange = "iterations.range";
    public const string CalendarNoWork = "calendar.no-working-day";
    public const string CapacityRange = "capacity.range";
    public const string CapacityOrder = "capacity.order";
    public const string DriverNoFactor = "driver.no-factor";

    // Dependence between projects and drivers.
    public const string DependenceRange = "dependence.range";
    public const string DependenceWithin = "dependence.within-below-between";
    public const string PairForm = "pair.form";
    public const string PairKinds = "pair.kinds";
    public const string PairSelf = "pair.self";
    public const string PairRepeated = "pair.repeated";
    public const string RankRange = "rank.range";

    // Projects.
    public const string PriorityRange = "priority.range";
    public const string CorrelationRange = "correlation.range";

    // Activities and their progress.
    public const string MilestoneWork = "milestone.work";
    public const string MilestoneStart = "milestone.start";
    public const string CommitmentPlace = "commitment.not-milestone";
    public const string DurationMissing = "duration.missing";
    public const string RemainingMissing = "remaining.missing";
    public const string RemainingNotStarted = "remaining.not-started";
    public const string RemainingFinished = "remaining.finished";
    public const string ActualStartMissing = "actual.start-missing";
    public const string ActualNotBeforeStatus = "actual.not-before-status";
    public const string ActualOrder = "actual.finish-before-start";

    // Links and demands.
    public const string LinkSelf = "link.self";
    public const string LinkRepeated = "link.repeated";
    public const string LinkCycle = "link.cycle";
    public const string LagRange = "lag.range";
    public const string UnitsRange = "units.range";
    public const string DemandRepeated = "demand.repeated";
    public const string DemandNeverFits = "demand.never-fits";

    // Risk events and chance branches.
    public const string ImpactEmpty = "impact.empty";
    public const string ImpactDelay = "impact.delay-without-activity";
    public const string ImpactTarget = "impact.target";
    public const string ResponseSeveralTaken = "response.several-taken";
    public const string ResponsePayer = "response.payer";
    public const string BranchActivityRepeated = "branch.activity-repeated";
    public const string BranchSeveralStarted = "branch.several-started";
    public const string BranchNoRest = "branch.no-rest";

    // Distributions.
    public const string DistributionOrder = "distribution.order";
    public const string DistributionNegative = "distribution.negative";
    public const string DistributionRange = "distribution.range";
    public const string DistributionPercentile = "distribution.percentile";
    public const string DistributionWeight = "distribution.weight";
    public const string DistributionSpread = "distribution.spread";
    public const string DistributionTruncation = "distribution.truncation";
    public const string DistributionPositive = "distribution.positive";
    public const string DistributionPoints = "distribution.points";
}
