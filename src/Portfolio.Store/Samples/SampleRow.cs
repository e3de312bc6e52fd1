using System.IO.Hashing;
using System.Text;

namespace Portfolio.Store.Samples;

/// <summary>One series of one block as kept.</summary>
internal sealed record SampleRow
{
    public string Run { get; init; } = "";
    public long Block { get; init; }
    public string Series { get; init; } = "";
    public long Codec { get; init; }
    public byte[] Bytes { get; init; } = [];
    public long Checksum { get; init; }

    public static SampleRow Of(string run, int block, SeriesBlock series)
    {
        var row = new SampleRow { Run = run, Block = block, Series = series.Series, Codec = series.Codec, Bytes = series.Bytes };
        return row with { Checksum = row.Sum() };
    }

    /// <exception cref="StoreDamagedException">These are not the bytes that were written, or not in this place.</exception>
    public void Check()
    {
        if (Sum() != Checksum)
            throw new StoreDamagedException($"The samples of '{Series}' in block {Block} of run {Run} are damaged.");
    }

    /// <summary>XXH3 (64 bits) over bytes and address, so that rows which changed places are noticed as well.</summary>
    private long Sum()
    {
        var hash = new XxHash3();
        hash.Append(Encoding.UTF8.GetBytes($"{Run}/{Block}/{Codec}/{Series}/"));
        hash.Append(Bytes);
        return unchecked((long)hash.GetCurrentHashAsUInt64());
    }
}
