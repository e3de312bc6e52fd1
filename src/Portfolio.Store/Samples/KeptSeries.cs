namespace Portfolio.Store.Samples;

/// <summary>One series as kept, over all blocks in their order; unpacked when it is asked for.</summary>
public sealed class KeptSeries
{
    private readonly List<SampleRow> blocks;

    internal KeptSeries(List<SampleRow> blocks) => this.blocks = blocks;

    /// <summary>As written with <see cref="SeriesBlock.OfMinutes"/>.</summary>
    public int[] ToMinutes() => Joined(blocks.ConvertAll(row => SampleCodec.DecodeMinutes(row.Codec, row.Bytes)));

    /// <summary>As written with <see cref="SeriesBlock.OfMoney"/>.</summary>
    public double[] ToMoney() => Joined(blocks.ConvertAll(row => SampleCodec.DecodeMoney(row.Codec, row.Bytes)));

    private static T[] Joined<T>(List<T[]> blocks)
    {
        var all = new T[blocks.Sum(block => block.Length)];
        var at = 0;
        foreach (var block in blocks)
        {
            block.CopyTo(all, at);
            at += block.Length;
        }
        return all;
    }
}
