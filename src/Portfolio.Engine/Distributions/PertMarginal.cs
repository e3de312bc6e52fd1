using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using Portfolio.Engine.Draws;
using Portfolio.Model.Distributions;

namespace Portfolio.Engine.Distributions;

/// <summary>
/// PERT: beta between two limits with α = 1 + w·t, β = 1 + w·(1 − t), t the mode's place between them. <see cref="Quantile(double)"/> is
/// exact; draws are read from <see cref="ScorePieces"/> with an error below 10⁻⁷ of the range between the 0.1 % and the 99.9 % quantile
/// (tested), and stay within the limits.
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

    public override double Quantile(double p) => low + (high - low) * Beta().Quantile(p, 1 - p);

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
        PieceRows.Read(new AtScore(this, pieces), scores, values);
    }

    public override void Quantile(ReadOnlySpan<double> p, Span<double> values)
    {
        NormalScore.Inverse(p, values);
        Read(values[..p.Length], values);
    }

    private RegularisedBeta Beta()
    {
        var t = (mode - low) / (high - low);
        return new RegularisedBeta(1 + weight * t, 1 + weight * (1 - t));
    }

    private readonly ref struct AtScore(PertMarginal marginal, ReadOnlySpan<double> pieces) : IPiecewise
    {
        private readonly ReadOnlySpan<double> pieces = pieces;

        [MethodImpl(MethodImplOptions.AggressiveInlining)]
        public Vector512<double> Within(Vector512<double> scores) => Vector512.MinNative(
            Vector512.MaxNative(ScorePieces.At(pieces, scores), Vector512.Create(marginal.low)), Vector512.Create(marginal.high));

        public Vector512<double> Everywhere(Vector512<double> scores, Vector512<double> beyond)
        {
            var (values, beta) = (Within(scores), marginal.Beta());
            for (var lane = 0; lane < Wide.Lanes; lane++)
            {
                if (beyond.AsInt64()[lane] != 0)
                    values = values.WithElement(lane, marginal.low + (marginal.high - marginal.low) * beta.QuantileAt(scores[lane]));
            }
            return values;
        }
    }
}
