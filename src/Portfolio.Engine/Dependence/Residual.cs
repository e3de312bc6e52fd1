namespace Portfolio.Engine.Dependence;

/// <summary>
/// What the common factors leave of one connected group of nodes: the standard deviation of each node's own part and the correlations
/// between
/// these parts (unit diagonal; [i, j] by place in <see cref="Members"/>). Groups do not touch each other, so each is checked, repaired and
/// factored alone, and what happens in one changes nothing in another.
/// </summary>
internal sealed class Residual
{
    /// <summary>Below this a node has no part of its own.</summary>
    private const double Nothing = 1e-12;

    /// <summary>Indices of the nodes, rising.</summary>
    public required int[] Members { get; init; }

    public required double[] Scale { get; init; }

    public required double[,] Correlations { get; init; }

    /// <summary>
    /// Nodes whose loadings alone exceed 1, or that have no part of their own left for a stated pair: no matrix can be found.
    /// </summary>
    public required IReadOnlyList<int> Impossible { get; init; }

    /// <summary>All groups, a node without pairs being a group of one; in the order of their first members.</summary>
    public static IReadOnlyList<Residual> Groups(Nodes nodes)
    {
        var root = Enumerable.Range(0, nodes.Keys.Length).ToArray();
        int Find(int i) => root[i] == i ? i : root[i] = Find(root[i]);
        foreach (var pair in nodes.Pairs)
        {
            var (a, b) = (Find(pair.First), Find(pair.Second));
            root[Math.Max(a, b)] = Math.Min(a, b);
        }

        var pairs = nodes.Pairs.ToLookup(pair => Find(pair.First));
        return [.. root.Select((_, i) => i).GroupBy(Find).Select(group => Of(nodes, [.. group], pairs[group.Key]))];
    }

    private static Residual Of(Nodes nodes, int[] members, IEnumerable<NodePair> pairs)
    {
        var place = members.Select((node, i) => (node, i)).ToDictionary(x => x.node, x => x.i);
        var left = Array.ConvertAll(members, node => 1 - nodes.Implied(node, node));
        var scale = Array.ConvertAll(left, x => x > Nothing ? Math.Sqrt(x) : 0);
        var impossible = members.Where((_, i) => left[i] < -1e-10).ToList();
        var correlations = new double[members.Length, members.Length];
        for (var i = 0; i < members.Length; i++)
            correlations[i, i] = 1;
        foreach (var pair in pairs)
        {
            var (i, j) = (place[pair.First], place[pair.Second]);
            var rest = pair.Correlation - nodes.Implied(pair.First, pair.Second);
            var product = scale[i] * scale[j];
            if (product == 0 && Math.Abs(rest) > 1e-9)
                impossible.Add(scale[i] == 0 ? pair.First : pair.Second);
            correlations[i, j] = correlations[j, i] = product == 0 ? 0 : rest / product;
        }

        return new Residual { Members = members, Scale = scale, Correlations = correlations, Impossible = impossible };
    }
}
