using Portfolio.Engine.Draws;

namespace Portfolio.Engine.Dependence;

/// <summary>
/// A connected group of nodes ready to draw: keys, output rows, loadings on the common factors and the scaled Cholesky rows.
/// </summary>
internal sealed class Group
{
    public required ulong[] Keys { get; init; }

    /// <summary>Where each node's scores go.</summary>
    public required int[] Rows { get; init; }

    private (int Source, double Factor)[][] Loadings { get; init; } = [];

    private (int Source, double Factor)[][] Own { get; init; } = [];

    public static Group Of(Nodes nodes, Residual residual, double[,] correlations, int[] rows)
    {
        var lower = LowerTriangle.Of(correlations, out _);
        return new Group
        {
            Keys = Array.ConvertAll(residual.Members, node => DrawKey.Hash(nodes.Keys[node])),
            Rows = Array.ConvertAll(residual.Members, node => rows[node]),
            Loadings = Array.ConvertAll(residual.Members, node => NonZero(nodes.Loadings[node], 1)),
            Own = [.. lower.Select((row, i) => NonZero(row, residual.Scale[i]))],
        };
    }

    /// <summary>
    /// Scores of member <paramref name="i"/> from the common factors' and the members' own draws, each source a row as long as
    /// <paramref name="target"/>.
    /// </summary>
    public void Write(int i, ReadOnlySpan<double> common, ReadOnlySpan<double> own, Span<double> target)
    {
        var count = target.Length;
        target.Clear();
        foreach (var (source, factor) in Loadings[i])
            Wide.AddScaled(factor, common.Slice(source * count, count), target);
        foreach (var (source, factor) in Own[i])
            Wide.AddScaled(factor, own.Slice(source * count, count), target);
    }

    private static (int, double)[] NonZero(double[] factors, double scale) =>
        [.. factors.Select((factor, source) => (source, factor * scale)).Where(x => x.Item2 != 0)];
}
