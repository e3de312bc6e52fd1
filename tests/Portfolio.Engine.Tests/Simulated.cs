using Xunit;

namespace Portfolio.Engine.Tests;

/// <summary>Checks of simulated values against exact ones, within four standard errors.</summary>
internal static class Simulated
{
    private const double Width = 4; // standard errors
    private const double Minute = 1.0 / 1440; // times are whole minutes

    public static void Mean(double expected, double sd, double[] values)
    {
        var error = Width * sd / Math.Sqrt(values.Length) + Minute;
        Assert.InRange(values.Average(), expected - error, expected + error);
    }

    /// <summary>Standard deviation; its own error taken as that of a normal, widened by half for other shapes.</summary>
    public static void Sd(double expected, double[] values)
    {
        var mean = values.Average();
        var sd = Math.Sqrt(values.Average(x => (x - mean) * (x - mean)));
        var error = 1.5 * Width * expected / Math.Sqrt(2.0 * values.Length);
        Assert.InRange(sd, expected - error, expected + error);
    }

    /// <summary>
    /// A percentile, 0–100, of values in rising order: the expected value lies between the order statistics on either side.
    /// </summary>
    public static void Percentile(double level, double expected, double[] rising)
    {
        var (n, p) = (rising.Length, level / 100);
        var reach = Width * Math.Sqrt(n * p * (1 - p));
        var (low, high) = (rising[(int)(n * p - reach)], rising[(int)(n * p + reach)]);
        Assert.InRange(expected, low - Minute, high + Minute);
    }

    public static void Share(double expected, double share, int n)
    {
        var error = Width * Math.Sqrt(expected * (1 - expected) / n) + 1e-3 * Math.Sqrt(expected * (1 - expected));
        Assert.InRange(share, expected - error, expected + error);
    }
}
