namespace Portfolio.Engine.Dependence;

/// <summary>Two nodes whose rank correlation the repair of the matrix changed; nodes by key, such as <c>driver/ground</c>.</summary>
/// <param name="Stated">Rank before: as stated, or as the common factors imply where nothing was.</param>
/// <param name="Used">Rank that the draws have.</param>
public readonly record struct RankChange(string First, string Second, double Stated, double Used)
{
    private const double Unchanged = 1e-9;

    internal static IEnumerable<RankChange> Between(Nodes nodes, Residual residual, double[,] repaired)
    {
        for (var i = 0; i < residual.Members.Length; i++)
        {
            for (var j = i + 1; j < residual.Members.Length; j++)
            {
                var (first, second) = (residual.Members[i], residual.Members[j]);
                var (implied, scale) = (nodes.Implied(first, second), residual.Scale[i] * residual.Scale[j]);
                var stated = RankCorrelation.FromNormal(implied + scale * residual.Correlations[i, j]);
                var used = RankCorrelation.FromNormal(implied + scale * repaired[i, j]);
                if (Math.Abs(used - stated) > Unchanged)
                    yield return new RankChange(nodes.Keys[first], nodes.Keys[second], stated, used);
            }
        }
    }
}
