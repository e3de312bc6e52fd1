using Portfolio.Engine.Dependence;
using Portfolio.Engine.Distributions;
using Portfolio.Engine.Draws;
using Portfolio.Engine.Tests.Dependence;
using Portfolio.Model.Distributions;
using Portfolio.Model.Documents;
using Xunit;

namespace Portfolio.Engine.Tests.Distributions;

/// <summary>
/// Digests of all bits that a seed gives, pinned. They hold on every processor and with registers of every width: the suite is repeated with
/// DOTNET_EnableAVX512=0, DOTNET_EnableAVX2=0 and DOTNET_EnableHWIntrinsic=0. A change here changes every result that was ever published.
/// </summary>
public sealed class SameBitsTests
{
    private const int Count = 4099;

    public static TheoryData<Distribution, ulong> Pinned => new()
    {
        { new Uniform(2, 9), 5414904809254957831 },
        { new Triangular(2, 5, 14), 10968387566123481173 },
        { new Triangular(10, 12, 20, 10, 90), 7499051210915280706 },
        { new Pert(2, 5, 14), 12917551145635665746 },
        { new Pert(2, 5, 14, 7.3), 14127190815084855199 },
        { new Pert(10, 12, 20, 4, 10, 90), 17298673731279796392 },
        { new Normal(10, 3), 5601233139219066028 },
        { new Normal(10, 5, 0), 17835277509185369792 },
        { new Normal(10, 5, 14, 16), 9441453497542802448 },
        { new LognormalByMoments(100, 30), 15505764193024294524 },
        { new LognormalByPercentiles(80, 150, 10, 90), 1234368362041060734 },
        { new Discrete([new(0, 0.7), new(10, 0.2), new(50, 0.1)]), 16537780781657882624 },
        { new Percentiles([new(0, 80), new(10, 90), new(50, 100), new(90, 130), new(100, 160)]), 13653947482408860931 },
    };

    [Theory]
    [MemberData(nameof(Pinned))]
    public void Marginals(Distribution stated, ulong digest)
    {
        var values = new double[Count];
        NormalScore.Fill(1, DrawKey.Hash("project/weir-lock"), 0, values);
        Marginal.Of(stated).Read(values, values);
        Assert.Equal(digest, Digest(values));
    }

    [Theory]
    [InlineData(MatrixRepair.Refuse, 0.3, 5825650216022184098ul)]
    [InlineData(MatrixRepair.Nearest, -0.9, 1843517368090767403ul)]
    public void Scores_and_driver_factors(MatrixRepair repair, double third, ulong digest)
    {
        var settings = DependenceModelTests.Stated(
            ["ground", "price"], 0.2, 0.5, new("driver/ground", "project/a", 0.5), new("driver/price", "project/a", 0.4), new("driver/ground", "driver/price", third));
        settings = settings with { Dependence = settings.Dependence with { Repair = repair } };
        Project[] projects = [.. "abc".Select(id => new Project { Id = id.ToString(), Programme = "north", StatusDate = new DateOnly(2026, 12, 1) })];
        var (factors, scores, duration, cost) = (new double[3 * Count], new double[2 * Count], new double[2 * Count], new double[2 * Count]);
        DependenceModel.Build(settings, projects).Scores(1, 5, Count, factors, scores);
        new DriverFactors(new Driver("ground", null, 0.4, new Pert(0.9, 1, 1.4), new Triangular(0.9, 1, 1.4))).Read(scores, duration, cost);
        Assert.Equal(digest, Digest([.. factors, .. scores, .. duration, .. cost]));
    }

    private static ulong Digest(double[] values)
    {
        var sum = 0UL;
        foreach (var value in values)
            sum = sum * 6364136223846793005 + (ulong)BitConverter.DoubleToInt64Bits(value);
        return sum;
    }
}
