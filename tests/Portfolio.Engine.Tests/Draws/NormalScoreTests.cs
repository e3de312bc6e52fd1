using Portfolio.Engine.Draws;
using Xunit;

namespace Portfolio.Engine.Tests.Draws;

public sealed class NormalScoreTests
{
    // .25, .001 and 1e-20: test values published with AS 241 (Wichura 1988); all: mpmath 1.2.1, 40 digits.
    [Theory]
    [InlineData(1e-300, -37.047096299361199237)]
    [InlineData(1e-100, -21.273453560965324294)]
    [InlineData(1e-20, -9.2623400897984075796)]
    [InlineData(5.551115123125783e-17, -8.2923610758135955382)]
    [InlineData(1e-12, -7.0344838253011319326)]
    [InlineData(1.4e-11, -6.6567230915181836356)]
    [InlineData(1e-10, -6.3613409024040561991)]
    [InlineData(1e-6, -4.7534243088228989573)]
    [InlineData(0.001, -3.0902323061678135354)]
    [InlineData(0.0749, -1.4402382675279636631)]
    [InlineData(0.0751, -1.4388253927525399824)]
    [InlineData(0.25, -0.6744897501960817432)]
    [InlineData(0.4, -0.25334710313579974132)]
    [InlineData(0.75, 0.67448975019608174)]
    [InlineData(0.9, 1.28155156554460047)]
    [InlineData(0.975, 1.95996398454005424)]
    [InlineData(0.99, 2.32634787404084110)]
    public void Inverse_agrees_with_published_values(double u, double score) =>
        Assert.InRange(NormalScore.Inverse(u) / score - 1, -1e-15, 1e-15);

    [Fact]
    public void The_median_scores_0() => Assert.Equal(0, NormalScore.Inverse(0.5));

    // mpmath 1.2.1: erfc(−z/√2)/2 with 40 digits.
    [Theory]
    [InlineData(-37, 5.7255712225245768227e-300)]
    [InlineData(-20, 2.7536241186062336951e-89)]
    [InlineData(-8.3, 5.2055697448902540246e-17)]
    [InlineData(-8, 6.2209605742717841235e-16)]
    [InlineData(-6.5, 4.0160005838591178083e-11)]
    [InlineData(-5, 2.8665157187919391167e-7)]
    [InlineData(-3, 0.0013498980316300945267)]
    [InlineData(-2, 0.0227501319481792072)]
    [InlineData(-1, 0.15865525393145705141)]
    [InlineData(-0.5, 0.30853753872598689636)]
    [InlineData(-0.1, 0.46017216272297101633)]
    [InlineData(0, 0.5)]
    [InlineData(0.3, 0.61791142218895263307)]
    [InlineData(1.7, 0.95543453724145695634)]
    [InlineData(4, 0.99996832875816688008)]
    [InlineData(8.1, 0.9999999999999997252)]
    public void Phi_agrees_with_published_values(double z, double u) =>
        Assert.InRange(NormalScore.Phi(z) / u - 1, -2e-15, 2e-15);

    [Fact]
    public void Phi_undoes_the_inverse()
    {
        for (var u = 1e-15; u < 0.999; u = u < 0.01 ? u * 1.31 : u + 0.0137)
            Assert.InRange(NormalScore.Phi(NormalScore.Inverse(u)) / u - 1, -4e-14, 4e-14); // an error ε of z is one of z²·ε in Φ
    }

    // Each number alone, and in every place of a span of every length up to three registers: the same bits.
    [Fact]
    public void A_number_gives_the_same_bits_in_every_place()
    {
        var u = new double[24];
        Uniforms.Fill(3, 4, 0, u);
        (u[5], u[14]) = (1e-13, 1 - 1e-13);
        for (var length = 0; length <= u.Length; length++)
        {
            var (scores, back) = (new double[length], new double[length]);
            NormalScore.Inverse(u.AsSpan(0, length), scores);
            NormalScore.Phi(scores, back);
            for (var i = 0; i < length; i++)
            {
                Assert.Equal(NormalScore.Inverse(u[i]), scores[i]);
                Assert.Equal(NormalScore.Phi(scores[i]), back[i]);
            }
        }
    }

    // Three of the draws are compared bit by bit in whichever way this process runs; run.sh repeats the suite with narrower registers.
    [Fact]
    public void First_scores_of_a_seed_are_pinned()
    {
        var scores = new double[4096];
        NormalScore.Fill(1, DrawKey.Hash("portfolio"), 0, scores);
        var (sum, squares) = (0UL, 0.0);
        foreach (var score in scores)
        {
            sum = sum * 6364136223846793005 + (ulong)BitConverter.DoubleToInt64Bits(score);
            squares += score * score;
        }

        Assert.Equal(3778439949082508397UL, sum);
        Assert.InRange(squares / scores.Length, 1 - 4 * Math.Sqrt(2.0 / 4096), 1 + 4 * Math.Sqrt(2.0 / 4096));
    }
}
