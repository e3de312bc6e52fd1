using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules.AcrossParts;

/// <summary>
/// Activities of several projects that wait for each other in a circle; circles within one project are that project's rule. Reported at a
/// link of an activity that was sent where there is one, and of these at one into another project.
/// </summary>
internal static class ForeignCycleRule
{
    public static IEnumerable<Fault> Check(OutlineIndex whole)
    {
        if (Circling(whole) is not { Count: > 0 } some) return [];
        var network = new PortfolioNetwork(whole, some);
        return CycleSearch.Find(network.Nodes, network.Arcs, network.ReachesOut).Select(cycle => Report(cycle, whole, network));
    }

    /// <summary>Projects that reach each other in a circle, and perhaps some between such: only their activities can.</summary>
    private static HashSet<int> Circling(OutlineIndex whole)
    {
        List<Arc> arcs = [];
        for (var p = 0; p < whole.Projects.Count; p++)
            foreach (var link in whole.Projects[p].Outline.ForeignLinks)
                if (whole.Find(link.Project!) is >= 0 and var q)
                    arcs.Add(new(q, p));
        return [.. CycleSearch.Left(whole.Projects.Count, arcs).SelectMany(arc => new[] { arcs[arc].Predecessor, arcs[arc].Successor })];
    }

    private static Fault Report(List<int> cycle, OutlineIndex whole, PortfolioNetwork network)
    {
        var names = cycle.Select(arc => network.Name(network.Arcs[arc].Successor));
        var (project, link) = cycle.Select(network.Link)
            .MinBy(l => (WasSent(l.Project, l.Link) ? 0 : 2) + (l.Link.Project is null ? 1 : 0));
        return whole.ActivityAt(project, link.Successor).Under("predecessors", link.Entry).Fault(
            RuleCodes.LinkCycle, CycleSearch.Message(names));

        bool WasSent(int place, OutlineLink one) =>
            whole.Projects[place] is { Path: not null } placed && placed.Sent?.Contains(one.Successor) != false;
    }
}

/// <summary>All activities of some projects numbered through, with the links between them that name something.</summary>
internal sealed class PortfolioNetwork
{
    private readonly OutlineIndex whole;
    private readonly HashSet<int> some;
    private readonly int[] starts;
    private readonly List<(int Project, OutlineLink Link)> links = [];

    public PortfolioNetwork(OutlineIndex whole, HashSet<int> some)
    {
        (this.whole, this.some) = (whole, some);
        starts = new int[whole.Projects.Count + 1];
        for (var p = 0; p < whole.Projects.Count; p++)
            starts[p + 1] = starts[p] + (some.Contains(p) ? whole.Projects[p].Outline.ActivityIds.Count : 0);
        foreach (var p in some.Order())
            foreach (var link in whole.Projects[p].Outline.Links)
                Add(p, link);
    }

    public int Nodes => starts[^1];

    public List<Arc> Arcs { get; } = [];

    public (int Project, OutlineLink Link) Link(int arc) => links[arc];

    public bool ReachesOut(Arc arc) => ProjectOf(arc.Predecessor) != ProjectOf(arc.Successor);

    public string Name(int node)
    {
        var project = ProjectOf(node);
        var outline = whole.Projects[project].Outline;
        return $"{outline.Id}/{outline.ActivityIds[node - starts[project]]}";
    }

    private void Add(int p, OutlineLink link)
    {
        var q = link.Project is null ? p : whole.Find(link.Project);
        if (!some.Contains(q)) return;
        var predecessor = link.Project is null ? link.Predecessor : whole.Projects[q].Outline.Find(link.Activity!);
        if (predecessor < 0) return;
        Arcs.Add(new(starts[q] + predecessor, starts[p] + link.Successor));
        links.Add((p, link));
    }

    private int ProjectOf(int node)
    {
        var found = Array.BinarySearch(starts, node);
        if (found < 0) return ~found - 1;
        // Projects that are left out or have no activities begin where the next one does; the last of them holds the node.
        while (found + 1 < starts.Length - 1 && starts[found + 1] == node) found++;
        return found;
    }
}
