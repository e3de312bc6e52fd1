using Portfolio.Engine.Tests.Networks;
using Portfolio.Model.Documents;
using Xunit;

namespace Portfolio.Engine.Tests.Pools;

/// <summary>
/// Rule <c>inOrder</c> with the order kept is monotone (contract section 4, item 7): with FS and SS links nothing becomes later when work
/// shrinks, a link goes or a pool grows; when a pool grows nothing does with any links.
/// </summary>
public sealed class KeptOrderTests
{
    private static int Networks => Environment.GetEnvironmentVariable("PORTFOLIO_LONG") == "1" ? 20_000 : 2_000;

    [Fact]
    public void ShorterWorkMakesNothingLater() => NothingLater(allLinks: false, network => (network.Shorter(), network.Pools));

    [Fact]
    public void FewerLinksMakeNothingLater() => NothingLater(allLinks: false, network => (network.LessLinked(), network.Pools));

    [Fact]
    public void LargerPoolsMakeNothingLater() => NothingLater(allLinks: false, network => (network.Activities, network.Larger()));

    [Fact]
    public void LargerPoolsMakeNothingLaterWithAnyLinks() => NothingLater(allLinks: true, network => (network.Activities, network.Larger()));

    /// <summary>The order is the sequence of <c>passing</c>, so that base dates are no later than under it.</summary>
    [Fact]
    public void BaseDatesAreNoLaterThanUnderPassing()
    {
        for (var seed = 0; seed < Networks; seed++)
        {
            var network = new RandomNetwork(seed, pools: true, allLinks: true);
            NoneLater(network.Compile(PoolRule.Passing), network.Compile(PoolRule.InOrder), seed);
        }
    }

    /// <summary>
    /// The anomaly that the kept order excludes does occur under <c>passing</c>; otherwise these networks would show nothing.
    /// </summary>
    [Fact]
    public void UnderPassingShorterWorkDoesMakeSomethingLater()
    {
        var later = Enumerable.Range(0, 500).Count(seed =>
        {
            var network = new RandomNetwork(seed, pools: true);
            var before = network.Compile(PoolRule.Passing).BaseInstants();
            var after = RandomNetwork.Compile(PoolRule.Passing, null, network.Shorter(), network.Pools).BaseInstants();
            return after.Zip(before).Any(x => x.First.Finish > x.Second.Finish);
        });
        Assert.InRange(later, 5, 250);
    }

    private static void NothingLater(bool allLinks, Func<RandomNetwork, (Activity[], Pool[])> relieve)
    {
        for (var seed = 0; seed < Networks; seed++)
        {
            var network = new RandomNetwork(seed, pools: true, allLinks);
            var before = network.Compile(PoolRule.InOrder);
            var (activities, pools) = relieve(network);
            NoneLater(before, RandomNetwork.Compile(PoolRule.InOrder, before.Order, activities, pools), seed);
        }
    }

    private static void NoneLater(Plan before, Plan after, int seed)
    {
        foreach (var (a, (was, now)) in before.BaseInstants().Zip(after.BaseInstants()).Index())
            Assert.True(now.Start <= was.Start && now.Finish <= was.Finish, $"seed {seed}, A{a}: {was} before, {now} after");
    }
}
