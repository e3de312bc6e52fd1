using Portfolio.Engine.Results;
using Xunit;

namespace Portfolio.Engine.Tests.Results;

public sealed class JointConfidenceTests
{
    /// <summary>Bivariate normal probabilities that both stay below their own P50 or P70 (SciPy; for P50 also ¼ + asin(ρ)/2π).</summary>
    [Theory]
    [InlineData(0.0, 50, .25)]
    [InlineData(0.0, 70, .49)]
    [InlineData(0.3, 50, .29849334201)]
    [InlineData(0.3, 70, .528142813204)]
    [InlineData(0.8, 50, .39758361765)]
    [InlineData(0.8, 70, .611180247407)]
    [InlineData(0.8, 80, .729033979763)]
    public void BothPromisesOfABivariateNormal(double rho, int percent, double expected)
    {
        const int n = 200_000;
        var z = ContingencyTests.Normals(n, 2, 11);
        var atLevel = MathNet.Numerics.Distributions.Normal.InvCDF(0, 1, percent / 100.0);
        var finish = new DateOnly(2030, 6, 30);
        var finishes = z[0].Select(x => Instants.EndOf(finish) + (int)Math.Round((x - atLevel) * 100_000)).ToArray();
        var costs = z[0].Zip(z[1], (x, y) => Math.Round((rho * x + Math.Sqrt(1 - rho * rho) * y - atLevel) * 1e7) + 5e8).ToArray();
        var joint = JointConfidence.Of(finishes, costs, finish, 500_000_000);
        Assert.Equal(expected, joint.Probability, 4 * Math.Sqrt(expected * (1 - expected) / n));
    }

    [Fact]
    public void PromisesKeptToTheDayAndTheMinorUnitCount()
    {
        var finish = new DateOnly(2030, 6, 30);
        var end = Instants.EndOf(finish);
        Assert.Equal(1, JointConfidence.Of([end, end + 1, end, end - 1440], [10, 10, 11, 12], finish, 10).Kept);
    }
}
