using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using Portfolio.Engine.Draws;
using Portfolio.Model.Distributions;

namespace Portfolio.Engine.Distributions;

/// <summary>Straight lines between stated percentiles; a value stated twice holds all the probability between.</summary>
internal sealed class PercentilesMarginal : Marginal
{
    private const int FewSegments = 24; // up to here comparing with each point is quicker than a search

    private readonly double[] p, values, slopes;

    // Segment in which each of equally wide cells of probability begins; the search goes on from there.
    private readonly ushort[] guide;

    private PercentilesMarginal(double[] p, double[] values)
    {
        (this.p, this.values) = (p, values);
        slopes = new double[p.Length - 1];
        for (var i = 0; i < slopes.Length; i++)
            slopes[i] = (values[i + 1] - values[i]) / (p[i + 1] - p[i]);
        guide = new ushort[2 * p.Length];
        for (int cell = 0, segment = 0; cell < guide.Length; cell++)
        {
            while (p[segment + 1] < (double)cell / guide.Length)
                segment++;
            guide[cell] = (ushort)segment;
        }
    }

    public static Marginal Of(Percentiles stated) => new PercentilesMarginal(
        [.. stated.Points.Select(point => point.P / 100)], [.. stated.Points.Select(point => point.Value)]);

    public override double Quantile(double p)
    {
        var segment = (int)guide[Math.Min((int)(p * guide.Length), guide.Length - 1)];
        if (this.p[segment] > p) // a cell's edge, rounded the other way
            segment--;
        while (this.p[segment + 1] < p)
            segment++;
        return values[segment] + (p - this.p[segment]) * slopes[segment];
    }

    /// <summary>The median.</summary>
    public override double BaseValue => Quantile(0.5);

    public override double Mean => Sum((width, from, to) => width * (from + to) / 2);

    /// <summary>Second moment about the mean: Σ Δp·(x² + xy + y²)/3.</summary>
    public override double Variance
    {
        get
        {
            var mean = Mean;
            return Sum((width, from, to) =>
                width * ((from - mean) * (from - mean) + (from - mean) * (to - mean) + (to - mean) * (to - mean)) / 3);
        }
    }

    public override double Lowest => values[0];

    public override void Read(ReadOnlySpan<double> scores, Span<double> values)
    {
        NormalScore.Phi(scores, values);
        Quantile(values[..scores.Length], values);
    }

    public override void Quantile(ReadOnlySpan<double> p, Span<double> values)
    {
        if (slopes.Length <= FewSegments)
            Wide.Map(new OfFew(this.p, this.values, slopes), p, values);
        else
            base.Quantile(p, values);
    }

    private double Sum(Func<double, double, double, double> term)
    {
        var sum = 0.0;
        for (var i = 0; i < slopes.Length; i++)
            sum += term(p[i + 1] - p[i], values[i], values[i + 1]);
        return sum;
    }

    // Goes through all segments: of the points below p the last decides.
    private readonly struct OfFew(double[] points, double[] values, double[] slopes) : IWideFunction
    {
        [MethodImpl(MethodImplOptions.AggressiveInlining)]
        public Vector512<double> At(Vector512<double> p)
        {
            var (from, value, slope) = (Vector512.Create(points[0]), Vector512.Create(values[0]), Vector512.Create(slopes[0]));
            for (var i = 1; i < slopes.Length; i++)
            {
                var here = Vector512.Create(points[i]);
                var above = Vector512.LessThan(here, p);
                from = Vector512.ConditionalSelect(above, here, from);
                value = Vector512.ConditionalSelect(above, Vector512.Create(values[i]), value);
                slope = Vector512.ConditionalSelect(above, Vector512.Create(slopes[i]), slope);
            }
            return value + (p - from) * slope;
        }
    }
}
