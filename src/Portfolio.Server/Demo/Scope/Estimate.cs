using System.Globalization;
using Portfolio.Server.Contracts.Document;

namespace Portfolio.Server.Demo.Scope;

/// <summary>
/// Estimates in the short hand of the demo's tables: <c>20</c> (certain), <c>10 20</c> (uniform), <c>10 14 25</c> (PERT),
/// <c>triangular 10 14 25</c>, <c>triangular@10:90 …</c> or <c>pert@10:90 …</c> (the ends are percentiles), <c>normal 20 3</c>,
/// <c>lognormal 20 6</c>, <c>lognormal@10:90 15 30</c>, <c>discrete 0:0.7 15:0.3</c> (value:probability),
/// <c>percentiles 0:10 50:14 100:40</c> (p:value).
/// </summary>
internal static class Estimate
{
    private const Numbers Range = Numbers.Low | Numbers.Mode | Numbers.High;
    private const Numbers Ends = Numbers.LowPercentile | Numbers.HighPercentile;

    // The lists of the two types that carry one; the others are numbers only.
    private const string Outcomes = "discrete";
    private const string Points = "percentiles";

    public static DistributionJson Read(string text)
    {
        var words = text.Split(' ', StringSplitOptions.RemoveEmptyEntries);
        if (!char.IsLetter(words[0][0]))
            return Bare([.. words.Select(Number)]);
        var (type, ends) = words[0].Split('@') is [var named, var at] ? (named, Pair(at)) : (words[0], ((double, double)?)null);
        if (type is Outcomes or Points)
            return new DistributionJson(type, Numbers.None, [], [.. words[1..].Select(Pair)], []);
        double[] values = [.. words[1..].Select(Number)];
        var sent = (type, ends) switch
        {
            ("pert" or "triangular", _) => Range,
            ("lognormal", not null) => Numbers.Low | Numbers.High,
            _ => Numbers.Mean | Numbers.Sd,
        };
        if (type == "normal")
            return new DistributionJson(type, sent | Numbers.Min, [.. values, 0], null, []);
        return ends is var (low, high)
            ? new DistributionJson(type, sent | Ends, [.. values, low, high], null, [])
            : new DistributionJson(type, sent, values, null, []);
    }

    public static DistributionJson Pert(double low, double mode, double high) => new("pert", Range, [low, mode, high], null, []);

    public static DistributionJson Certain(double value) => new(null, Numbers.Value, [value], null, []);

    /// <summary>The value a planner would name when asked for one; what base plans are made of.</summary>
    public static double Middle(DistributionJson? estimate) => estimate switch
    {
        null => 0,
        { Type: Outcomes } => estimate.Pairs!.MaxBy(pair => pair.Second).First,
        { Type: Points } => Median(estimate.Pairs!),
        _ => estimate[Numbers.Value] ?? estimate[Numbers.Mode] ?? estimate[Numbers.Mean]
            // The middle of a uniform; of a lognormal given by its ends it is the geometric mean.
            ?? (estimate.Type == "uniform"
                ? (estimate[Numbers.Low] + estimate[Numbers.High]) / 2
                : Math.Sqrt(estimate[Numbers.Low]!.Value * estimate[Numbers.High]!.Value))!.Value,
    };

    public static DistributionJson Shifted(DistributionJson estimate, double by) =>
        by == 0 ? estimate : Mapped(estimate, value => value + by, sd => sd);

    /// <summary>Everything multiplied and rounded to so many digits.</summary>
    public static DistributionJson Scaled(DistributionJson estimate, double by, int digits) =>
        Mapped(estimate, value => Math.Round(value * by, digits), sd => Math.Round(sd * by, digits + 1));

    private static DistributionJson Mapped(DistributionJson estimate, Func<double, double> value, Func<double, double> sd)
    {
        if (estimate.Pairs is { } pairs)
        {
            var mapped = pairs.Select(pair =>
                estimate.Type == Points ? (pair.First, value(pair.Second)) : (value(pair.First), pair.Second));
            return new DistributionJson(estimate.Type, Numbers.None, [], [.. mapped], []);
        }
        double[] values =
        [
            .. Enum.GetValues<Numbers>().Where(number => (estimate.Sent & number) != 0).Select(number => number switch
            {
                Numbers.Sd => sd(estimate[number]!.Value),
                Numbers.LowPercentile or Numbers.HighPercentile or Numbers.Weight or Numbers.Min => estimate[number]!.Value,
                _ => value(estimate[number]!.Value),
            }),
        ];
        return new DistributionJson(estimate.Type, estimate.Sent, values, null, []);
    }

    private static DistributionJson Bare(double[] values) => values switch
    {
        [var value] => Certain(value),
        [_, _] => new DistributionJson("uniform", Numbers.Low | Numbers.High, values, null, []),
        _ => new DistributionJson("pert", Range, values, null, []),
    };

    private static double Median(IReadOnlyList<(double P, double Value)> points)
    {
        var upper = Enumerable.Range(1, points.Count - 1).First(index => points[index].P >= 50);
        var (below, above) = (points[upper - 1], points[upper]);
        return below.Value + ((above.Value - below.Value) * (50 - below.P) / (above.P - below.P));
    }

    private static (double, double) Pair(string text) =>
        text.Split(':') is [var first, var second] ? (Number(first), Number(second)) : throw new FormatException(text);

    private static double Number(string text) => double.Parse(text, CultureInfo.InvariantCulture);
}
