using MathNet.Numerics.LinearAlgebra;

namespace Portfolio.Engine.Dependence;

/// <summary>
/// Speeds up a fixed-point iteration x ← g(x) by mixing its last few steps so that their residuals cancel best: Anderson 1965, in the form
/// of Walker and Ni,
/// SIAM J. Numer. Anal. 49(4), 2011; for the nearest correlation matrix Higham and Strabić, Numerical Algorithms 72, 2016.
/// </summary>
internal sealed class AndersonMixing(int depth)
{
    private readonly List<(double[] Image, double[] Residual)> changes = [];
    private double[]? image, residual;

    /// <summary>The next point, from the last point and its image; both stay the caller's.</summary>
    public double[] Next(double[] point, double[] nextImage)
    {
        var nextResidual = Difference(nextImage, point);
        if (image is not null && residual is not null)
        {
            changes.Add((Difference(nextImage, image), Difference(nextResidual, residual)));
            if (changes.Count > depth)
                changes.RemoveAt(0);
        }

        (image, residual) = (nextImage, nextResidual);
        var next = (double[])nextImage.Clone();
        if (changes.Count == 0)
            return next;
        var shares = Shares(nextResidual);
        for (var j = 0; j < changes.Count; j++)
            Draws.Wide.AddScaled(-shares[j], changes[j].Image, next);
        return next;
    }

    /// <summary>Least squares of the residual on its changes, by normal equations held apart from singularity.</summary>
    private Vector<double> Shares(double[] target)
    {
        var gram = Matrix<double>.Build.Dense(changes.Count, changes.Count, (i, j) => Product(changes[i].Residual, changes[j].Residual));
        var right = Vector<double>.Build.Dense(changes.Count, i => Product(changes[i].Residual, target));
        for (var i = 0; i < changes.Count; i++)
            gram[i, i] = gram[i, i] * (1 + 1e-12) + double.Epsilon;
        return gram.Solve(right);
    }

    private static double[] Difference(double[] left, double[] right)
    {
        var difference = (double[])left.Clone();
        Draws.Wide.AddScaled(-1, right, difference);
        return difference;
    }

    private static double Product(double[] left, double[] right)
    {
        var sum = 0.0;
        for (var i = 0; i < left.Length; i++)
            sum += left[i] * right[i];
        return sum;
    }
}
