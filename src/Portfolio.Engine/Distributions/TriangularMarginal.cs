using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using Portfolio.Engine.Draws;
using Portfolio.Model.Distributions;

namespace Portfolio.Engine.Distributions;

/// <summary>
/// Triangular. Inverse of its distribution function: low + √(p·(high−low)(mode−low)) up to the mode, high − √((1−p)(high−low)(high−mode))
/// above it; so at a score z below the mode's it is low + c·√Φ(z), above it high − c′·√Φ(−z). The root is read from
/// <see cref="ScorePieces"/>: error below 10⁻⁷ of the range (tested).
/// </summary>
internal sealed class TriangularMarginal : Marginal
{
    private static readonly double[] RootPhi = ScorePieces.Of(z => Math.Sqrt(NormalScore.Phi(z)));

    private readonly double low, mode, high;
    private readonly double modeProbability, modeScore, rise, fall;

    private TriangularMarginal(double low, double mode, double high)
    {
        (this.low, this.mode, this.high) = (low, mode, high);
        modeProbability = (mode - low) / (high - low);
        modeScore = mode <= low ? double.NegativeInfinity : mode >= high ? double.PositiveInfinity : NormalScore.Inverse(modeProbability);
        rise = Math.Sqrt((high - low) * (mode - low));
        fall = Math.Sqrt((high - low) * (high - mode));
    }

    public static Marginal Of(Triangular stated)
    {
        if (stated.Low == stated.High)
            return new ConstantMarginal(stated.Mode);
        var (low, high) = OuterLimits.Of(stated);
        return new TriangularMarginal(low, stated.Mode, high);
    }

    public override double Quantile(double p) => p <= modeProbability ? low + Math.Sqrt(p) * rise : high - Math.Sqrt(1 - p) * fall;

    public override double BaseValue => mode;

    public override double Mean => low + ((mode - low) + (high - low)) / 3;

    /// <summary>(a² + m² + b² − am − ab − mb)/18, written with differences from the low end.</summary>
    public override double Variance
    {
        get
        {
            var (m, b) = (mode - low, high - low);
            return (m * m + b * b - m * b) / 18;
        }
    }

    public override double Lowest => low;

    public override void Read(ReadOnlySpan<double> scores, Span<double> values) =>
        PieceRows.Read(new AtScore(low, high, modeScore, rise, fall, RootPhi), scores, values);

    private readonly ref struct AtScore(
        double low, double high, double modeScore, double rise, double fall, ReadOnlySpan<double> pieces) : IPiecewise
    {
        private readonly ReadOnlySpan<double> pieces = pieces;

        [MethodImpl(MethodImplOptions.AggressiveInlining)]
        public Vector512<double> Within(Vector512<double> scores)
        {
            var left = Left(scores);
            return At(left, ScorePieces.At(pieces, Vector512.ConditionalSelect(left, scores, -scores)));
        }

        public Vector512<double> Everywhere(Vector512<double> scores, Vector512<double> beyond)
        {
            var left = Left(scores);
            var exact = Vector512.Sqrt(default(NormalCdf).At(Vector512.ConditionalSelect(left, scores, -scores)));
            return Vector512.ConditionalSelect(beyond, At(left, exact), Within(scores));
        }

        [MethodImpl(MethodImplOptions.AggressiveInlining)]
        private Vector512<double> Left(Vector512<double> scores) => Vector512.LessThanOrEqual(scores, Vector512.Create(modeScore));

        [MethodImpl(MethodImplOptions.AggressiveInlining)]
        private Vector512<double> At(Vector512<double> left, Vector512<double> root) => Wide.Fused(
            root,
            Vector512.ConditionalSelect(left, Vector512.Create(rise), Vector512.Create(-fall)),
            Vector512.ConditionalSelect(left, Vector512.Create(low), Vector512.Create(high)));
    }
}
