using Portfolio.Model.Documents;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules.WithinProject;

/// <summary>Chance branches: probabilities, and which activities happen on which branch.</summary>
internal static class ChanceBranchRule
{
    public static IEnumerable<Fault> Check(PlacedProject placed)
    {
        var forks = placed.Project.ChanceBranches;
        if (forks.Count == 0) yield break;
        Place Of(int f) => placed.Here.Under("chanceBranches", f).About($"{placed.Here.Subject}/branches/", forks[f].Id, f);

        foreach (var fault in Ids.Check(forks, f => f.Id, "fork", Of)) yield return fault;
        var branchOf = new Dictionary<string, string>(StringComparer.Ordinal);
        for (var f = 0; f < forks.Count; f++)
        {
            var (fork, at) = (forks[f], Of(f));
            if (TextRule.Name(fork.Name, "name", () => at.Under("name")) is { } name) yield return name;
            foreach (var fault in Ids.Check(fork.Branches, b => b.Id, "branch", b => at.Under("branches", b))) yield return fault;
            foreach (var fault in Probabilities(fork, at)) yield return fault;
            foreach (var fault in Activities(fork, at, branchOf, placed)) yield return fault;
            foreach (var fault in Started(fork, at, placed)) yield return fault;
        }

        if (placed.Project.Activities.Count > 0 && placed.Project.Activities.All(a => a.Id is not null && branchOf.ContainsKey(a.Id)))
            yield return placed.Here.Under("chanceBranches").Fault(
                RuleCodes.BranchNoRest, "Every activity of the project is on a branch; at least one must happen in any case.");
    }

    private static IEnumerable<Fault> Probabilities(ChanceBranches fork, Place at)
    {
        var sound = true;
        for (var b = 0; b < fork.Branches.Count; b++)
        {
            var (branch, place) = (fork.Branches[b], at.Under("branches", b).Under("probability"));
            if (ValueRule.Probability(branch.Probability, $"the branch {branch.Id}", () => place) is not { } fault) continue;
            sound = false;
            yield return fault;
        }

        var sum = fork.Branches.Sum(b => b.Probability);
        if (sound && Math.Abs(sum - 1) > Bounds.ProbabilityTolerance)
            yield return at.Under("branches").Fault(RuleCodes.ProbabilitySum,
                $"The probabilities of the branches add up to {sum}; they must add up to 1.");
    }

    private static IEnumerable<Fault> Activities(ChanceBranches fork, Place at, Dictionary<string, string> branchOf, PlacedProject placed)
    {
        for (var b = 0; b < fork.Branches.Count; b++)
            for (var k = 0; k < fork.Branches[b].Activities.Count; k++)
            {
                if (fork.Branches[b].Activities[k] is not { } id) continue;
                var place = at.Under("branches", b).Under("activities", k);
                if (!placed.Has(id))
                    yield return place.Fault(RuleCodes.ActivityUnknown, $"{TextRule.Shown(id)} is no activity of {placed.Project.Id}.");
                else if (!branchOf.TryAdd(id, $"{fork.Id}/{fork.Branches[b].Id}"))
                    yield return place.Fault(
                        RuleCodes.BranchActivityRepeated, $"{id} is on the branch {branchOf[id]} already; an activity can be "
                        + "on one branch at most.");
            }
    }

    private static IEnumerable<Fault> Started(ChanceBranches fork, Place at, PlacedProject placed)
    {
        string? first = null;
        for (var b = 0; b < fork.Branches.Count; b++)
        {
            if (fork.Branches[b].Activities.FirstOrDefault(id => IsStarted(id, placed)) is not { } started) continue;
            if (first is not null)
                yield return at.Under("branches", b).Fault(
                    RuleCodes.BranchSeveralStarted, $"Work has started on two branches of one fork ({first} and {started}); "
                    + "exactly one branch can happen.");
            first ??= started;
        }
    }

    private static bool IsStarted(string? id, PlacedProject placed) =>
        id is not null && placed.Outline.Find(id) is >= 0 and var i && placed.Project.Activities[i].Started;
}
