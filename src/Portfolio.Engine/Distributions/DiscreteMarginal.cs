using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using Portfolio.Engine.Draws;
using Portfolio.Model.Distributions;

namespace Portfolio.Engine.Distributions;

/// <summary>One of finitely many values: at p the smallest x with F(x) ≥ p. The last cumulative probability counts as exactly 1.</summary>
internal sealed class DiscreteMarginal : Marginal
{
    private const int FewOutcomes = 24; // up to here comparing with each threshold is quicker than a search

    private readonly double[] values, cumulative, thresholds;

    private DiscreteMarginal(double[] values, double[] cumulative, double likeliest, double mean, double variance)
    {
        (this.values, this.cumulative) = (values, cumulative);
        (BaseValue, Mean, Variance) = (likeliest, mean, variance);
        thresholds = new double[cumulative.Length];
        NormalScore.Inverse(cumulative.AsSpan(..^1), thresholds);
        thresholds[^1] = double.PositiveInfinity;
    }

    public static Marginal Of(Discrete stated)
    {
        var possible = stated.Outcomes.Where(o => o.Probability > 0).OrderBy(o => o.Value).ToArray(); // stable
        if (possible.Length == 1)
            return new ConstantMarginal(possible[0].Value);
        var cumulative = new double[possible.Length];
        var (sum, mean, variance) = (0m, 0.0, 0.0); // decimal: .7 + .2 must be .9, not a little less
        for (var i = 0; i < possible.Length; i++)
        {
            sum += (decimal)possible[i].Probability;
            cumulative[i] = Math.Min((double)sum, Uniforms.Greatest);
            mean += possible[i].Probability * possible[i].Value;
        }

        cumulative[^1] = 1;
        foreach (var outcome in possible)
            variance += outcome.Probability * (outcome.Value - mean) * (outcome.Value - mean);
        var likeliest = stated.Outcomes.MaxBy(o => o.Probability).Value; // the first of equals
        return new DiscreteMarginal(Array.ConvertAll(possible, o => o.Value), cumulative, likeliest, mean, variance);
    }

    public override double Quantile(double p) => values[FirstAtLeast(cumulative, p)];

    public override double BaseValue { get; }

    public override double Mean { get; }

    public override double Variance { get; }

    public override double Lowest => values[0];

    public override void Read(ReadOnlySpan<double> scores, Span<double> values)
    {
        if (this.values.Length <= FewOutcomes)
        {
            Wide.Map(new OfFew(this.values, thresholds), scores, values);
            return;
        }
        for (var i = 0; i < scores.Length; i++)
            values[i] = this.values[FirstAtLeast(thresholds, scores[i])];
    }

    /// <summary>
    /// Halves the range without branches on the data; the last of the sorted numbers is never below <paramref name="x"/>.
    /// </summary>
    private static int FirstAtLeast(double[] sorted, double x)
    {
        var (first, length) = (0, sorted.Length);
        while (length > 1)
        {
            var half = length >> 1;
            first = sorted[first + half - 1] < x ? first + half : first;
            length -= half;
        }

        return first;
    }

    // Goes through all outcomes: of the thresholds below the score the last decides.
    private readonly struct OfFew(double[] values, double[] thresholds) : IWideFunction
    {
        [MethodImpl(MethodImplOptions.AggressiveInlining)]
        public Vector512<double> At(Vector512<double> x)
        {
            var value = Vector512.Create(values[0]);
            for (var i = 1; i < values.Length; i++)
                value = Vector512.ConditionalSelect(Vector512.LessThan(Vector512.Create(thresholds[i - 1]), x), Vector512.Create(values[i]), value);
            return value;
        }
    }
}
