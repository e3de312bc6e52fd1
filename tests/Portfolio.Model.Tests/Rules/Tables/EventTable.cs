using Portfolio.Model.Distributions;
using Portfolio.Model.Documents;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Tests.Rules.Tables;

internal static class EventTable
{
    private static readonly Distribution Five = new Constant(5);

    public static IEnumerable<RuleCase> Cases => [.. OfProject, .. OfSettings];

    private static IEnumerable<RuleCase> OfProject =>
    [
        new(RuleCodes.IdDuplicate,
            "/projects/0/riskEvents/1/id", "weir-lock/event/flood", Sound.WithProject(p => p with { RiskEvents = [.. p.RiskEvents, p.RiskEvents[0]] })),
        Flood(RuleCodes.TextLength, "/name", e => e with { Name = new('n', 201) }),
        Flood(RuleCodes.ProbabilityRange, "/probability", e => e with { Probability = 1.5 }, e => e with { Probability = double.NaN }),
        Flood(FaultCodes.NumberNotFinite, "/probability", e => e with { Probability = double.PositiveInfinity }),
        Flood(RuleCodes.ImpactEmpty, "/impacts/0", Impacts(new Impact("A20", null, null, null)), Impacts()),
        Flood(RuleCodes.ImpactDelay, "/impacts/0/delay", Impacts(new Impact(null, null, Five, null)), Impacts(new Impact("M1", null, Five, null))),
        Flood(RuleCodes.ImpactTarget, "/impacts/0/project", Impacts(new Impact(null, "quay", null, Five))),
        Flood(RuleCodes.ActivityUnknown, "/impacts/0/activity", Impacts(new Impact("B10", null, Five, null))),
        Flood(RuleCodes.DistributionNegative, "/impacts/0/delay", Impacts(new Impact("A20", null, new Uniform(-1, 3), null))),
        Flood(RuleCodes.DistributionRange, "/impacts/0/cost", Impacts(new Impact(null, null, null, new Constant(-2e13))), Impacts(new Impact(null, null, null, new Constant(-1e13)))),
        Flood(RuleCodes.IdDuplicate, "/responses/1/id", Responses(new() { Id = "dam" }, new() { Id = "dam" }), Responses(new() { Id = "dam" }, new() { Id = "Dam" })),
        Flood(RuleCodes.ResponseSeveralTaken, "/responses/1/taken", Responses(new() { Id = "a", Taken = true }, new() { Id = "b", Taken = true }), Responses(new() { Id = "a" }, new() { Id = "b", Taken = true })),
        Flood(RuleCodes.ResponsePayer, "/responses/0/project", Responses(new Response { Id = "a", Project = "weir-lock" })),
        Flood(FaultCodes.MoneyDecimals, "/responses/0/cost", Responses(new Response { Id = "a", Cost = 0.001m }), Responses(new Response { Id = "a", Cost = -0.01m })),
        Flood(RuleCodes.ProbabilityRange, "/responses/0/probability", Responses(new Response { Id = "a", Probability = -1 })),
        Flood(RuleCodes.TextControl, "/responses/0/name", Responses(new Response { Id = "a", Name = "\u0000" })),
        Flood(RuleCodes.ImpactEmpty, "/responses/0/impacts/0", Responses(new Response { Id = "a", Impacts = [new("A20", null, null, null)] })),
    ];

    private static IEnumerable<RuleCase> OfSettings =>
    [
        new(RuleCodes.IdDuplicate,
            "/settings/riskEvents/1/id", "event/storm", Sound.With(s => s with { RiskEvents = [.. s.RiskEvents, s.RiskEvents[0]] })),
        Storm(RuleCodes.ImpactTarget, "/impacts/0", Impacts(new Impact(null, null, null, Five)), Impacts(new Impact(null, "weir-lock", null, Five))),
        Storm(RuleCodes.ImpactTarget, "/impacts/0", Impacts(new Impact("weir-lock/A20", "weir-lock", null, Five))),
        Storm(RuleCodes.ImpactTarget, "/impacts/0/activity", Impacts(new Impact("A20", null, Five, null)), Impacts(new Impact("quay/B20", null, Five, Five))),
        Storm(RuleCodes.ImpactDelay, "/impacts/0/delay", Impacts(new Impact(null, "quay", Five, null))),
        Storm(RuleCodes.ActivityUnknown, "/impacts/0/activity", Impacts(new Impact("quay/A20", null, Five, null))),
        Storm(RuleCodes.ProjectUnknown, "/impacts/0/activity", Impacts(new Impact("pier/A20", null, Five, null))),
        Storm(RuleCodes.ProjectUnknown, "/impacts/0/project", Impacts(new Impact(null, "pier", null, Five))),
        Storm(RuleCodes.ResponsePayer, "/responses/0", Responses(new Response { Id = "a" })),
        Storm(RuleCodes.ProjectUnknown, "/responses/0/project", Responses(new Response { Id = "a", Project = "pier" }), Responses(new Response { Id = "a", Project = "quay" })),
        Storm(RuleCodes.ActivityUnknown, "/responses/0/impacts/0/activity", Responses(new Response { Id = "a", Project = "quay", Impacts = [new("quay/B99", null, Five, null)] })),
    ];

    private static Func<RiskEvent, RiskEvent> Impacts(params Impact[] impacts) => e => e with { Impacts = impacts };

    private static Func<RiskEvent, RiskEvent> Responses(params Response[] responses) => e => e with { Responses = responses };

    private static RuleCase Flood(string code, string member, Func<RiskEvent, RiskEvent> broken, Func<RiskEvent, RiskEvent>? sound = null) =>
        new(code, "/projects/0/riskEvents/0" + member, "weir-lock/event/flood", Sound.WithProject(p => p with { RiskEvents = [broken(p.RiskEvents[0])] }),
            Sound.WithProject(p => p with { RiskEvents = [(sound ?? (e => e))(p.RiskEvents[0])] }));

    private static RuleCase Storm(string code, string member, Func<RiskEvent, RiskEvent> broken, Func<RiskEvent, RiskEvent>? sound = null) =>
        new(code, "/settings/riskEvents/0" + member, "event/storm", Sound.With(s => s with { RiskEvents = [broken(s.RiskEvents[0])] }),
            Sound.With(s => s with { RiskEvents = [(sound ?? (e => e))(s.RiskEvents[0])] }));
}
