using Portfolio.Model.Documents;
using Portfolio.Model.Faults;
using Portfolio.Model.Rules;

namespace Portfolio.Model.Tests.Rules.Tables;

internal static class DependenceTable
{
    public static IEnumerable<RuleCase> Cases =>
    [
        Case(RuleCodes.DependenceRange, "/betweenProjects", d => d with { BetweenProjects = 0.995, WithinProgramme = null }, d => d with { BetweenProjects = 0.99, WithinProgramme = null }),
        Case(RuleCodes.DependenceRange, "/betweenProjects", d => d with { BetweenProjects = -0.1 }, d => d with { BetweenProjects = 0 }),
        Case(RuleCodes.DependenceRange, "/withinProgramme", d => d with { WithinProgramme = 1 }, d => d with { WithinProgramme = 0.99 }),
        Case(RuleCodes.DependenceWithin, "/withinProgramme", d => d with { WithinProgramme = 0.05 }, d => d with { WithinProgramme = 0.1 }),
        Pair(RuleCodes.RankRange, "/0/rank", [new("driver/ground", "project/quay", 1.1)], [new("driver/ground", "project/quay", -1)]),
        Pair(FaultCodes.NumberNotFinite, "/0/rank", [new("driver/ground", "project/quay", double.NegativeInfinity)]),
        Pair(RuleCodes.PairForm, "/0/between/1", [new("driver/ground", "quay", 0.1)], [new("", "", double.NaN)]),
        Pair(RuleCodes.PairForm, "/0/between/0", [new("milestone/weir-lock/M1", "driver/ground", 0.1)], [new("portfolio", "driver/ground", 0.1)]),
        Pair(RuleCodes.DriverUnknown, "/0/between/0", [new("driver/sky", "project/quay", 0.1)], [new("project/weir-lock", "project/quay", 0.1)]),
        Pair(RuleCodes.ProjectUnknown, "/0/between/1", [new("driver/ground", "project/pier", 0.1)]),
        Pair(RuleCodes.ProgrammeUnknown, "/0/between/1", [new("driver/ground", "programme/roads", 0.1)], [new("driver/ground", "programme/locks", 0.1)]),
        Pair(RuleCodes.PairSelf, "/0", [new("project/quay", "project/quay", 0.1)]),
        Pair(RuleCodes.PairKinds, "/0", [new("project/quay", "programme/locks", 0.1)], [new("programme/locks", "driver/prices", 0.1)]),
        Pair(RuleCodes.PairKinds, "/0", [new("portfolio", "programme/locks", 0.1)], [new("driver/prices", "driver/ground", 0.1)]),
        Pair(RuleCodes.PairRepeated, "/1", [new("project/quay", "driver/ground", 0.1), new("driver/ground", "project/quay", 0.2)],
            [new("project/quay", "driver/ground", 0.1), new("driver/prices", "project/quay", 0.2)]),
        new(RuleCodes.LimitExceeded, "/settings/dependence/pairs", SettingsRules.Subject, ManyNodes(501), ManyNodes(500)),
    ];

    private static PortfolioDocument ManyNodes(int count) => Sound.With(s => s with
    {
        Drivers = [.. s.Drivers, .. Enumerable.Range(2, count - 2).Select(i => s.Drivers[0] with { Id = "d" + i })],
        Dependence = new()
        {
            Pairs =
            [
                new("driver/ground", "driver/prices", 0.1), .. Enumerable.Range(2, count - 2).Select(i => new RankPair("driver/ground", "driver/d" + i, 0)),
            ],
        },
    });

    private static RuleCase Pair(string code, string member, RankPair[] broken, RankPair[]? sound = null) =>
        Case(code, "/pairs" + member, d => d with { Pairs = broken }, d => d with { Pairs = sound ?? d.Pairs });

    private static RuleCase Case(string code, string member, Func<Dependence, Dependence> broken, Func<Dependence, Dependence> sound) =>
        new(code, "/settings/dependence" + member, SettingsRules.Subject,
            Sound.With(s => s with { Dependence = broken(s.Dependence) }), Sound.With(s => s with { Dependence = sound(s.Dependence) }));
}
