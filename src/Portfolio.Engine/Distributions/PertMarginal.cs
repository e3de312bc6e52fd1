using System.Runtime.CompilerServices;
using Portfolio.Engine.Draws;
using Portfolio.Model.Distributions;

namespace Portfolio.Engine.Distributions;

/// <summary>
/// PERT: beta between two limits with α = 1 + w·t, β = 1 + w·(1 − t), t the mode's place between them. <see cref="Quantile(double)"/> is
/// exact;
/// draws are read from a table over the score whose error is below 10⁻⁶ of the range between the 0.1 % and the 99.9 % quantile there and
/// 10⁻⁴ beyond (tested), and stay within the limits.
/// </summary>
internal sealed class PertMarginal : Marginal
{
    private readonly double low, mode, high, weight;
    private readonly PertShape shape;

    private PertMarginal(double low, double mode, double high, double weight)
    {
        (this.low, this.mode, this.high, this.weight) = (low, mode, high, weight);
        shape = PertShape.Of(weight, (mode - low) / (high - low));
    }

    public static Marginal Of(Pert stated)
    {
        if (stated.Low == stated.High)
            return new ConstantMarginal(stated.Mode);
        var (low, high) = OuterLimits.Of(stated);
        return new PertMarginal(low, stated.Mode, high, stated.Weight);
    }

    public override double Quantile(double p)
    {
        var t = (mode - low) / (high - low);
        return low + (high - low) * new RegularisedBeta(1 + weight * t, 1 + weight * (1 - t)).Quantile(p, 1 - p);
    }

    public override double BaseValue => mode;

    public override double Mean => low + ((high - low) + weight * (mode - low)) / (weight + 2);

    /// <summary>(mean − low)(high − mean)/(w + 3).</summary>
    public override double Variance => (Mean - low) * (high - Mean) / (weight + 3);

    public override double Lowest => low;

    [SkipLocalsInit]
    public override void Read(ReadOnlySpan<double> scores, Span<double> values)
    {
        Span<double> pieces = stackalloc double[ScorePieces.Length];
        shape.WritePieces(low, high - low, pieces);
        ScorePieces.Read(pieces, scores, values, low, high);
    }

    public override void Quantile(ReadOnlySpan<double> p, Span<double> values)
    {
        NormalScore.Inverse(p, values);
        Read(values[..p.Length], values);
    }
}
