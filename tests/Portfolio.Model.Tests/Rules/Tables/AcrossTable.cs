using Portfolio.Model.Documents;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Tests.Rules.Tables;

internal static class AcrossTable
{
    private static readonly Project Empty = new() { Id = "pier", StatusDate = Sound.Status };

    public static IEnumerable<RuleCase> Cases =>
    [
        new(RuleCodes.IdDuplicate, "/projects/2/id", "quay", Plus(Empty with { Id = "quay" }), Plus(Empty with { Id = "Quay" })),
        new(RuleCodes.LimitExceeded, "/projects", "projects", Many(501), Many(500)),
        new(RuleCodes.ProgrammeUnknown, "/settings/commitments/programmes/roads", "programme/roads", Promise("roads"), Promise("harbour")),
        new(RuleCodes.ActivityUnknown, "/projects/1/activities/0/predecessors/0", "quay/B10", Link("weir-lock/A99"), Link("weir-lock/M1")),
        new(RuleCodes.ProjectUnknown, "/projects/1/activities/0/predecessors/0", "quay/B10", Link("pier/A10"), Link("weir-lock/A20")),
        new(RuleCodes.ActivityUnknown, "/projects/1/activities/0/predecessors/0", "quay/B10", Link("weir-lock/A10/x")),
        new(RuleCodes.LinkCycle, "/projects/0/activities/0/predecessors/0", "weir-lock/A10",
            Sound.WithActivity(0, a => a with { Predecessors = [new("quay/B20")] }),
            Sound.Document with { Projects = [Sound.WeirLock with { ChanceBranches = [] }, Sound.Quay] }),
    ];

    private static PortfolioDocument Plus(Project project) => Sound.Document with { Projects = [.. Sound.Document.Projects, project] };

    private static PortfolioDocument Many(int count) => Sound.Document with
    {
        Projects = [.. Sound.Document.Projects, .. Enumerable.Range(2, count - 2).Select(i => Empty with { Id = "p" + i })],
    };

    private static PortfolioDocument Promise(string programme) =>
        Sound.With(s => s with { ProgrammeCommitments = new Dictionary<string, Commitments> { [programme] = new(null, 5) } });

    private static PortfolioDocument Link(string predecessor) => Sound.Document with
    {
        Projects = [Sound.WeirLock, Sound.Quay with { Activities = [Sound.Work("B10", predecessor), Sound.Work("B20", "B10")] }],
    };
}
