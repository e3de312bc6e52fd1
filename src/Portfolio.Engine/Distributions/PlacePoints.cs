using System.Runtime.Intrinsics;
using Portfolio.Engine.Draws;

namespace Portfolio.Engine.Distributions;

/// <summary>
/// Points of the mode's place t through which what is analytic in t is interpolated for all PERT shapes of one weight: barycentric
/// interpolation (Berrut and Trefethen, SIAM Review 46(3), 2004) at Chebyshev points on [0, 1], symmetrical about ½.
/// </summary>
internal sealed class PlacePoints
{
    private readonly double[] places, weights;

    /// <summary>
    /// Quantiles have their nearest singularity at α = 0 or β = 0, 1/w beyond the ends of [0, 1]: the interpolation error falls by
    /// ρ = 1 + 2/w + √((1 + 2/w)² − 1) with each degree, and here below <paramref name="error"/>.
    /// </summary>
    public PlacePoints(double weight, double error)
    {
        var x = 1 + 2 / weight;
        places = Places(6 + (int)Math.Ceiling(Math.Log(1 / error) / Math.Log(x + Math.Sqrt(x * x - 1))));
        weights = Array.ConvertAll(
            places, here => 1 / places.Where(other => other != here).Aggregate(1.0, (product, other) => product * (here - other)));
    }

    public int Count => places.Length;

    public double this[int j] => places[j];

    /// <summary>What each point counts at a place, summing to 1.</summary>
    public void WriteShares(double place, Span<double> shares)
    {
        var exact = places.AsSpan().IndexOf(place);
        if (exact >= 0)
        {
            shares.Clear();
            shares[exact] = 1;
            return;
        }
        var j = 0;
        for (; j <= places.Length - Wide.Lanes; j += Wide.Lanes)
        {
            var distances = Vector512.Create(place) - Vector512.Create(places, j);
            (Vector512.Create(weights, j) / distances).CopyTo(shares[j..]);
        }
        for (; j < places.Length; j++)
            shares[j] = weights[j] / (place - places[j]);
        var sum = 0.0;
        foreach (var share in shares)
            sum += share;
        var inverse = 1 / sum;
        foreach (ref var share in shares)
            share *= inverse;
    }

    /// <summary>The value at a place of what has <paramref name="values"/> at the points.</summary>
    public double At(double place, ReadOnlySpan<double> values)
    {
        var (sum, weighted) = (0.0, 0.0);
        for (var j = 0; j < places.Length; j++)
        {
            var distance = place - places[j];
            if (distance == 0)
                return values[j];
            var share = weights[j] / distance;
            sum += share;
            weighted += share * values[j];
        }

        return weighted / sum;
    }

    // Rounded to 2⁻³⁰ so that no processor's cosine shows.
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
