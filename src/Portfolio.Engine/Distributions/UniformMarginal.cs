using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using Portfolio.Engine.Draws;

namespace Portfolio.Engine.Distributions;

/// <summary>
/// Every value between two ends equally likely. At a score it is read from <see cref="ScorePieces"/>: error below 10⁻⁷ of the range (tested).
/// </summary>
internal sealed class UniformMarginal : Marginal
{
    private static readonly double[] Phi = ScorePieces.Of(NormalScore.Phi);

    private readonly double low, range;

    private UniformMarginal(double low, double range) => (this.low, this.range) = (low, range);

    public static Marginal Of(double low, double high) => low == high ? new ConstantMarginal(low) : new UniformMarginal(low, high - low);

    public override double Quantile(double p) => low + p * range;

    public override double BaseValue => low + range / 2;

    public override double Mean => low + range / 2;

    public override double Variance => range * range / 12;

    public override double Lowest => low;

    public override void Read(ReadOnlySpan<double> scores, Span<double> values) =>
        PieceRows.Read(new AtScore(low, range, Phi), scores, values);

    private readonly ref struct AtScore(double low, double range, ReadOnlySpan<double> pieces) : IPiecewise
    {
        private readonly ReadOnlySpan<double> pieces = pieces;

        [MethodImpl(MethodImplOptions.AggressiveInlining)]
        public Vector512<double> Within(Vector512<double> scores) => At(ScorePieces.At(pieces, scores));

        public Vector512<double> Everywhere(Vector512<double> scores, Vector512<double> beyond) =>
            Vector512.ConditionalSelect(beyond, At(default(NormalCdf).At(scores)), Within(scores));

        [MethodImpl(MethodImplOptions.AggressiveInlining)]
        private Vector512<double> At(Vector512<double> phi) => Wide.Fused(phi, Vector512.Create(range), Vector512.Create(low));
    }
}
