using MathNet.Numerics.LinearAlgebra;

namespace Portfolio.Engine.Dependence;

/// <summary>Whether a group's correlations can exist together.</summary>
internal static class MatrixCheck
{
    /// <summary>A pivot of this size shows without eigenvalues that a matrix is positive definite.</summary>
    private const double ClearlyPositive = 1e-6;

    /// <summary>
    /// The least eigenvalue and its vector when it is below −10⁻¹⁰·<paramref name="nodes"/>; otherwise null.
    /// </summary>
    public static (double Value, double[] Vector)? Contradiction(double[,] correlations, int nodes)
    {
        LowerTriangle.Of(correlations, out var leastPivot);
        if (leastPivot > ClearlyPositive)
            return null;
        var evd = Matrix<double>.Build.DenseOfArray(correlations).Evd(Symmetricity.Symmetric);
        var least = Enumerable.Range(0, evd.EigenValues.Count).MinBy(k => evd.EigenValues[k].Real);
        var value = evd.EigenValues[least].Real;
        return value < -1e-10 * nodes ? (value, evd.EigenVectors.Column(least).ToArray()) : null;
    }
}
