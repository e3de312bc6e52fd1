using Portfolio.Model.Distributions;

namespace Portfolio.Engine.Distributions;

/// <summary>What only arithmetic can tell of a statement whose members are already known to be in order.</summary>
public static class MarginalCheck
{
    /// <summary>Why the statement has no marginal, as a sentence; null when it has one.</summary>
    /// <param name="lowest">
    /// The least value that a draw can take, −∞ for a normal without lower bound; ends stated as percentiles reach below their low. Means
    /// nothing beside a fault.
    /// </param>
    public static string? Fault(Distribution stated, out double lowest)
    {
        switch (stated)
        {
            case Triangular d when d.Low != d.High:
                return Judge(OuterLimits.Of(d), out lowest);
            case Pert d when d.Low != d.High:
                return Judge(OuterLimits.Of(d), out lowest);
            default:
                var marginal = Marginal.Of(stated);
                lowest = marginal.Lowest;
                return Fault(stated, marginal);
        }
    }

    /// <inheritdoc cref="Fault(Distribution, out double)"/>
    public static string? Fault(Distribution stated) => Fault(stated, out _);

    private static string? Fault(Distribution stated, Marginal marginal) => stated switch
    {
        Normal when marginal is TruncatedNormalMarginal { Held: <= 0 } =>
            "The bounds lie so far from the mean that the distribution has no probability between them.",
        Normal { Sd: 0 } d when d.Mean < d.Min || d.Mean > d.Max => "The mean lies outside the bounds and nothing varies.",
        LognormalByPercentiles or LognormalByMoments when !double.IsFinite(marginal.Variance) =>
            "The range is too wide: the variance is not a finite number.",
        _ => null,
    };

    private static string? Judge((double Low, double High) limits, out double lowest)
    {
        lowest = limits.Low;
        return double.IsFinite(limits.Low) && double.IsFinite(limits.High) && limits.Low < limits.High ? null : NoLimits;
    }

    private const string NoLimits = "No outer limits give the stated percentiles with this mode.";
}
