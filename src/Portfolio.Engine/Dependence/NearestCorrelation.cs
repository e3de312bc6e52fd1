using MathNet.Numerics.LinearAlgebra;

namespace Portfolio.Engine.Dependence;

/// <summary>
/// The correlation matrix nearest to a symmetric matrix in the Frobenius norm, by alternating projections with Dykstra's correction:
/// Higham, "Computing the nearest correlation matrix", IMA Journal of Numerical Analysis 22(3), 2002, 329–343, algorithm 3.3. Its steps are
/// mixed
/// (<see cref="AndersonMixing"/>), which needs a fraction of them.
/// </summary>
internal static class NearestCorrelation
{
    private const int MaximumSteps = 20_000, MixedSteps = 1_000, Depth = 4;

    /// <summary>Symmetric, unit diagonal, no eigenvalue below rounding; within about 10⁻⁹ of the nearest.</summary>
    public static double[,] Of(double[,] matrix, double tolerance = 1e-12)
    {
        var n = matrix.GetLength(0);
        var build = Matrix<double>.Build;
        var mixing = new AndersonMixing(Depth);
        double[] point = [.. build.DenseOfArray(matrix).ToColumnMajorArray(), .. new double[n * n]]; // Y, then the correction
        for (var step = 0; ; step++)
        {
            var y = build.Dense(n, n, point[..(n * n)]);
            var r = y - build.Dense(n, n, point[(n * n)..]);
            var x = Positive(r);
            var next = x.Clone();
            next.SetDiagonal(Vector<double>.Build.Dense(n, 1.0));
            var corrected = x - r;
            var change = (next - y).FrobeniusNorm() + (corrected - (y - r)).FrobeniusNorm();
            if (change < tolerance * n || step == MaximumSteps)
                return UnitDiagonal(x);
            double[] image = [.. next.ToColumnMajorArray(), .. corrected.ToColumnMajorArray()];
            point = step < MixedSteps ? mixing.Next(point, image) : image;
        }
    }

    /// <summary>Nearest positive semi-definite matrix: negative eigenvalues set to 0.</summary>
    private static Matrix<double> Positive(Matrix<double> symmetric)
    {
        var evd = symmetric.Evd(Symmetricity.Symmetric);
        var scaled = evd.EigenVectors.Clone();
        for (var k = 0; k < scaled.ColumnCount; k++)
            scaled.SetColumn(k, scaled.Column(k) * Math.Max(evd.EigenValues[k].Real, 0));
        var x = scaled.TransposeAndMultiply(evd.EigenVectors);
        return (x + x.Transpose()) / 2;
    }

    /// <summary>The positive iterate with its diagonal, 1 but for the last step's change, scaled to 1 exactly; it stays positive.</summary>
    private static double[,] UnitDiagonal(Matrix<double> x)
    {
        var result = x.ToArray();
        for (var i = 0; i < x.RowCount; i++)
        {
            for (var j = 0; j < x.ColumnCount; j++)
                result[i, j] = i == j ? 1 : x[i, j] / Math.Sqrt(x[i, i] * x[j, j]);
        }

        return result;
    }
}
