using Portfolio.Engine.Runs;

namespace Portfolio.Server.Jobs;

/// <summary>Consecutive iterations that are still to be worked.</summary>
/// <param name="First">The first one, at the beginning of a block.</param>
internal readonly record struct BlockGap(long First, int Count);

/// <summary>Which blocks of a run are missing, in as few stretches as possible.</summary>
internal static class BlockGaps
{
    /// <param name="stored">Blocks that are there, in any order.</param>
    public static IReadOnlyList<BlockGap> Of(int iterations, IEnumerable<int> stored)
    {
        var there = stored.ToHashSet();
        var blocks = (iterations + BlockSamples.Size - 1) / BlockSamples.Size;
        var gaps = new List<BlockGap>();
        for (var block = 0; block < blocks; block++)
        {
            if (there.Contains(block))
                continue;
            var first = block;
            while (block + 1 < blocks && !there.Contains(block + 1))
                block++;
            var end = Math.Min(iterations, (block + 1) * (long)BlockSamples.Size);
            gaps.Add(new BlockGap(first * (long)BlockSamples.Size, (int)(end - first * (long)BlockSamples.Size)));
        }
        return gaps;
    }
}
