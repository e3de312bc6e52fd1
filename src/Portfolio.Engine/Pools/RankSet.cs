using System.Numerics;

namespace Portfolio.Engine.Pools;

/// <summary>A set of places in an order as bits, with a second level of bits that says which words hold any, so that the next member is found at once.</summary>
internal sealed class RankSet(int size)
{
    private readonly ulong[] _words = new ulong[(size >> 6) + 1];
    private readonly ulong[] _filled = new ulong[(size >> 12) + 1];

    public void Clear()
    {
        Array.Clear(_words);
        Array.Clear(_filled);
    }

    public void Add(int rank)
    {
        _words[rank >> 6] |= 1UL << rank;
        _filled[rank >> 12] |= 1UL << (rank >> 6);
    }

    public void Remove(int rank)
    {
        if ((_words[rank >> 6] &= ~(1UL << rank)) == 0)
            _filled[rank >> 12] &= ~(1UL << (rank >> 6));
    }

    /// <summary>The lowest member at or above <paramref name="from"/>; <see cref="int.MaxValue"/> when there is none.</summary>
    public int Next(int from)
    {
        var word = from >> 6;
        if (word >= _words.Length)
            return int.MaxValue;
        var bits = _words[word] & (ulong.MaxValue << from);
        if (bits != 0)
            return (word << 6) + BitOperations.TrailingZeroCount(bits);
        word++;
        for (var group = word >> 6; group < _filled.Length; group++)
        {
            var filled = _filled[group] & (group == word >> 6 ? ulong.MaxValue << word : ulong.MaxValue);
            if (filled == 0)
                continue;
            var found = (group << 6) + BitOperations.TrailingZeroCount(filled);
            return (found << 6) + BitOperations.TrailingZeroCount(_words[found]);
        }
        return int.MaxValue;
    }
}
