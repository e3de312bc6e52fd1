using Portfolio.Engine.Draws;
using Portfolio.Model.Distributions;

namespace Portfolio.Engine.Distributions;

/// <summary>Straight lines between stated percentiles; a value stated twice holds all the probability between.</summary>
internal sealed class PercentilesMarginal : Marginal
{
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

    private double Sum(Func<double, double, double, double> term)
    {
        var sum = 0.0;
        for (var i = 0; i < slopes.Length; i++)
            sum += term(p[i + 1] - p[i], values[i], values[i + 1]);
        return sum;
    }
}
