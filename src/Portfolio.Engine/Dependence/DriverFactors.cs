using System.Buffers;
using Portfolio.Engine.Distributions;
using Portfolio.Engine.Draws;
using Portfolio.Model.Documents;

namespace Portfolio.Engine.Dependence;

/// <summary>
/// What a driver multiplies durations and costs by; contract section 4, item 2. With score z it happens when Φ(z) &gt; 1 − p, that is Φ(−z)
/// &lt; p;
/// its factors are then the marginals at (Φ(z) − 1 + p)/p = 1 − Φ(−z)/p, otherwise 1.
/// </summary>
internal sealed class DriverFactors
{
    private readonly double probability;
    private readonly Marginal? duration, cost;

    public DriverFactors(Driver driver)
    {
        probability = driver.Probability;
        duration = driver.DurationFactor is { } d ? Marginal.Of(d) : null;
        cost = driver.CostFactor is { } c ? Marginal.Of(c) : null;
    }

    public bool ActsOnDurations => duration is not null;

    public bool ActsOnCosts => cost is not null;

    /// <summary>Factors, never below 0, of as many iterations as there are scores; the spans must not overlap.</summary>
    public void Read(ReadOnlySpan<double> scores, Span<double> durationFactors, Span<double> costFactors)
    {
        var rented = ArrayPool<double>.Shared.Rent(2 * scores.Length);
        var upper = rented.AsSpan(0, scores.Length);
        var within = rented.AsSpan(scores.Length, scores.Length);
        for (var i = 0; i < scores.Length; i++)
            upper[i] = -scores[i];
        NormalScore.Phi(upper, upper);
        if (probability >= 1)
            scores.CopyTo(within);
        else
            ScoreWithin(upper, within);
        Read(duration, upper, within, durationFactors[..scores.Length]);
        Read(cost, upper, within, costFactors[..scores.Length]);
        ArrayPool<double>.Shared.Return(rented);
    }

    /// <summary>
    /// The normal score of 1 − Φ(−z)/p, from the upper tail so that it keeps its digits; 0 where the driver does not happen.
    /// </summary>
    private void ScoreWithin(ReadOnlySpan<double> upper, Span<double> within)
    {
        for (var i = 0; i < upper.Length; i++)
            within[i] = upper[i] < probability ? Math.Min(upper[i] / probability, Uniforms.Greatest) : 0.5;
        NormalScore.Inverse(within, within);
        for (var i = 0; i < within.Length; i++)
            within[i] = -within[i];
    }

    private void Read(Marginal? marginal, ReadOnlySpan<double> upper, ReadOnlySpan<double> within, Span<double> factors)
    {
        if (marginal is null)
        {
            factors.Fill(1);
            return;
        }

        marginal.Read(within, factors);
        for (var i = 0; i < factors.Length; i++)
            factors[i] = probability >= 1 || upper[i] < probability ? Math.Max(factors[i], 0) : 1;
    }
}
