namespace Portfolio.Engine.Distributions;

/// <summary>A certain value; also what ranges of no width come to.</summary>
internal sealed class ConstantMarginal(double value) : Marginal
{
    public override double Quantile(double p) => value;

    public override double BaseValue => value;

    public override double Mean => value;

    public override double Variance => 0;

    public override double Lowest => value;

    public override void Read(ReadOnlySpan<double> scores, Span<double> values) => values[..scores.Length].Fill(value);
}
