using Portfolio.Model.Distributions;

namespace Portfolio.Engine.Distributions;

/// <summary>
/// A stated distribution as the engine reads it. Values are read at normal scores: the value at score z is the quantile at Φ(z).
/// Units are those of the statement. Immutable, safe to share between threads.
/// </summary>
internal abstract class Marginal
{
    /// <summary>The smallest x with F(x) ≥ <paramref name="p"/>, 0 &lt; p &lt; 1; exact to rounding (PERT: 10⁻¹⁰ of the range).</summary>
    public abstract double Quantile(double p);

    /// <summary>The single value of the base plan; contract section 4, item 9.</summary>
    public abstract double BaseValue { get; }

    public abstract double Mean { get; }

    public abstract double Variance { get; }

    /// <summary>No draw lies below; −∞ where there is no bound.</summary>
    public abstract double Lowest { get; }

    /// <summary>Values at Φ(score) of each score; <paramref name="values"/> is at least as long and may be the same span.</summary>
    public abstract void Read(ReadOnlySpan<double> scores, Span<double> values);

    /// <summary>Values at probabilities, for draws that are not correlated; the spans may be the same.</summary>
    public virtual void Quantile(ReadOnlySpan<double> p, Span<double> values)
    {
        for (var i = 0; i < p.Length; i++)
            values[i] = Quantile(p[i]);
    }

    /// <summary>The marginal of a valid statement.</summary>
    /// <exception cref="ArgumentException">The statement has no marginal; <see cref="MarginalCheck"/> says why.</exception>
    public static Marginal Of(Distribution stated) => stated switch
    {
        Constant d => new ConstantMarginal(d.Value),
        Uniform d => UniformMarginal.Of(d.Low, d.High),
        Triangular d => TriangularMarginal.Of(d),
        Pert d => PertMarginal.Of(d),
        Normal d => NormalMarginal.Of(d),
        LognormalByMoments d => LognormalMarginal.Of(d),
        LognormalByPercentiles d => LognormalMarginal.Of(d),
        Discrete d => DiscreteMarginal.Of(d),
        Percentiles d => PercentilesMarginal.Of(d),
        _ => throw new ArgumentException($"{stated.GetType().Name} has no marginal.", nameof(stated)),
    };
}
