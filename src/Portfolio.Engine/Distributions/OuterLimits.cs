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

    public static (double Low, double High) Of(Triangular stated)
    {
        var (from, to) = (stated.LowPercentile / 100, stated.HighPercentile / 100);
        return IsOuter(stated.LowPercentile, stated.HighPercentile)
            ? (stated.Low, stated.High)
            : Of(stated.Low, stated.Mode, stated.High, (from, t => UnitTriangular(t, from)), (to, t => UnitTriangular(t, to)));
    }

    public static (double Low, double High) Of(Pert stated) => IsOuter(stated.LowPercentile, stated.HighPercentile)
        ? (stated.Low, stated.High)
        : Of(stated.Low, stated.Mode, stated.High,
            (stated.LowPercentile / 100, PertCurve.Of(stated.Weight, stated.LowPercentile)),
            (stated.HighPercentile / 100, PertCurve.Of(stated.Weight, stated.HighPercentile)));

    private static bool IsOuter(double lowPercentile, double highPercentile) => lowPercentile == 0 && highPercentile == 100;

    private static (double Low, double High) Of(
        double low, double mode, double high, (double P, Func<double, double> At) from, (double P, Func<double, double> At) to)
    {
        var place = (mode - low) / (high - low);
        var t = Root(t => (t - from.At(t)) * (1 - place) - (to.At(t) - t) * place);
        var width = place <= 0.5 ? (high - mode) / (to.At(t) - t) : (mode - low) / (t - from.At(t));
        return (from.P == 0 ? low : mode - t * width, to.P == 1 ? high : mode + (1 - t) * width);
    }

    private static double UnitTriangular(double mode, double p) =>
        p < mode ? Math.Sqrt(p * mode) : 1 - Math.Sqrt((1 - p) * (1 - mode));

    /// <summary>
    /// Root in [0, 1] of a function that is ≤ 0 at 0 and ≥ 0 at 1: false position with the Illinois weights, halving when that is slow.
    /// </summary>
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
