using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using Portfolio.Engine.Draws;
using Portfolio.Model.Distributions;

namespace Portfolio.Engine.Distributions;

/// <summary>Lognormal: e^(μ + σz), μ and σ those of the logarithm.</summary>
internal sealed class LognormalMarginal : Marginal
{
    private readonly double mu, sigma;

    private LognormalMarginal(double mu, double sigma) => (this.mu, this.sigma) = (mu, sigma);

    /// <summary>σ² = ln(1 + (sd/mean)²), μ = ln mean − σ²/2.</summary>
    public static Marginal Of(LognormalByMoments stated)
    {
        if (stated.Sd == 0)
            return new ConstantMarginal(stated.Mean);
        var ratio = stated.Sd / stated.Mean;
        var square = LogOnePlus(ratio * ratio);
        return new LognormalMarginal(Elementary.Log(stated.Mean) - square / 2, Math.Sqrt(square));
    }

    /// <summary>σ = (ln high − ln low)/(z_high − z_low), μ = ln low − σ·z_low.</summary>
    public static Marginal Of(LognormalByPercentiles stated)
    {
        if (stated.Low == stated.High)
            return new ConstantMarginal(stated.Low);
        var (from, to) = (NormalScore.Inverse(stated.LowPercentile / 100), NormalScore.Inverse(stated.HighPercentile / 100));
        var sigma = (Elementary.Log(stated.High) - Elementary.Log(stated.Low)) / (to - from);
        return new LognormalMarginal(Elementary.Log(stated.Low) - sigma * from, sigma);
    }

    public override double Quantile(double p) => Elementary.Exp(mu + sigma * NormalScore.Inverse(p));

    /// <summary>The median.</summary>
    public override double BaseValue => Elementary.Exp(mu);

    public override double Mean => Elementary.Exp(mu + sigma * sigma / 2);

    public override double Variance => (Elementary.Exp(sigma * sigma) - 1) * Mean * Mean;

    public override double Lowest => 0;

    public override void Read(ReadOnlySpan<double> scores, Span<double> values) => Wide.Map(new AtScore(mu, sigma), scores, values);

    public override void Quantile(ReadOnlySpan<double> p, Span<double> values)
    {
        NormalScore.Inverse(p, values);
        Read(values[..p.Length], values);
    }

    /// <summary>ln(1 + x) with the digits of a small x (Kahan's correction of the rounding of 1 + x).</summary>
    private static double LogOnePlus(double x)
    {
        var sum = 1 + x;
        return sum == 1 ? x : Elementary.Log(sum) * (x / (sum - 1));
    }

    private readonly struct AtScore(double mu, double sigma) : IWideFunction
    {
        [MethodImpl(MethodImplOptions.AggressiveInlining)]
        public Vector512<double> At(Vector512<double> x) =>
            Elementary.Exp(Vector512.Create(mu) + Vector512.Create(sigma) * x, Vector512<double>.Zero);
    }
}
