using Portfolio.Engine.Draws;

namespace Portfolio.Engine.Distributions;

/// <summary>
/// All PERT shapes of one weight. Their quantiles at a fixed score are analytic in the mode's place t, so a polynomial through the exact quantiles at
/// Chebyshev points of t gives them all: a shape's table is a weighted sum of a few rows, so cheap that nobody need keep it.
/// Weights 0.5, 1, … 20 have a family, made when first asked for; at most 40 exist, of some 40 KB.
/// </summary>
internal sealed class PertFamily
{
    private const int PerUnit = 2, Greatest = 20;

    private static readonly Lazy<PertFamily>[] Families =
        [.. Enumerable.Range(1, Greatest * PerUnit).Select(n => new Lazy<PertFamily>(() => new PertFamily((double)n / PerUnit)))];

    private readonly double[] places, weights;
    private readonly double[][] rows;

    private PertFamily(double weight)
    {
        places = Places(Degree(weight));
        weights = Array.ConvertAll(places, here => 1 / places.Where(other => other != here).Aggregate(1.0, (product, other) => product * (here - other)));
        rows = new double[places.Length][];
        for (var (j, mirror) = (0, places.Length - 1); j <= mirror; j++, mirror--)
        {
            rows[j] = new double[ScorePieces.Knots];
            PertShape.WriteQuantiles(weight, places[j], rows[j]);
            rows[mirror] = [.. rows[j].Reverse().Select(x => 1 - x)];
        }
    }

    /// <summary>The family of a weight; null when it has none.</summary>
    public static PertFamily? Of(double weight)
    {
        var n = weight * PerUnit;
        return n >= 1 && n <= Families.Length && n == Math.Floor(n) ? Families[(int)n - 1].Value : null;
    }

    /// <summary>Quantiles of the shape with its mode at <paramref name="place"/> (0…1) at every knot: barycentric interpolation (Berrut and Trefethen, SIAM Review 46(3), 2004).</summary>
    public void WriteQuantiles(double place, Span<double> at)
    {
        var exact = Array.IndexOf(places, place);
        if (exact >= 0)
        {
            rows[exact].CopyTo(at);
            return;
        }

        Span<double> share = stackalloc double[places.Length];
        var sum = 0.0;
        for (var j = 0; j < share.Length; j++)
            sum += share[j] = weights[j] / (place - places[j]);
        at.Clear();
        for (var j = 0; j < share.Length; j++)
            Wide.AddScaled(share[j] / sum, rows[j], at);
    }

    /// <summary>
    /// The quantiles have their nearest singularity at α = 0 or β = 0, 1/w beyond the ends of [0, 1]: the interpolation error falls by
    /// ρ = 1 + 2/w + √((1 + 2/w)² − 1) with each degree.
    /// </summary>
    private static int Degree(double weight)
    {
        var x = 1 + 2 / weight;
        return 6 + (int)Math.Ceiling(Math.Log(1e9) / Math.Log(x + Math.Sqrt(x * x - 1)));
    }

    /// <summary>Chebyshev points on [0, 1], symmetrical about ½; rounded to 2⁻³⁰ so that no processor's cosine shows.</summary>
    private static double[] Places(int degree)
    {
        var points = new double[degree + 1];
        for (var j = 0; 2 * j < degree; j++)
        {
            points[j] = Math.Round((1 - Math.Cos(Math.PI * j / degree)) / 2 * (1 << 30)) / (1 << 30);
            points[degree - j] = 1 - points[j];
        }

        if (degree % 2 == 0)
            points[degree / 2] = 0.5;
        return points;
    }
}
