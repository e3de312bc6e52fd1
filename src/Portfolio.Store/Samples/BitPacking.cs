using System.Buffers.Binary;

namespace Portfolio.Store.Samples;

/// <summary>Numbers of a fixed width in bits, one behind the other, lowest bit first. Width 0 takes no room.</summary>
internal static class BitPacking
{
    /// <summary>Bytes that <paramref name="count"/> numbers of a width take.</summary>
    public static int Size(int count, int width) => checked((int)(((long)count * width + 7) / 8));

    /// <summary>Writes the low <paramref name="width"/> bits of each value.</summary>
    /// <param name="target">At least <see cref="Size"/> bytes; what lies behind stays.</param>
    public static void Pack(ReadOnlySpan<ulong> values, int width, Span<byte> target)
    {
        if (width == 0)
            return;
        var mask = Mask(width);
        var (word, used, at) = (0UL, 0, 0);
        foreach (var raw in values)
        {
            var value = raw & mask;
            word |= value << used;
            used += width;
            if (used < 64)
                continue;
            BinaryPrimitives.WriteUInt64LittleEndian(target[at..], word);
            at += 8;
            used -= 64;
            // What did not fit; a shift by 64 would shift by nothing.
            word = used == 0 ? 0 : value >> (width - used);
        }
        for (; used > 0; used -= 8, word >>= 8)
            target[at++] = (byte)word;
    }

    /// <summary>Reads back what <see cref="Pack"/> wrote: as many numbers as <paramref name="values"/> holds.</summary>
    public static void Unpack(ReadOnlySpan<byte> source, int width, Span<ulong> values)
    {
        if (width == 0)
        {
            values.Clear();
            return;
        }
        var mask = Mask(width);
        var (word, left, at) = (0UL, 0, 0);
        for (var i = 0; i < values.Length; i++)
        {
            var value = word;
            if (left >= width)
            {
                word = width == 64 ? 0 : word >> width;
                left -= width;
            }
            else
            {
                var next = Load(source, ref at, out var loaded);
                value |= next << left;
                var taken = width - left;
                word = taken == 64 ? 0 : next >> taken;
                left = loaded - taken;
            }
            values[i] = value & mask;
        }
    }

    private static ulong Load(ReadOnlySpan<byte> source, ref int at, out int bits)
    {
        var rest = source[at..];
        if (rest.Length >= 8)
        {
            at += 8;
            bits = 64;
            return BinaryPrimitives.ReadUInt64LittleEndian(rest);
        }
        var word = 0UL;
        for (var i = 0; i < rest.Length; i++)
            word |= (ulong)rest[i] << (8 * i);
        at += rest.Length;
        bits = 8 * rest.Length;
        return word;
    }

    private static ulong Mask(int width) => width == 64 ? ulong.MaxValue : (1UL << width) - 1;
}
