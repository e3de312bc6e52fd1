namespace Portfolio.Model.Rules;

/// <summary>A link between two nodes of a network: the successor waits for the predecessor.</summary>
internal readonly record struct Arc(int Predecessor, int Successor);

/// <summary>Finds circles in a network of links: one, as short as can be, for each set of nodes that all wait for each other.</summary>
internal static class CycleSearch
{
    // More faults than this are not reported anyway (contract section 2), and each search walks the network.
    private const int Most = 1_000;

    /// <summary>
    /// Cycles as places in <paramref name="arcs"/>: the first arc waits for the last, each other arc for the one before it.
    /// With <paramref name="through"/> only circles through such an arc are looked for, and it comes first.
    /// </summary>
    public static List<List<int>> Find(int nodes, IReadOnlyList<Arc> arcs, Func<Arc, bool>? through = null)
    {
        List<List<int>> cycles = [];
        var left = Left(nodes, arcs);
        if (left.Count == 0) return cycles;
        var network = new ArcIndex(nodes, arcs, left);
        var done = new bool[nodes];
        foreach (var arc in left)
        {
            var (predecessor, successor) = arcs[arc];
            if (done[successor] || (through is not null && !through(arcs[arc]))) continue;
            if (network.ShortestPath(successor, predecessor) is not { } path) continue;
            cycles.Add([arc, .. path]);
            if (cycles.Count == Most) break;
            foreach (var node in network.Knot(successor)) done[node] = true;
        }

        return cycles;
    }

    /// <summary>A sentence that names the whole circle; the nodes in the order of their work.</summary>
    public static string Message(IEnumerable<string> nodes)
    {
        var names = nodes.ToList();
        return $"These activities wait for each other in a circle: {string.Join(" → ", names)} → {names[0]}.";
    }

    /// <summary>Arcs that remain when nodes without predecessors, then without successors, are taken away again and again.</summary>
    public static List<int> Left(int nodes, IReadOnlyList<Arc> arcs)
    {
        List<int> left = [.. Enumerable.Range(0, arcs.Count)];
        left = PeelOnce(nodes, arcs, left, a => a.Predecessor, a => a.Successor);
        return left.Count == 0 ? left : PeelOnce(nodes, arcs, left, a => a.Successor, a => a.Predecessor);
    }

    private static List<int> PeelOnce(int nodes, IReadOnlyList<Arc> arcs, List<int> left, Func<Arc, int> from, Func<Arc, int> to)
    {
        var held = new int[nodes];
        foreach (var arc in left) held[to(arcs[arc])]++;
        var outgoing = new Buckets(nodes, left, arc => from(arcs[arc]));
        var free = new Stack<int>(Enumerable.Range(0, nodes).Where(n => held[n] == 0));
        while (free.TryPop(out var node))
            foreach (var arc in outgoing[node])
                if (--held[to(arcs[arc])] == 0)
                    free.Push(to(arcs[arc]));
        return left.FindAll(arc => held[from(arcs[arc])] > 0 && held[to(arcs[arc])] > 0);
    }
}
