namespace Portfolio.Engine.Distributions;

/// <summary>
/// The shape of a PERT on [0, 1]: its weight and its mode's place t. What it gives depends on these two alone, whatever else the document
/// holds. Shapes of a common weight come from that weight's <see cref="PertFamily"/> and keep no table; the rest keep their pieces (0.8 KB).
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
        return new PertShape(null, ScorePieces.Of(Exact(weight, place)), place);
    }

    /// <summary>Pieces of offset + scale·x, x the value on [0, 1].</summary>
    public void WritePieces(double offset, double scale, Span<double> pieces)
    {
        if (family is null)
            own.CopyTo(pieces);
        else
            family.WritePieces(place, pieces);
        ScorePieces.Scale(offset, scale, pieces);
    }

    /// <summary>Exact quantiles of a shape by score.</summary>
    public static Func<double, double> Exact(double weight, double place) =>
        new RegularisedBeta(1 + weight * place, 1 + weight * (1 - place)).QuantileAt;
}
