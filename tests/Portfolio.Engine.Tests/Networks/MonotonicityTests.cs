using Portfolio.Model.Documents;
using Xunit;

namespace Portfolio.Engine.Tests.Networks;

/// <summary>Without pools and with FS and SS links only, more work never makes anything earlier, and fewer links nothing later.</summary>
public sealed class MonotonicityTests
{
    [Fact]
    public void LongerWorkMakesNothingEarlier()
    {
        for (var seed = 0; seed < 2_000; seed++)
        {
            var network = new RandomNetwork(seed, pools: false);
            var before = network.Compile(PoolRule.Passing).BaseInstants();
            var after = RandomNetwork.Compile(PoolRule.Passing, null, network.Longer(), network.Pools).BaseInstants();
            Assert.All(before.Zip(after), x => Assert.True(x.Second.Start >= x.First.Start && x.Second.Finish >= x.First.Finish, $"seed {seed}"));
        }
    }

    [Fact]
    public void FewerLinksMakeNothingLater()
    {
        for (var seed = 0; seed < 2_000; seed++)
        {
            var network = new RandomNetwork(seed, pools: false, allLinks: true);
            var before = network.Compile(PoolRule.Passing).BaseInstants();
            var after = RandomNetwork.Compile(PoolRule.Passing, null, network.LessLinked(), network.Pools).BaseInstants();
            Assert.All(before.Zip(after), x => Assert.True(x.Second.Start <= x.First.Start && x.Second.Finish <= x.First.Finish, $"seed {seed}"));
        }
    }
}
