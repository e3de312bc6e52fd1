using Portfolio.Model.Distributions;
using Portfolio.Model.Documents;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Tests.Rules.Tables;

internal static class ProgressTable
{
    private static readonly DateOnly October = Sound.Day(5, 10);
    private static readonly DateOnly November = Sound.Day(5, 11);

    public static IEnumerable<RuleCase> Cases =>
    [
        Milestone(RuleCodes.MilestoneWork, "/duration", a => a with { Duration = new Constant(0) }),
        Milestone(RuleCodes.MilestoneWork, "/cost", a => a with { Cost = new(null, null, 5) }),
        Milestone(RuleCodes.MilestoneWork, "/demands", a => a with { Demands = [new("rig", 1)] }, a => a with { Drivers = ["ground"] }),
        Milestone(RuleCodes.MilestoneWork, "/remaining", a => a with { Remaining = new Constant(1) }),
        Milestone(RuleCodes.MilestoneStart, "/actualStart", a => a with { ActualStart = October, ActualFinish = October }, a => a with { ActualFinish = October }),
        Milestone(RuleCodes.DateRange, "/commitment", a => a with { Commitment = new(2200, 1, 1) }, a => a with { Commitment = null }),
        Milestone(RuleCodes.ActualNotBeforeStatus, "/actualFinish", a => a with { ActualFinish = Sound.Status }, a => a with { ActualFinish = Sound.Status.AddDays(-1) }),
        Work(RuleCodes.CommitmentPlace, "/commitment", a => a with { Commitment = new(2027, 1, 1) }, a => a with { Milestone = true, Duration = null, Cost = null, Demands = [], Commitment = new(2027, 1, 1) }),
        Work(RuleCodes.DurationMissing, "", a => a with { Duration = null }, a => a with { Duration = null, ActualStart = October, ActualFinish = November }),
        Work(RuleCodes.DateRange, "/earliestStart", a => a with { EarliestStart = new(1969, 1, 1) }, a => a with { EarliestStart = new(2030, 1, 1) }),
        Work(RuleCodes.RemainingMissing, "", a => a with { ActualStart = November }, a => a with { ActualStart = November, Remaining = new Constant(0) }),
        Work(RuleCodes.RemainingNotStarted, "/remaining", a => a with { Remaining = new Constant(3) }),
        Work(RuleCodes.RemainingFinished, "/remaining", a => a with { ActualStart = October, ActualFinish = November, Remaining = new Constant(0) }),
        Work(RuleCodes.ActualStartMissing, "", a => a with { ActualFinish = November }, a => a with { ActualStart = November, ActualFinish = November }),
        Work(RuleCodes.ActualOrder, "/actualFinish", a => a with { ActualStart = November, ActualFinish = October }, a => a with { ActualStart = November, ActualFinish = DateOnly.MinValue }),
        Work(RuleCodes.ActualNotBeforeStatus, "/actualStart", a => a with { ActualStart = Sound.Status, Remaining = new Constant(3) }),
        Work(RuleCodes.DateRange, "/actualStart", a => a with { ActualStart = new(1969, 12, 31), Remaining = new Constant(3) }),
        Work(RuleCodes.DistributionNegative, "/cost/fixed", a => a with { Cost = new(new Constant(-1), null, 0) }, a => a with { Cost = new(null, null, 0) }),
        Work(RuleCodes.DistributionRange, "/cost/perDay", a => a with { Cost = new(null, new Constant(1.1e13), 0) }, a => a with { Cost = new(null, new Constant(1e13), 0) }),
        Work(RuleCodes.MoneyNegative, "/cost/actual", a => a with { Cost = new(null, null, -1) }, a => a with { Cost = new(null, null, 1.25m) }),
        Work(FaultCodes.MoneyDecimals, "/cost/actual", a => a with { Cost = new(null, null, 0.125m) }),
        new(RuleCodes.DistributionOrder,
            "/projects/0/activities/0/remaining", "weir-lock/A10", Sound.WithActivity(0, a => a with { Remaining = new Uniform(3, 2) }),
            Sound.WithActivity(0, a => a with { Remaining = Unreadable.Instance })),
        Work(RuleCodes.UnitsRange, "/demands/0/units", a => a with { Demands = [new("rig", 0)] }, a => a with { Demands = [new("rig", 0.5)] }),
        Work(FaultCodes.NumberNotFinite, "/demands/0/units", a => a with { Demands = [new("rig", double.PositiveInfinity)] }, a => a with { Demands = [new("rig", double.NaN)] }),
        Work(RuleCodes.PoolUnknown, "/demands/0/pool", a => a with { Demands = [new("crane", 1)] }, a => a with { Demands = [new("", 1)] }),
        Work(RuleCodes.DemandRepeated, "/demands/1/pool", a => a with { Demands = [new("rig", 1), new("rig", 1)] }),
        Work(RuleCodes.DemandNeverFits, "/demands/0/units", a => a with { Demands = [new("rig", 2.5)] },
            a => a with { Demands = [new("rig", 3)], ActualStart = October, ActualFinish = November }),
    ];

    private static RuleCase Work(string code, string member, Func<Activity, Activity> broken, Func<Activity, Activity>? sound = null) =>
        new(code, "/projects/0/activities/1" + member, "weir-lock/A20", Sound.WithActivity(1, broken), Sound.WithActivity(1, sound ?? (a => a)));

    private static RuleCase Milestone(string code, string member, Func<Activity, Activity> broken, Func<Activity, Activity>? sound = null) =>
        new(code, "/projects/0/activities/3" + member, "weir-lock/M1", Sound.WithActivity(3, broken), Sound.WithActivity(3, sound ?? (a => a)));
}
