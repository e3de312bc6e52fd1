using Portfolio.Engine.Draws;

namespace Portfolio.Engine.Distributions;

/// <summary>
/// The beta distribution function I_x(α, β), α, β ≥ 1, and its inverse, from +, −, ×, ÷ and our own logarithm, so that tables built on it
/// are the same
/// on every processor. Continued fraction: NIST Digital Library of Mathematical Functions, 8.17.22.
/// </summary>
internal readonly struct RegularisedBeta(double alpha, double beta)
{
    private const int MaximumTerms = 100_000, MaximumSteps = 200;

    private readonly double logBeta = LogGamma(alpha) + LogGamma(beta) - LogGamma(alpha + beta);

    /// <summary>
    /// The x with I_x = <paramref name="lower"/>; <paramref name="upper"/> = 1 − lower, given apart so that either tail keeps its digits.
    /// Error below 10⁻¹² of x or of 1 − x, whichever is worked, for α + β up to some hundreds.
    /// </summary>
    public double Quantile(double lower, double upper) =>
        lower <= upper ? LowerQuantile(alpha, beta, Elementary.Log(lower)) : 1 - LowerQuantile(beta, alpha, Elementary.Log(upper));

    /// <summary>The quantile at Φ(<paramref name="score"/>).</summary>
    public double QuantileAt(double score) => Quantile(NormalScore.Phi(score), NormalScore.Phi(-score));

    /// <summary>
    /// Newton's method for ln I as a function of s = ln x. The density of s is log-concave for β ≥ 1, hence ln I is concave in s and the
    /// steps rise to
    /// the root from the left without overshooting; they start where the bound I ≤ x^α/(α·B) meets the target.
    /// </summary>
    private double LowerQuantile(double a, double b, double target)
    {
        var s = Math.Min((target + Elementary.Log(a) + logBeta) / a, 0);
        var x = Elementary.Exp(s);
        for (var step = 0; step < MaximumSteps && x < 1; step++)
        {
            var (log, slope) = LogLower(a, b, x, s);
            var change = (target - log) / slope;
            s += change;
            var next = Elementary.Exp(s);
            if (Math.Abs(change) < 1e-14 || next == x)
                return Math.Min(next, 1);
            x = next;
        }

        return Math.Min(x, 1);
    }

    /// <summary>ln I_x(a, b) and its derivative with respect to ln x = <paramref name="s"/>.</summary>
    private (double Log, double Slope) LogLower(double a, double b, double x, double s)
    {
        var y = 1 - x;
        var front = a * s + b * Elementary.Log(y) - logBeta;
        if (x < (a + 1) / (a + b + 2))
        {
            var fraction = Fraction(a, b, x);
            return (front - Elementary.Log(a * fraction), a * fraction / y);
        }

        var density = Elementary.Exp(front);
        var lower = 1 - density / (b * Fraction(b, a, y));
        return (Elementary.Log(lower), density / (y * lower));
    }

    /// <summary>1 + d₁/(1 + d₂/(1 + …)) by Lentz's method.</summary>
    private static double Fraction(double a, double b, double x)
    {
        var (value, numerator, denominator) = (1.0, 1.0, 0.0);
        for (var k = 1; k < MaximumTerms; k++)
        {
            var m = k / 2;
            var term = (k & 1) == 0
                ? m * (b - m) * x / ((a + k - 1) * (a + k))
                : -(a + m) * (a + b + m) * x / ((a + k - 1) * (a + k));
            denominator = 1 / (1 + term * denominator);
            numerator = 1 + term / numerator;
            var factor = numerator * denominator;
            value *= factor;
            if (Math.Abs(factor - 1) < 3e-16)
                break;
        }

        return value;
    }

    /// <summary>ln Γ(x), x ≥ 1: Stirling's series (DLMF 5.11.1) from 10 on, the recurrence below.</summary>
    private static double LogGamma(double x)
    {
        var product = 1.0;
        for (; x < 10; x++)
            product *= x;
        var r = 1 / (x * x);
        var series = (
            1.0 / 12 - r * (1.0 / 360 - r * (1.0 / 1260 - r * (1.0 / 1680 - r * (1.0 / 1188 - r * (691.0 / 360360 - r / 156)))))) / x;
        return (x - 0.5) * Elementary.Log(x) - x + 0.91893853320467274178 + series - Elementary.Log(product);
    }
}
