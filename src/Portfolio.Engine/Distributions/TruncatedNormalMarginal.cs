using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using Portfolio.Engine.Draws;

namespace Portfolio.Engine.Distributions;

/// <summary>
/// Normal held between two bounds: with a = Φ((min−mean)/sd) and b = Φ((max−mean)/sd) the value at p is mean + sd·Φ⁻¹(a + p(b−a)).
/// When both bounds lie above the mean the mirror image is worked, because only the lower tail of Φ has its digits.
/// At a score it is read from <see cref="ScorePieces"/>: error below 10⁻⁶ of the range between the 0.1 % and the 99.9 % quantile (tested).
/// </summary>
internal sealed class TruncatedNormalMarginal : Marginal
{
    private readonly double mean, sd, min, max;
    private readonly double below, held;
    private readonly bool mirrored;
    private readonly double[] pieces;

    public TruncatedNormalMarginal(double mean, double sd, double min, double max)
    {
        (this.mean, this.sd, this.min, this.max) = (mean, sd, min, max);
        mirrored = min > mean;
        var (from, to) = mirrored ? (NormalScore.Phi((mean - max) / sd), NormalScore.Phi((mean - min) / sd))
                                  : (NormalScore.Phi((min - mean) / sd), NormalScore.Phi((max - mean) / sd));
        (below, held) = (from, to - from);
        pieces = ScorePieces.Of(Exact);
    }

    /// <summary>Probability between the bounds before truncation.</summary>
    public double Held => held;

    public override double Quantile(double p) => Wide.At(AtProbability(), p);

    /// <summary>The mean as stated, before truncation.</summary>
    public override double BaseValue => mean;

    public override double Mean => mean + sd * MeanScore;

    /// <summary>
    /// sd²·(1 + (α·φ(α) − β·φ(β))/Z − ((φ(α) − φ(β))/Z)²), α and β the bounds in standard deviations, Z the probability held.
    /// </summary>
    public override double Variance
    {
        get
        {
            var (a, b) = ((min - mean) / sd, (max - mean) / sd);
            return sd * sd * (1 + (Moment(a) - Moment(b)) / held - MeanScore * MeanScore);
        }
    }

    public override double Lowest => min;

    public override void Read(ReadOnlySpan<double> scores, Span<double> values) =>
        PieceRows.Read(new AtScore(AtProbability(), mirrored, pieces, min, max), scores, values);

    public override void Quantile(ReadOnlySpan<double> p, Span<double> values) => Wide.Map(AtProbability(), p, values);

    // The value at Φ(z).
    private double Exact(double z) => AtProbability().Mirrored(Vector512.Create(NormalScore.Phi(mirrored ? -z : z))).ToScalar();

    private double MeanScore => (Density((min - mean) / sd) - Density((max - mean) / sd)) / held;

    private static double Density(double z) => Elementary.Exp(-z * z / 2) * 0.39894228040143267794;

    private static double Moment(double z) => double.IsInfinity(z) ? 0 : z * Density(z);

    private Truncated AtProbability() => new(mean, sd, min, max, below, held, mirrored);

    /// <summary>The value at a probability of the truncated distribution.</summary>
    private readonly struct Truncated(
        double mean, double sd, double min, double max, double below, double held, bool mirrored) : IWideFunction
    {
        [MethodImpl(MethodImplOptions.AggressiveInlining)]
        public Vector512<double> At(Vector512<double> x) => Mirrored(mirrored ? Vector512.Create(1.0) - x : x);

        /// <summary>The same at the probability counted from the end from which it is worked.</summary>
        [MethodImpl(MethodImplOptions.AggressiveInlining)]
        public Vector512<double> Mirrored(Vector512<double> p)
        {
            var u = Vector512.Create(below) + p * Vector512.Create(held);
            u = Vector512.MinNative(
                Vector512.MaxNative(u, Vector512.Create(double.Epsilon * (1L << 52))), Vector512.Create(Uniforms.Greatest));
            var value = Vector512.Create(mean) + Vector512.Create(mirrored ? -sd : sd) * new InverseNormal().At(u);
            return Vector512.MinNative(Vector512.MaxNative(value, Vector512.Create(min)), Vector512.Create(max));
        }
    }

    private readonly ref struct AtScore(Truncated truncated, bool mirrored, ReadOnlySpan<double> pieces, double min, double max) : IPiecewise
    {
        private readonly ReadOnlySpan<double> pieces = pieces;

        [MethodImpl(MethodImplOptions.AggressiveInlining)]
        public Vector512<double> Within(Vector512<double> scores) => Vector512.MinNative(
            Vector512.MaxNative(ScorePieces.At(pieces, scores), Vector512.Create(min)), Vector512.Create(max));

        public Vector512<double> Everywhere(Vector512<double> scores, Vector512<double> beyond) => Vector512.ConditionalSelect(
            beyond, truncated.Mirrored(default(NormalCdf).At(mirrored ? -scores : scores)), Within(scores));
    }
}
