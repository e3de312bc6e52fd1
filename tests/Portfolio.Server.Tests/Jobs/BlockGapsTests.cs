using Portfolio.Server.Jobs;

namespace Portfolio.Server.Tests.Jobs;

public sealed class BlockGapsTests
{
    [Theory]
    [InlineData(10, "", "0+10")]
    [InlineData(10, "0", "")]
    [InlineData(4096, "", "0+4096")]
    [InlineData(4097, "0", "4096+1")]
    [InlineData(20000, "", "0+20000")]
    [InlineData(20000, "0 1 2 3 4", "")]
    [InlineData(20000, "4 1", "0+4096 8192+8192")]
    [InlineData(20000, "0 2", "4096+4096 12288+7712")]
    public void MissingBlocksAreTakenInStretches(int iterations, string stored, string gaps)
    {
        var found = BlockGaps.Of(iterations, stored.Split(' ', StringSplitOptions.RemoveEmptyEntries).Select(int.Parse));
        Assert.Equal(gaps, string.Join(' ', found.Select(gap => $"{gap.First}+{gap.Count}")));
    }
}
