namespace Portfolio.Engine.Dependence;

/// <summary>
/// Rank (Spearman) correlation and the correlation of normal scores that gives it: r = 2·sin(πρ/6) (Pearson 1907; Kruskal, JASA 53, 1958).
/// </summary>
internal static class RankCorrelation
{
    public static double ToNormal(double rank) => Math.Abs(rank) >= 1 ? Math.Sign(rank) : 2 * Sine(Math.PI / 6 * rank);

    public static double FromNormal(double correlation) => 6 / Math.PI * Math.Asin(Math.Clamp(correlation, -1, 1) / 2);

    /// <summary>Taylor series on |x| ≤ π/6 up to x¹⁷/17!: the library's sine may differ in the last bit between processors.</summary>
    private static double Sine(double x)
    {
        var (square, sum) = (x * x, 1.0);
        for (var k = 16; k >= 2; k -= 2)
            sum = 1 - sum * square / (k * (k + 1));
        return x * sum;
    }
}
