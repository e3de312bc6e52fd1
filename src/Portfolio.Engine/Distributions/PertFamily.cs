using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;
using Portfolio.Engine.Draws;

namespace Portfolio.Engine.Distributions;

/// <summary>
/// All PERT shapes of one weight. Their quantiles at a fixed score are analytic in the mode's place t, so a polynomial through the exact
/// quantiles at <see cref="PlacePoints"/> gives them all, and because pieces are linear in quantiles the same holds of
/// <see cref="ScorePieces"/>: a shape's pieces are a weighted sum of a few rows, so cheap (0.1 µs) that nobody need keep them.
/// Weights 0.5, 1, … 20 have a family, made when first asked for; at most 40 exist, of some 25 KB.
/// </summary>
internal sealed class PertFamily
{
    private const int PerUnit = 2, Greatest = 20;

    private static readonly Lazy<PertFamily>[] Families =
        [.. Enumerable.Range(1, Greatest * PerUnit).Select(n => new Lazy<PertFamily>(() => new PertFamily((double)n / PerUnit)))];

    private readonly PlacePoints points;
    private readonly double[] rows; // [point][number of the pieces]

    private PertFamily(double weight)
    {
        points = new PlacePoints(weight, 1e-9);
        rows = new double[points.Count * ScorePieces.Length];
        for (var j = 0; j < points.Count; j++)
            ScorePieces.Of(PertShape.Exact(weight, points[j])).CopyTo(rows, j * ScorePieces.Length);
    }

    /// <summary>The family of a weight; null when it has none.</summary>
    public static PertFamily? Of(double weight)
    {
        var n = weight * PerUnit;
        return n >= 1 && n <= Families.Length && n == Math.Floor(n) ? Families[(int)n - 1].Value : null;
    }

    /// <summary>Pieces of the shape with its mode at <paramref name="place"/> (0…1).</summary>
    [SkipLocalsInit]
    public void WritePieces(double place, Span<double> pieces)
    {
        Span<double> shares = stackalloc double[points.Count];
        points.WriteShares(place, shares);
        ref var row = ref MemoryMarshal.GetArrayDataReference(rows);
        for (var i = 0; i < ScorePieces.Length; i += 2 * Wide.Lanes)
        {
            var (left, right) = (Vector512<double>.Zero, Vector512<double>.Zero);
            for (var j = 0; j < shares.Length; j++)
            {
                var (share, at) = (Vector512.Create(shares[j]), (nuint)(j * ScorePieces.Length + i));
                left = Wide.Fused(share, Vector512.LoadUnsafe(ref row, at), left);
                right = Wide.Fused(share, Vector512.LoadUnsafe(ref row, at + Wide.Lanes), right);
            }
            left.CopyTo(pieces[i..]);
            right.CopyTo(pieces[(i + Wide.Lanes)..]);
        }
    }
}
