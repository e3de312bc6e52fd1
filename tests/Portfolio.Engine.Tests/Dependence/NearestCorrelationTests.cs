using Portfolio.Engine.Dependence;
using Xunit;

namespace Portfolio.Engine.Tests.Dependence;

public sealed class NearestCorrelationTests
{
    private const double Close = 1e-8;

    // Higham, IMA J. Numer. Anal. 22(3), 2002: tridiag(−1, 2, −1); the four-decimal answer is also printed with NAG g02aa, twelve digits
    // from R 4.2.2, Matrix 1.5.3 nearPD.
    [Fact]
    public void Higham_four_by_four()
    {
        var x = NearestCorrelation.Of(new double[,] { { 2, -1, 0, 0 }, { -1, 2, -1, 0 }, { 0, -1, 2, -1 }, { 0, 0, -1, 2 } });
        Near([-0.808412498149, 0.191587501851, 0.106775049026, -0.656232694807, 0.191587501851, -0.808412498149], x);
    }

    // The 3 × 3 example of the same paper; digits computed with mpmath 1.2.1.
    [Fact]
    public void Higham_three_by_three() =>
        Near([0.7606898534, 0.1572981061, 0.7606898534], NearestCorrelation.Of(new double[,] { { 1, 1, 0 }, { 1, 1, 1 }, { 0, 1, 1 } }));

    // Turkay, Epperlein and Christofides 2003, as in higham/anderson-accel-ncm, commit 43edc726; digits computed with mpmath 1.2.1.
    [Fact]
    public void Turkay_four_by_four()
    {
        var a = new[,] { { 1, -0.55, -0.15, -0.10 }, { -0.55, 1, 0.90, 0.90 }, { -0.15, 0.90, 1, 0.90 }, { -0.10, 0.90, 0.90, 1 } };
        Near([-0.5363183448, -0.1548562005, -0.1070634013, 0.8886026056, 0.8834223545, 0.9058841105], NearestCorrelation.Of(a));
        var found = MatrixCheck.Contradiction(a, 4);
        Assert.NotNull(found);
        Assert.Equal(-0.0277586941, found.Value.Value, 1e-9);
    }

    // By hand: eigenvalues −.8, 1.9, 1.9; shrinking by t = .8/1.8 gives ±.5, here also the nearest (Higham, Strabić and Šego, SIAM Review
    // 58(2), 2016).
    [Fact]
    public void Three_that_cannot_be()
    {
        var a = new[,] { { 1, 0.9, 0.9 }, { 0.9, 1, -0.9 }, { 0.9, -0.9, 1 } };
        Assert.Equal(-0.8, MatrixCheck.Contradiction(a, 3)!.Value.Value, 1e-12);
        Near([0.5, 0.5, -0.5], NearestCorrelation.Of(a));
    }

    [Fact]
    public void What_is_a_correlation_matrix_stays()
    {
        var a = new[,] { { 1, 0.5, 0.3 }, { 0.5, 1, 0.2 }, { 0.3, 0.2, 1 } };
        Assert.Null(MatrixCheck.Contradiction(a, 3));
        Near([0.5, 0.3, 0.2], NearestCorrelation.Of(a));
    }

    // Three variables that are one and the same: eigenvalues 0, 0, 3.
    [Fact]
    public void A_singular_matrix_is_no_contradiction() =>
        Assert.Null(MatrixCheck.Contradiction(new double[,] { { 1, 1, -1 }, { 1, 1, -1 }, { -1, -1, 1 } }, 3));

    // Worked by hand: rows (1), (.5, √.75), (.3, .05/√.75, …).
    [Fact]
    public void Cholesky_rows()
    {
        var rows = LowerTriangle.Of(new[,] { { 1, 0.5, 0.3 }, { 0.5, 1, 0.2 }, { 0.3, 0.2, 1 } }, out var least);
        Assert.Equal([0.5, 0.8660254038], rows[1].Select(x => Math.Round(x, 10)));
        Assert.Equal([0.3, 0.0577350269, 0.9521904571], rows[2].Select(x => Math.Round(x, 10)));
        Assert.Equal(0.75, least, 1e-15);
    }

    // MathNet.Numerics 5.0.0's factor of the same matrix.
    [Fact]
    public void Cholesky_agrees_with_the_library()
    {
        var random = new MathNet.Numerics.Random.MersenneTwister(7, threadSafe: false);
        var factor = MathNet.Numerics.LinearAlgebra.Matrix<double>.Build.Dense(12, 14, (_, _) => random.NextDouble() - 0.4);
        var product = factor.TransposeAndMultiply(factor);
        var rows = LowerTriangle.Of(product.ToArray(), out _);
        var library = product.Cholesky().Factor;
        for (var i = 0; i < 12; i++)
        {
            for (var j = 0; j <= i; j++)
                Assert.Equal(library[i, j], rows[i][j], 1e-10);
        }
    }

    [Fact]
    public void A_determined_node_has_no_column_of_its_own()
    {
        var rows = LowerTriangle.Of(new[,] { { 1, -1, 0.6 }, { -1, 1, -0.6 }, { 0.6, -0.6, 1 } }, out _);
        Assert.Equal([-1, 0], rows[1]);
        Assert.Equal([0.6, 0, 0.8], rows[2]);
    }

    private static void Near(double[] upper, double[,] x)
    {
        var n = x.GetLength(0);
        var k = 0;
        for (var i = 0; i < n; i++)
        {
            Assert.Equal(1, x[i, i]);
            for (var j = i + 1; j < n; j++)
            {
                Assert.Equal(upper[k++], x[i, j], Close);
                Assert.Equal(x[i, j], x[j, i]);
            }
        }

        Assert.Null(MatrixCheck.Contradiction(x, n));
    }
}
