using Portfolio.Model.Distributions;

namespace Portfolio.Engine.Distributions;

/// <summary>
/// The outer limits of a range whose ends were stated as percentiles. With t the mode's place between the limits (0…1) and q(t, p) the
/// quantile of that shape on [0, 1], the two statements hold when (t − q(t, p_low))(high − mode) = (q(t, p_high) − t)(mode − low);
/// the left side less the right is ≤ 0 at t = 0 and ≥ 0 at t = 1, so that a root is bracketed.
/// </summary>
internal static class OuterLimits
{
    private const int MaximumSteps = 200;

    public static (double Low, double High) Of(Triangular stated) =>
        Of(stated.Low, stated.Mode, stated.High, stated.LowPercentile, stated.HighPercentile, UnitTriangular);

    public static (double Low, double High) Of(Pert stated) =>
        Of(stated.Low, stated.Mode, stated.High, stated.LowPercentile, stated.HighPercentile, (t, p) => UnitPert(stated.Weight, t, p));

    private static (double Low, double High) Of(
        double low, double mode, double high, double lowPercentile, double highPercentile, Func<double, double, double> quantile)
    {
        if (lowPercentile == 0 && highPercentile == 100)
            return (low, high);
        var (from, to) = (lowPercentile / 100, highPercentile / 100);
        var place = (mode - low) / (high - low);
        var t = Root(t => (t - quantile(t, from)) * (1 - place) - (quantile(t, to) - t) * place);
        var width = place <= 0.5 ? (high - mode) / (quantile(t, to) - t) : (mode - low) / (t - quantile(t, from));
        return (lowPercentile == 0 ? low : mode - t * width, highPercentile == 100 ? high : mode + (1 - t) * width);
    }

    private static double UnitTriangular(double mode, double p) =>
        p < mode ? Math.Sqrt(p * mode) : 1 - Math.Sqrt((1 - p) * (1 - mode));

    private static double UnitPert(double weight, double mode, double p) =>
        p <= 0 ? 0 : p >= 1 ? 1 : new RegularisedBeta(1 + weight * mode, 1 + weight * (1 - mode)).Quantile(p, 1 - p);

    /// <summary>Root in [0, 1] of a function that is ≤ 0 at 0 and ≥ 0 at 1: false position with the Illinois weights, halving when that is slow.</summary>
    private static double Root(Func<double, double> f)
    {
        var (a, b, fa, fb) = (0.0, 1.0, f(0), f(1));
        if (fa >= 0)
            return 0;
        if (fb <= 0)
            return 1;
        var side = 0;
        for (var step = 0; step < MaximumSteps && b - a > 1e-15; step++)
        {
            var x = step % 8 == 7 ? (a + b) / 2 : (a * fb - b * fa) / (fb - fa);
            if (x <= a || x >= b)
                x = (a + b) / 2;
            var fx = f(x);
            if (Math.Abs(fx) < 1e-15)
                return x;
            if (fx < 0)
            {
                (a, fa) = (x, fx);
                fb = side < 0 ? fb / 2 : fb;
                side = -1;
            }
            else
            {
                (b, fb) = (x, fx);
                fa = side > 0 ? fa / 2 : fa;
                side = 1;
            }
        }

        return (a + b) / 2;
    }
}
