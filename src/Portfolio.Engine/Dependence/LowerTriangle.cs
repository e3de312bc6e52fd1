namespace Portfolio.Engine.Dependence;

/// <summary>Cholesky factor of a correlation matrix that may be singular, row by row.</summary>
internal static class LowerTriangle
{
    /// <summary>
    /// Rows of L with L·Lᵀ = <paramref name="matrix"/>; row i has i + 1 numbers. A pivot at or below <paramref name="smallest"/> leaves its
    /// column
    /// empty: that node is determined by those before it.
    /// </summary>
    /// <param name="leastPivot">The smallest pivot met; well above 0 the matrix is positive definite.</param>
    public static double[][] Of(double[,] matrix, out double leastPivot, double smallest = 1e-12)
    {
        var n = matrix.GetLength(0);
        var rows = new double[n][];
        leastPivot = double.PositiveInfinity;
        for (var i = 0; i < n; i++)
        {
            var row = rows[i] = new double[i + 1];
            for (var j = 0; j < i; j++)
                row[j] = rows[j][j] == 0 ? 0 : (matrix[i, j] - Product(row, rows[j], j)) / rows[j][j];
            var pivot = matrix[i, i] - Product(row, row, i);
            leastPivot = Math.Min(leastPivot, pivot);
            row[i] = pivot > smallest ? Math.Sqrt(pivot) : 0;
        }

        return rows;
    }

    private static double Product(double[] left, double[] right, int count)
    {
        var sum = 0.0;
        for (var k = 0; k < count; k++)
            sum += left[k] * right[k];
        return sum;
    }
}
