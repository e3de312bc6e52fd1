namespace Portfolio.Model.Rules;

/// <summary>What a node of the dependence is.</summary>
internal enum NodeKind
{
    Driver,
    Project,
    Programme,
    Portfolio,
}

/// <summary>A node of the dependence as pairs write it: <c>driver/{id}</c>, <c>project/{id}</c>, <c>programme/{id}</c> or
/// <c>portfolio</c>.</summary>
internal readonly record struct PairNode(NodeKind Kind, string Id)
{
    /// <summary>Null when the text names no node.</summary>
    public static PairNode? Parse(string text) => text.Split('/') switch
    {
        ["portfolio"] => new(NodeKind.Portfolio, ""),
        ["driver", var id] when TextRule.IsId(id) => new(NodeKind.Driver, id),
        ["project", var id] when TextRule.IsId(id) => new(NodeKind.Project, id),
        ["programme", var id] when TextRule.IsId(id) => new(NodeKind.Programme, id),
        _ => null,
    };

    /// <summary>True when a pair may tie these: drivers and projects among each other, and a driver to a factor that is common to
    /// projects.</summary>
    public static bool CanPair(NodeKind first, NodeKind second)
    {
        var (low, high) = first <= second ? (first, second) : (second, first);
        return low == NodeKind.Driver || (low == NodeKind.Project && high == NodeKind.Project);
    }
}
