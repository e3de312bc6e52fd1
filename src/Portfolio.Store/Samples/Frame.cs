using System.Buffers.Binary;

namespace Portfolio.Store.Samples;

/// <summary>
/// How values become small codes: (value − smallest) / divisor, and one more where 0 is needed for <see cref="Missing"/>.
/// </summary>
internal readonly record struct Frame(long Smallest, ulong Divisor, bool Misses)
{
    /// <summary>Bytes of the head that <see cref="Write"/> fills.</summary>
    public const int HeadSize = 27;

    /// <summary>Stands for "does not happen" among minutes.</summary>
    public const long Missing = int.MinValue;

    public static Frame Of(ReadOnlySpan<long> values, bool mayMiss)
    {
        var (smallest, any, misses) = (long.MaxValue, false, false);
        foreach (var value in values)
        {
            if (mayMiss && value == Missing)
            {
                misses = true;
                continue;
            }
            any = true;
            smallest = Math.Min(smallest, value);
        }
        if (!any)
            smallest = 0;
        return new Frame(smallest, Common(values, smallest, misses), misses);
    }

    public void ToCodes(ReadOnlySpan<long> values, Span<ulong> codes)
    {
        for (var i = 0; i < values.Length; i++)
        {
            var distance = unchecked((ulong)values[i] - (ulong)Smallest);
            if (Divisor != 1)
                distance /= Divisor;
            codes[i] = !Misses ? distance : values[i] == Missing ? 0 : distance + 1;
        }
    }

    public void FromCodes(ReadOnlySpan<ulong> codes, Span<long> values)
    {
        var shift = Misses ? 1UL : 0UL;
        for (var i = 0; i < codes.Length; i++)
            values[i] = Misses && codes[i] == 0 ? Missing : unchecked((long)((codes[i] - shift) * Divisor + (ulong)Smallest));
    }

    /// <summary>Writes itself and the four figures of the packed runs.</summary>
    public void Write(Span<byte> head, int count, int width, int highWidth, int exceptions)
    {
        BinaryPrimitives.WriteInt32LittleEndian(head, count);
        BinaryPrimitives.WriteInt64LittleEndian(head[4..], Smallest);
        BinaryPrimitives.WriteUInt64LittleEndian(head[12..], Divisor);
        (head[20], head[21], head[22]) = ((byte)width, (byte)highWidth, Misses ? (byte)1 : (byte)0);
        BinaryPrimitives.WriteInt32LittleEndian(head[23..], exceptions);
    }

    public static (Frame Frame, int Count, int Width, int HighWidth, int Exceptions) Read(ReadOnlySpan<byte> head)
    {
        var frame = new Frame(
            BinaryPrimitives.ReadInt64LittleEndian(head[4..]), BinaryPrimitives.ReadUInt64LittleEndian(head[12..]), head[22] != 0);
        return (
            frame, BinaryPrimitives.ReadInt32LittleEndian(head), head[20], head[21], BinaryPrimitives.ReadInt32LittleEndian(head[23..]));
    }

    /// <summary>The greatest common divisor of all distances; most often 1 after a few of them.</summary>
    private static ulong Common(ReadOnlySpan<long> values, long smallest, bool misses)
    {
        var common = 0UL;
        foreach (var value in values)
        {
            if (common == 1)
                break;
            if (misses && value == Missing)
                continue;
            var (a, b) = (common, unchecked((ulong)value - (ulong)smallest));
            while (b != 0)
                (a, b) = (b, a % b);
            common = a;
        }
        return Math.Max(common, 1);
    }
}
