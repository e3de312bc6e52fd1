using Portfolio.Model.Documents;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Tests.Rules.Tables;

internal static class BranchTable
{
    private const string Permit = "weir-lock/branches/permit";

    public static IEnumerable<RuleCase> Cases =>
    [
        Case(RuleCodes.ProbabilitySum, "/0/branches", Permit, [Fork("permit", (0.7, []), (0.2, ["A30"]))], [Fork("permit", (0.7, []), (0.3 + 9e-10, ["A30"]))]),
        Case(RuleCodes.ProbabilitySum, "/0/branches", Permit, [Fork("permit")], [Fork("permit", (1, ["A30"]))]),
        Case(RuleCodes.ProbabilityRange, "/0/branches/1/probability", Permit, [Fork("permit", (0.7, []), (1.3, []))], [Fork("permit", (0, []), (1, []))]),
        Case(RuleCodes.ActivityUnknown, "/0/branches/0/activities/0", Permit, [Fork("permit", (1, ["A99"]))]),
        Case(RuleCodes.BranchActivityRepeated, "/0/branches/1/activities/0", Permit, [Fork("permit", (0.5, ["A30"]), (0.5, ["A30"]))], [Fork("permit", (0.5, ["A20"]), (0.5, ["A30"]))]),
        Case(RuleCodes.BranchActivityRepeated, "/1/branches/0/activities/0", "weir-lock/branches/soil", [Fork("permit", (1, ["A30"])), Fork("soil", (1, ["A30"]))], [Fork("permit", (1, ["A30"])), Fork("soil", (1, ["A20"]))]),
        Case(RuleCodes.BranchNoRest, "", "weir-lock", [Fork("permit", (0.5, ["A10", "A20"]), (0.5, ["A30", "M1"]))], [Fork("permit", (0.5, ["A10", "A20"]), (0.5, ["A30"]))]),
        Case(RuleCodes.IdDuplicate, "/1/id", Permit, [Fork("permit", (1, [])), Fork("permit", (1, []))]),
        Case(RuleCodes.TextLength, "/0/name", Permit, [Fork("permit", (1, [])) with { Name = new('n', 201) }]),
        Case(RuleCodes.IdDuplicate, "/0/branches/1/id", Permit, [new("permit", null, [new("a", 0.5, []), new("a", 0.5, [])])]),
        new(RuleCodes.BranchSeveralStarted, "/projects/0/chanceBranches/0/branches/1", Permit, Started(true), Started(false)),
    ];

    private static ChanceBranches Fork(string id, params (double Probability, string[] Activities)[] branches) =>
        new(id, null, [.. branches.Select((b, i) => new Branch("b" + i, b.Probability, b.Activities))]);

    private static PortfolioDocument Started(bool both) => Sound.WithProject(p => p with
    {
        Activities = [p.Activities[0], p.Activities[1], both ? Sound.Work("A30") with { ActualStart = Sound.Day(1, 11), ActualFinish = Sound.Day(2, 11) } : p.Activities[2], p.Activities[3]],
        ChanceBranches = [Fork("permit", (0.5, ["A10"]), (0.5, ["A30"]))],
    });

    private static RuleCase Case(string code, string member, string subject, ChanceBranches[] broken, ChanceBranches[]? sound = null) =>
        new(code, "/projects/0/chanceBranches" + member, subject, Sound.WithProject(p => p with { ChanceBranches = broken }),
            Sound.WithProject(p => p with { ChanceBranches = sound ?? [] }));
}
