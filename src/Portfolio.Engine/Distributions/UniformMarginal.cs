using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using Portfolio.Engine.Draws;

namespace Portfolio.Engine.Distributions;

/// <summary>Every value between two ends equally likely.</summary>
internal sealed class UniformMarginal : Marginal
{
    private readonly double low, range;

    private UniformMarginal(double low, double range) => (this.low, this.range) = (low, range);

    public static Marginal Of(double low, double high) => low == high ? new ConstantMarginal(low) : new UniformMarginal(low, high - low);

    public override double Quantile(double p) => low + p * range;

    public override double BaseValue => low + range / 2;

    public override double Mean => low + range / 2;

    public override double Variance => range * range / 12;

    public override double Lowest => low;

    public override void Read(ReadOnlySpan<double> scores, Span<double> values) => Wide.Map(new AtScore(low, range), scores, values);

    private readonly struct AtScore(double low, double range) : IWideFunction
    {
        [MethodImpl(MethodImplOptions.AggressiveInlining)]
        public Vector512<double> At(Vector512<double> x) => Vector512.Create(low) + new NormalCdf().At(x) * Vector512.Create(range);
    }
}
