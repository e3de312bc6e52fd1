using Portfolio.Engine.Distributions;
using Portfolio.Engine.Draws;
using Portfolio.Model.Distributions;
using Xunit;

namespace Portfolio.Engine.Tests.Distributions;

/// <summary>What is read at a score against the exact quantile at Φ(score), densely over all scores that draws can reach.</summary>
public sealed class ReadTests
{
    public static TheoryData<Distribution> Closed =>
    [
        new Constant(3), new Normal(10, 3),
        new LognormalByMoments(100, 30), new LognormalByPercentiles(80, 150, 10, 90),
        new Percentiles([new(0, 80), new(10, 90), new(50, 100), new(90, 130), new(100, 160)]),
        new Percentiles([.. Enumerable.Range(0, 41).Select(i => new PercentilePoint(2.5 * i, i * i))]),
    ];

    public static TheoryData<Distribution> InPieces =>
    [
        new Uniform(2, 9), new Triangular(2, 5, 14), new Triangular(0, 0, 10), new Triangular(0, 10, 10), new Triangular(10, 12, 20, 10, 90),
        new Triangular(0, 1e-6, 1), new Triangular(-5, -4.999, 3),
    ];

    [Theory]
    [MemberData(nameof(InPieces))]
    public void Pieces_keep_their_stated_error(Distribution stated)
    {
        var marginal = Marginal.Of(stated);
        var range = marginal.Quantile(1 - 1e-12) - marginal.Quantile(1e-12);
        var scores = Scores(-8.2, 8.2, 0.00137);
        var values = new double[scores.Length];
        marginal.Read(scores, values);
        for (var i = 0; i < scores.Length; i++)
        {
            var exact = marginal.Quantile(NormalScore.Phi(scores[i]));
            Assert.InRange(values[i], exact - 1e-7 * range, exact + 1e-7 * range);
        }
    }

    [Theory]
    [InlineData(0.0, null)]
    [InlineData(null, 12.0)]
    [InlineData(14.0, 16.0)]
    [InlineData(-3.0, 4.0)]
    [InlineData(-10.0, 30.0)]
    [InlineData(-5.0, 27.0)]
    [InlineData(-7.5, null)]
    [InlineData(-30.0, 45.0)]
    [InlineData(60.0, null)]
    [InlineData(-90.0, -60.0)]
    [InlineData(9.999, 10.001)]
    public void Truncated_normal_pieces_keep_their_stated_error(double? min, double? max)
    {
        var marginal = Marginal.Of(new Normal(10, 5, min, max));
        var range = marginal.Quantile(0.999) - marginal.Quantile(0.001);
        var scores = Scores(-7, 7, 0.00137);
        var values = new double[scores.Length];
        marginal.Read(scores, values);
        for (var i = 0; i < scores.Length; i++)
        {
            var p = NormalScore.Phi(scores[i]);
            var blur = Math.Abs(marginal.Quantile(p) - marginal.Quantile(p * (1 - 2e-16)));
            Assert.InRange(values[i], marginal.Quantile(p) - 1e-6 * range - 4 * blur, marginal.Quantile(p) + 1e-6 * range + 4 * blur);
        }
    }

    [Fact]
    public void Many_outcomes_change_at_their_cumulative_probability()
    {
        var scores = Scores(-5, 5, 0.0037);
        foreach (var count in new[] { 2, 3, 24, 25, 100 })
        {
            var marginal = Marginal.Of(new Discrete([.. Enumerable.Range(0, count).Select(i => new Outcome(i, 1.0 / count))]));
            var values = new double[scores.Length];
            marginal.Read(scores, values);
            for (var i = 0; i < scores.Length; i++)
                Assert.Equal(Math.Floor(NormalScore.Phi(scores[i]) * count), values[i]);
        }
    }

    // A row with scores beyond the pieces, of a length that no register divides, in place: each value as if it stood alone.
    [Fact]
    public void Neighbours_do_not_matter()
    {
        double[] scores = [.. Scores(-0.9, 0.9, 0.05), -3.999, 3.999, 0.1, 0.2, 5, .. Scores(-8.2, 8.2, 0.77), 12, -12, 0.3];
        foreach (var stated in InPieces.Select(row => row.Data).Append(new Pert(2, 5, 14)).Append(new Pert(2, 5, 14, 7.3)).Append(new Normal(10, 5, 0)))
        {
            var marginal = Marginal.Of(stated);
            var (values, single) = (scores.ToArray(), new double[1]);
            marginal.Read(values, values);
            for (var i = 0; i < scores.Length; i++)
            {
                marginal.Read([scores[i]], single);
                Assert.Equal(single[0], values[i]);
            }
        }
    }

    [Theory]
    [MemberData(nameof(Closed))]
    public void Closed_forms_agree_to_rounding(Distribution stated)
    {
        var marginal = Marginal.Of(stated);
        var scores = Scores(-8.2, 8.2, 0.0137);
        var values = new double[scores.Length];
        marginal.Read(scores, values);
        for (var i = 0; i < scores.Length; i++)
        {
            // Above the median p itself is the less exact of the two: one rounding of p is worth this much of the value.
            var p = NormalScore.Phi(scores[i]);
            var blur = p < 1 - 1e-13 ? Math.Abs(marginal.Quantile(p) - marginal.Quantile(p * (1 - 1e-15))) : double.PositiveInfinity;
            Assert.InRange(values[i], marginal.Quantile(p) - blur - 1e-12, marginal.Quantile(p) + blur + 1e-12);
            Assert.True(i == 0 || values[i] >= values[i - 1] - 1e-13);
        }
    }

    [Fact]
    public void Discrete_values_change_at_their_cumulative_probability()
    {
        var marginal = Marginal.Of(new Discrete([new(0, 0.7), new(10, 0.2), new(50, 0.1)]));
        var values = new double[6];
        marginal.Read([-8, 0.5244, 0.52441, 1.2815, 1.2816, 8], values); // 0.5244005 and 1.2815516
        Assert.Equal([0, 0, 10, 10, 50, 50], values);
    }

    [Fact]
    public void Spans_of_probabilities_agree_with_single_ones()
    {
        var p = new double[257];
        Uniforms.Fill(5, 6, 0, p);
        foreach (var stated in Closed.Concat(InPieces).Select(row => row.Data).Append(new Pert(2, 5, 14)).Append(new Discrete([new(0, 0.7), new(10, 0.3)])))
        {
            var marginal = Marginal.Of(stated);
            var values = p.ToArray();
            marginal.Quantile(values, values);
            for (var i = 0; i < p.Length; i++)
                Assert.InRange(values[i], marginal.Quantile(p[i]) - 1e-5, marginal.Quantile(p[i]) + 1e-5);
        }
    }

    [Theory]
    [InlineData(0.5)]
    [InlineData(0.3)]
    [InlineData(1)]
    [InlineData(2.7)]
    [InlineData(4)]
    [InlineData(4.5)]
    [InlineData(10)]
    [InlineData(20)]
    [InlineData(50)]
    [InlineData(400)]
    public void Pert_pieces_keep_their_stated_error(double weight)
    {
        foreach (var mode in (double[])[0, 1e-9, 0.003, 0.05, 0.137, 0.2500001, 0.5, 0.77, 0.991, 1])
        {
            var marginal = Marginal.Of(new Pert(0, mode, 1, weight));
            var range = marginal.Quantile(0.999) - marginal.Quantile(0.001);
            var scores = Scores(-8.2, 8.2, 0.0171);
            var values = new double[scores.Length];
            marginal.Read(scores, values);
            for (var i = 0; i < scores.Length; i++)
            {
                var exact = Exact(weight, mode, scores[i]);
                var error = Math.Abs(values[i] - exact) / range;
                Assert.True(error <= 1e-7, $"weight {weight}, mode {mode}, score {scores[i]}: error {error:g3}");
                Assert.InRange(values[i], 0, 1);
            }
        }
    }

    private static double Exact(double weight, double mode, double z) =>
        new RegularisedBeta(1 + weight * mode, 1 + weight * (1 - mode)).Quantile(NormalScore.Phi(z), NormalScore.Phi(-z));

    private static double[] Scores(double from, double to, double step) =>
        [.. Enumerable.Range(0, (int)((to - from) / step)).Select(i => from + i * step)];
}
