using Portfolio.Engine.Draws;

namespace Portfolio.Engine.Distributions;

/// <summary>
/// All PERT shapes of one weight. Their quantiles at a fixed score are analytic in the mode's place t, so a polynomial through the exact
/// quantiles at
/// <see cref="PlacePoints"/> gives them all: a shape's table is a weighted sum of a few rows, so cheap that nobody need keep it.
/// Weights 0.5, 1, … 20 have a family, made when first asked for; at most 40 exist, of some 40 KB.
/// </summary>
internal sealed class PertFamily
{
    private const int PerUnit = 2, Greatest = 20;

    private static readonly Lazy<PertFamily>[] Families =
        [.. Enumerable.Range(1, Greatest * PerUnit).Select(n => new Lazy<PertFamily>(() => new PertFamily((double)n / PerUnit)))];

    private readonly PlacePoints points;
    private readonly double[][] rows;

    private PertFamily(double weight)
    {
        points = new PlacePoints(weight, 1e-9);
        rows = new double[points.Count][];
        for (var (j, mirror) = (0, points.Count - 1); j <= mirror; j++, mirror--)
        {
            rows[j] = new double[ScorePieces.Knots];
            PertShape.WriteQuantiles(weight, points[j], rows[j]);
            rows[mirror] = [.. rows[j].Reverse().Select(x => 1 - x)];
        }
    }

    /// <summary>The family of a weight; null when it has none.</summary>
    public static PertFamily? Of(double weight)
    {
        var n = weight * PerUnit;
        return n >= 1 && n <= Families.Length && n == Math.Floor(n) ? Families[(int)n - 1].Value : null;
    }

    /// <summary>Quantiles of the shape with its mode at <paramref name="place"/> (0…1) at every knot.</summary>
    public void WriteQuantiles(double place, Span<double> at)
    {
        Span<double> shares = stackalloc double[points.Count];
        points.WriteShares(place, shares);
        at.Clear();
        for (var j = 0; j < shares.Length; j++)
        {
            if (shares[j] != 0)
                Wide.AddScaled(shares[j], rows[j], at);
        }
    }
}
