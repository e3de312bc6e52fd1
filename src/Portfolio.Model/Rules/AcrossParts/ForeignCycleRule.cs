using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules.AcrossParts;

/// <summary>
/// Activities of several projects that wait for each other in a circle; circles within one project are that project's rule. Reported at a
/// link into another project, of a project that was sent where there is one.
/// </summary>
internal static class ForeignCycleRule
{
    public static IEnumerable<Fault> Check(OutlineIndex whole)
    {
        if (!whole.Projects.Any(p => p.Outline.ReachesOut)) return [];
        var network = new PortfolioNetwork(whole);
        return CycleSearch.Find(network.Nodes, network.Arcs, network.ReachesOut).Select(cycle => Report(cycle, whole, network));
    }

    private static Fault Report(List<int> cycle, OutlineIndex whole, PortfolioNetwork network)
    {
        var names = cycle.Select(arc => network.Name(network.Arcs[arc].Successor));
        var (project, link) = cycle.Select(network.Link).FirstOrDefault(
            l => l.Link.Project is not null && whole.Projects[l.Project].Path is not null, network.Link(cycle[0]));
        return whole.ActivityAt(project, link.Successor).Under("predecessors", link.Entry).Fault(
            RuleCodes.LinkCycle, CycleSearch.Message(names));
    }
}

/// <summary>All activities of a portfolio numbered through, with the links that name something.</summary>
internal sealed class PortfolioNetwork
{
    private readonly OutlineIndex whole;
    private readonly int[] starts;
    private readonly List<(int Project, OutlineLink Link)> links = [];

    public PortfolioNetwork(OutlineIndex whole)
    {
        this.whole = whole;
        starts = new int[whole.Projects.Count + 1];
        for (var p = 0; p < whole.Projects.Count; p++) starts[p + 1] = starts[p] + whole.Projects[p].Outline.ActivityIds.Count;
        for (var p = 0; p < whole.Projects.Count; p++)
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
        if (q < 0) return;
        var predecessor = link.Project is null ? link.Predecessor : whole.Projects[q].Outline.Find(link.Activity!);
        if (predecessor < 0) return;
        Arcs.Add(new(starts[q] + predecessor, starts[p] + link.Successor));
        links.Add((p, link));
    }

    private int ProjectOf(int node)
    {
        var found = Array.BinarySearch(starts, node);
        if (found < 0) return ~found - 1;
        // Projects without activities begin where the next one does; the last of them holds the node.
        while (found + 1 < starts.Length - 1 && starts[found + 1] == node) found++;
        return found;
    }
}
