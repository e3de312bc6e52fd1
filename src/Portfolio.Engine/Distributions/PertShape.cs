using Portfolio.Engine.Draws;

namespace Portfolio.Engine.Distributions;

/// <summary>
/// The shape of a PERT on [0, 1]: its weight and its mode's place t. What it gives depends on these two alone, whatever else the document
/// holds.
/// Shapes of a common weight come from that weight's <see cref="PertFamily"/> and keep no table; the rest keep their quantiles at the knots
/// (1 KB).
/// </summary>
internal readonly struct PertShape
{
    private readonly PertFamily? family;
    private readonly double[] own;
    private readonly double place;

    private PertShape(PertFamily? family, double[] own, double place) => (this.family, this.own, this.place) = (family, own, place);

    public static PertShape Of(double weight, double place)
    {
        if (PertFamily.Of(weight) is { } family)
            return new PertShape(family, [], place);
        var own = new double[ScorePieces.Knots];
        WriteQuantiles(weight, place, own);
        return new PertShape(null, own, place);
    }

    /// <summary>Pieces of offset + scale·x, x the value on [0, 1].</summary>
    public void WritePieces(double offset, double scale, Span<double> pieces)
    {
        if (family is null)
        {
            ScorePieces.Write(own, offset, scale, pieces);
            return;
        }

        Span<double> at = stackalloc double[ScorePieces.Knots];
        family.WriteQuantiles(place, at);
        ScorePieces.Write(at, offset, scale, pieces);
    }

    /// <summary>Exact quantiles of a shape at every knot.</summary>
    public static void WriteQuantiles(double weight, double place, Span<double> at)
    {
        var beta = new RegularisedBeta(1 + weight * place, 1 + weight * (1 - place));
        for (var k = 0; k < at.Length; k++)
            at[k] = beta.Quantile(NormalScore.Phi(ScorePieces.Knot(k)), NormalScore.Phi(-ScorePieces.Knot(k)));
    }
}
