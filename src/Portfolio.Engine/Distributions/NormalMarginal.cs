using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using Portfolio.Engine.Draws;
using Portfolio.Model.Distributions;

namespace Portfolio.Engine.Distributions;

/// <summary>Normal without bounds: mean + sd·z.</summary>
internal sealed class NormalMarginal : Marginal
{
    private readonly double mean, sd;

    private NormalMarginal(double mean, double sd) => (this.mean, this.sd) = (mean, sd);

    public static Marginal Of(Normal stated)
    {
        var (min, max) = (stated.Min ?? double.NegativeInfinity, stated.Max ?? double.PositiveInfinity);
        if (stated.Sd == 0 || min == max)
            return new ConstantMarginal(Math.Min(Math.Max(stated.Mean, min), max));
        if (double.IsInfinity(min) && double.IsInfinity(max))
            return new NormalMarginal(stated.Mean, stated.Sd);
        return new TruncatedNormalMarginal(stated.Mean, stated.Sd, min, max);
    }

    public override double Quantile(double p) => mean + sd * NormalScore.Inverse(p);

    public override double BaseValue => mean;

    public override double Mean => mean;

    public override double Variance => sd * sd;

    public override double Lowest => double.NegativeInfinity;

    public override void Read(ReadOnlySpan<double> scores, Span<double> values) => Wide.Map(new AtScore(mean, sd), scores, values);

    private readonly struct AtScore(double mean, double sd) : IWideFunction
    {
        [MethodImpl(MethodImplOptions.AggressiveInlining)]
        public Vector512<double> At(Vector512<double> x) => Vector512.Create(mean) + Vector512.Create(sd) * x;
    }
}
