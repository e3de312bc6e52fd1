namespace Portfolio.Model.Distributions;

/// <summary>
/// An uncertain quantity as it was stated: a duration in working days, an amount of money or a factor, depending on where it stands.
/// A statement only; quantiles, means and base values are the engine's. Percentages are 0–100, as in the document.
/// Immutable and compared by value, except that lists compare by reference.
/// </summary>
public abstract record Distribution
{
    private protected Distribution() { }
}

/// <summary>A certain value; a plain number in the document.</summary>
public sealed record Constant(double Value) : Distribution;

/// <summary>Every value between <paramref name="Low"/> and <paramref name="High"/> equally likely.</summary>
public sealed record Uniform(double Low, double High) : Distribution;

/// <summary>
/// Triangular; <paramref name="LowPercentile"/> and <paramref name="HighPercentile"/> say what the ends mean (0 and 100: outer limits).
/// </summary>
public sealed record Triangular(double Low, double Mode, double High, double LowPercentile = 0, double HighPercentile = 100) : Distribution;

/// <summary>
/// Beta between two ends with α = 1 + w(mode−low)/(high−low), β = 1 + w(high−mode)/(high−low), w = <paramref name="Weight"/>.
/// </summary>
public sealed record Pert(
    double Low, double Mode, double High, double Weight = 4, double LowPercentile = 0, double HighPercentile = 100) : Distribution;

/// <summary>
/// Normal, truncated to [<paramref name="Min"/>, <paramref name="Max"/>] where given; the mean and sd are those before truncation.
/// </summary>
public sealed record Normal(double Mean, double Sd, double? Min = null, double? Max = null) : Distribution;

/// <summary>Lognormal by the mean and standard deviation of the quantity itself (not of its logarithm).</summary>
public sealed record LognormalByMoments(double Mean, double Sd) : Distribution;

/// <summary>Lognormal by two of its percentiles.</summary>
public sealed record LognormalByPercentiles(double Low, double High, double LowPercentile, double HighPercentile) : Distribution;

/// <summary>One of finitely many values; probabilities sum to 1 within 1e-9.</summary>
public sealed record Discrete(IReadOnlyList<Outcome> Outcomes) : Distribution;

/// <summary>A value of a <see cref="Discrete"/> distribution and its probability, 0–1.</summary>
public readonly record struct Outcome(double Value, double Probability);

/// <summary>Cumulative curve through points, straight between them; first at 0 %, last at 100 %.</summary>
public sealed record Percentiles(IReadOnlyList<PercentilePoint> Points) : Distribution;

/// <summary>The value not exceeded with <paramref name="P"/> percent probability.</summary>
public readonly record struct PercentilePoint(double P, double Value);

/// <summary>
/// Stands where a distribution was sent that could not be read. Its faults are already known, so rules pass over it; no valid document
/// holds one.
/// </summary>
public sealed record Unreadable : Distribution
{
    public static readonly Unreadable Instance = new();
}
