using Portfolio.Model.Distributions;

namespace Portfolio.Engine.Distributions;

/// <summary>What only arithmetic can tell of a statement whose members are already known to be in order.</summary>
public static class MarginalCheck
{
    /// <summary>Why the statement has no marginal, as a sentence; null when it has one.</summary>
    public static string? Fault(Distribution stated) => stated switch
    {
        Triangular d when d.Low != d.High && !Usable(OuterLimits.Of(d)) => NoLimits,
        Pert d when d.Low != d.High && !Usable(OuterLimits.Of(d)) => NoLimits,
        Normal d when Marginal.Of(d) is TruncatedNormalMarginal { Held: <= 0 } =>
            "The bounds lie so far from the mean that the distribution has no probability between them.",
        Normal { Sd: 0 } d when d.Mean < d.Min || d.Mean > d.Max => "The mean lies outside the bounds and nothing varies.",
        LognormalByPercentiles or LognormalByMoments when !double.IsFinite(Marginal.Of(stated).Variance) =>
            "The range is too wide: the variance is not a finite number.",
        _ => null,
    };

    /// <summary>The least value that a draw can take, −∞ for a normal without lower bound; ends stated as percentiles reach below their low.</summary>
    public static double Lowest(Distribution stated) => stated switch
    {
        Triangular d when d.Low != d.High => OuterLimits.Of(d).Low,
        Pert d when d.Low != d.High => OuterLimits.Of(d).Low,
        _ => Marginal.Of(stated).Lowest,
    };

    private const string NoLimits = "No outer limits give the stated percentiles with this mode.";

    private static bool Usable((double Low, double High) limits) =>
        double.IsFinite(limits.Low) && double.IsFinite(limits.High) && limits.Low < limits.High;
}
