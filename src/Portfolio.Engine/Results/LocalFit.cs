using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace Portfolio.Engine.Results;

/// <summary>
/// What a part costs when the total stands at a level: Euler allocation, E[X | T = quantile] (Tasche, "Risk contributions and performance
/// measurement", 1999), estimated by a least-squares line of X on T over the iterations whose rank lies within ± 10 % of n around the
/// level's. Least squares is linear in X and gives T itself back, so the fits of all parts make the total.
/// </summary>
internal sealed class LocalFit
{
    private readonly int[] order; // iterations by rising total, equal totals by iteration
    private readonly double[] totals; // in that order
    private readonly double[] costs; // of one part, in that order
    private readonly Window[] windows;

    /// <param name="total">Whole minor units, one for each iteration, at least one.</param>
    /// <param name="levels">Levels to fit at.</param>
    public LocalFit(ReadOnlySpan<double> total, IReadOnlyList<Level> levels)
    {
        totals = total.ToArray();
        order = new int[total.Length];
        for (var i = 0; i < order.Length; i++) order[i] = i;
        Array.Sort(totals, order);
        OrderTies();
        costs = new double[total.Length];
        windows = [.. levels.Select(WindowOf)];
    }

    /// <summary>The total at a level, by the level's place in the list.</summary>
    public double Total(int level) => windows[level].Total;

    /// <summary>Fits one part at every level. Not to be called from two threads at once.</summary>
    /// <param name="part">Whole minor units, one for each iteration.</param>
    /// <param name="figures">Receives one figure for each level, minor units and fractions.</param>
    public void At(ReadOnlySpan<double> part, Span<double> figures)
    {
        var origin = part[0]; // keeps the sums small, and so exact
        for (var i = 0; i < order.Length; i++) costs[i] = part[order[i]] - origin;
        for (var level = 0; level < windows.Length; level++) figures[level] = origin + At(windows[level]);
    }

    private double At(Window window)
    {
        var part = costs.AsSpan(window.First, window.Count);
        var (sum, product) = Sums(part, totals.AsSpan(window.First, window.Count), window.Mean);
        var mean = sum / window.Count;
        return window.Squares > 0 ? mean + product / window.Squares * (window.Total - window.Mean) : mean;
    }

    /// <summary>Σx and Σx·(t − mean), in four lanes whatever the processor has, so that every machine rounds alike.</summary>
    private static (double Sum, double Product) Sums(ReadOnlySpan<double> part, ReadOnlySpan<double> total, double mean)
    {
        var x = MemoryMarshal.Cast<double, Vector256<double>>(part);
        var t = MemoryMarshal.Cast<double, Vector256<double>>(total);
        var (sums, products, means) = (Vector256<double>.Zero, Vector256<double>.Zero, Vector256.Create(mean));
        for (var i = 0; i < x.Length; i++)
        {
            sums += x[i];
            products += x[i] * (t[i] - means);
        }
        var (sum, product) = (Fold(sums), Fold(products));
        for (var i = x.Length * Vector256<double>.Count; i < part.Length; i++)
        {
            sum += part[i];
            product += part[i] * (total[i] - mean);
        }
        return (sum, product);
    }

    private static double Fold(Vector256<double> lanes) => lanes[0] + lanes[1] + (lanes[2] + lanes[3]);

    /// <summary>Ranks k − n/10 … k + n/10, cut off at the ends.</summary>
    private Window WindowOf(Level level)
    {
        var n = totals.Length;
        var rank = level.Rank(n);
        var (first, last) = (Math.Max(rank - n / 10, 1), Math.Min(rank + n / 10, n));
        var inside = totals.AsSpan(first - 1, last - first + 1);
        var origin = inside[0];
        var mean = 0.0;
        foreach (var total in inside) mean += total - origin;
        mean = origin + mean / inside.Length;
        var squares = 0.0;
        foreach (var total in inside) squares += (total - mean) * (total - mean);
        return new(first - 1, inside.Length, totals[rank - 1], mean, inside[0] == inside[^1] ? 0 : squares);
    }

    private void OrderTies()
    {
        for (var from = 0; from < totals.Length;)
        {
            var to = from + 1;
            while (to < totals.Length && totals[to] == totals[from]) to++;
            if (to - from > 1) order.AsSpan(from, to - from).Sort();
            from = to;
        }
    }

    /// <summary>Where a level's iterations lie in the order, their total at the level, mean total and squared spread about it.</summary>
    private readonly record struct Window(int First, int Count, double Total, double Mean, double Squares);
}
