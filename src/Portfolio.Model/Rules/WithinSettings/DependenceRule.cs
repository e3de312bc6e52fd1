using Portfolio.Model.Documents;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules.WithinSettings;

/// <summary>
/// Correlations between projects and the form of pairs. Whether projects and programmes exist is a rule across parts; whether the
/// correlations contradict each other is a numerical question and the engine's.
/// </summary>
internal static class DependenceRule
{
    public static IEnumerable<Fault> Check(Settings settings, Place settingsAt, ModelLimits limits)
    {
        var dependence = settings.Dependence;
        var at = settingsAt.Under("dependence");
        var (between, within) = (dependence.BetweenProjects, dependence.WithinProgramme);
        var betweenFault = Background(between, "correlation between projects", () => at.Under("betweenProjects"));
        if (betweenFault is not null) yield return betweenFault;
        if (within is { } stated)
        {
            if (Background(stated, "correlation within a programme", () => at.Under("withinProgramme")) is { } range) yield return range;
            else if (betweenFault is null && stated < between)
                yield return at.Under("withinProgramme").Fault(RuleCodes.DependenceWithin,
                    $"The correlation within a programme is {stated}, below the {between} between any projects; it must be at "
                    + "least as high.");
        }

        foreach (var fault in Pairs(settings, at, limits)) yield return fault;
    }

    private static IEnumerable<Fault> Pairs(Settings settings, Place at, ModelLimits limits)
    {
        var pairs = settings.Dependence.Pairs;
        var nodes = new HashSet<PairNode>();
        var seen = new Dictionary<(PairNode, PairNode), int>();
        var drivers = settings.Drivers.Select(d => d.Id).ToHashSet(StringComparer.Ordinal);
        for (var i = 0; i < pairs.Count; i++)
        {
            var place = at.Under("pairs", i);
            if (ValueRule.Within(pairs[i].Rank, -1, 1, "rank correlation", RuleCodes.RankRange, () => place.Under("rank")) is { } rank)
                yield return rank;
            foreach (var fault in NodeFaults(pairs[i], drivers, place)) yield return fault;
            if (PairNode.Parse(pairs[i].First) is not { } first || PairNode.Parse(pairs[i].Second) is not { } second) continue;
            nodes.Add(first);
            nodes.Add(second);
            var pair = string.CompareOrdinal(pairs[i].First, pairs[i].Second) <= 0 ? (first, second) : (second, first);
            if (Together(pairs[i], first, second, place) is { } together) yield return together;
            else if (!seen.TryAdd(pair, i))
                yield return place.Fault(RuleCodes.PairRepeated,
                    $"{pairs[i].First} and {pairs[i].Second} are paired twice: pair {seen[pair] + 1} in the list ties them already.");
        }

        if (nodes.Count > limits.PairedNodes)
            yield return at.Under("pairs").Fault(
                RuleCodes.LimitExceeded, $"The pairs name {nodes.Count} different nodes; at most {limits.PairedNodes} are allowed.");
    }

    private static IEnumerable<Fault> NodeFaults(RankPair pair, HashSet<string> drivers, Place at)
    {
        if (string.IsNullOrEmpty(pair.First) && string.IsNullOrEmpty(pair.Second)) yield break;
        foreach (var (side, text) in new[] { pair.First, pair.Second }.Index())
        {
            if (PairNode.Parse(text) is not { } node)
                yield return at.Under("between", side).Fault(RuleCodes.PairForm,
                    $"\"{TextRule.Shown(text)}\" names nothing that can be paired: driver/…, project/…, programme/… or portfolio.");
            else if (node.Kind == NodeKind.Driver && !drivers.Contains(node.Id))
                yield return at.Under("between", side).Fault(RuleCodes.DriverUnknown, $"There is no driver {node.Id}.");
        }
    }

    private static Fault? Together(RankPair pair, PairNode first, PairNode second, Place at) =>
        first == second ? at.Fault(RuleCodes.PairSelf, $"{pair.First} is paired with itself.")
        : !PairNode.CanPair(first.Kind, second.Kind) ? at.Fault(RuleCodes.PairKinds,
            $"{pair.First} and {pair.Second} cannot be paired: only drivers and projects can, and a driver with the portfolio "
            + "or a programme.")
        : null;

    private static Fault? Background(double rank, string what, Func<Place> at) =>
        ValueRule.Within(rank, 0, Bounds.Correlation, what, RuleCodes.DependenceRange, at);
}
