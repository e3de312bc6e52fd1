using Portfolio.Model.Documents;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Tests.Rules.Tables;

internal static class LinkTable
{
    public static IEnumerable<RuleCase> Cases =>
    [
        Case(RuleCodes.ActivityUnknown, "/1", [new("A10"), new("A99")], [new("A10"), new("")]),
        Case(RuleCodes.ActivityUnknown, "/0", [new("weir-lock/B10")], [new("weir-lock/A10")]),
        Case(RuleCodes.ActivityUnknown, "/0", [new("quay/B99")], [new("A10")]),
        Case(RuleCodes.ProjectUnknown, "/0", [new("pier/A10")]),
        Case(RuleCodes.LinkSelf, "/0", [new("A20")]),
        Case(RuleCodes.LinkSelf, "/0", [new("weir-lock/A20", LinkType.StartToStart)]),
        Case(RuleCodes.LinkRepeated, "/1", [new("A10"), new("A10")], [new("A10"), new("A10", LinkType.StartToStart), new("A10", Lag: 1)]),
        Case(RuleCodes.LinkRepeated, "/1", [new("A10", Lag: 2), new("weir-lock/A10", Lag: 2)]),
        Case(RuleCodes.LagRange, "/0/lag", [new("A10", Lag: 100_001)], [new("A10", Lag: 100_000)]),
        Case(RuleCodes.LagRange, "/0/lag", [new("A10", Lag: -100_001)], [new("A10", Lag: double.NaN)]),
        Case(FaultCodes.NumberNotFinite, "/0/lag", [new("A10", Lag: double.NegativeInfinity)]),
        Case(RuleCodes.LinkCycle, "/0", [new("A30")], [new("A10")]),
    ];

    private static RuleCase Case(string code, string entry, Link[] broken, Link[]? sound = null) =>
        new(code, "/projects/0/activities/1/predecessors" + entry, "weir-lock/A20",
            Sound.WithActivity(1, a => a with { Predecessors = broken }), Sound.WithActivity(1, a => a with { Predecessors = sound ?? [] }));
}
