namespace Portfolio.Model.Rules;

/// <summary>Items gathered by key, each key's in their order, in two flat arrays.</summary>
internal sealed class Buckets
{
    private readonly int[] starts;
    private readonly int[] items;

    public Buckets(int keys, List<int> all, Func<int, int> key)
    {
        starts = new int[keys + 1];
        foreach (var item in all) starts[key(item) + 1]++;
        for (var i = 0; i < keys; i++) starts[i + 1] += starts[i];
        items = new int[all.Count];
        var next = starts.AsSpan(0, keys).ToArray();
        foreach (var item in all) items[next[key(item)]++] = item;
    }

    public ArraySegment<int> this[int key] => new(items, starts[key], starts[key + 1] - starts[key]);
}

/// <summary>Walks over some arcs of a network, forwards and backwards.</summary>
internal sealed class ArcIndex(int nodes, IReadOnlyList<Arc> arcs, List<int> some)
{
    private readonly Buckets outgoing = new(nodes, some, a => arcs[a].Predecessor);
    private readonly Buckets incoming = new(nodes, some, a => arcs[a].Successor);

    /// <summary>Arcs of a shortest way along the links; empty when both are the same, null when there is none.</summary>
    public List<int>? ShortestPath(int from, int to)
    {
        var reached = new Dictionary<int, int> { [from] = -1 };
        var queue = new Queue<int>([from]);
        while (!reached.ContainsKey(to) && queue.TryDequeue(out var node))
            foreach (var arc in outgoing[node])
                if (reached.TryAdd(arcs[arc].Successor, arc))
                    queue.Enqueue(arcs[arc].Successor);
        if (!reached.ContainsKey(to)) return null;
        List<int> path = [];
        for (var node = to; node != from; node = arcs[reached[node]].Predecessor) path.Add(reached[node]);
        path.Reverse();
        return path;
    }

    /// <summary>All nodes that lie on a circle with this one, itself included.</summary>
    public IEnumerable<int> Knot(int node)
    {
        var before = Walk(node, incoming, a => a.Predecessor);
        return Walk(node, outgoing, a => a.Successor).Where(before.Contains);
    }

    private HashSet<int> Walk(int start, Buckets along, Func<Arc, int> end)
    {
        HashSet<int> reached = [start];
        var stack = new Stack<int>(reached);
        while (stack.TryPop(out var node))
            foreach (var arc in along[node])
                if (reached.Add(end(arcs[arc])))
                    stack.Push(end(arcs[arc]));
        return reached;
    }
}
