using System.Numerics;

namespace Portfolio.Store.Samples;

/// <summary>
/// Whole numbers in little room, without loss: as distances from the smallest, divided by what all distances have in common (whole days,
/// whole currency units), each in as many bits as most of them need; the high bits of the few that need more stand behind, with their
/// places ("patched frame of reference", Zukowski, Héman, Nes and Boncz, "Super-scalar RAM-CPU cache compression", ICDE 2006). What does
/// not happen takes no part in that and becomes 0. Layout, little-endian: count int32, smallest int64, divisor uint64, width byte, high
/// width byte, missing byte, exceptions int32; then three packed runs: the low bits, the places, the high bits.
/// </summary>
internal static class IntegerCodec
{
    /// <param name="values">Any values.</param>
    /// <param name="mayMiss">Whether <see cref="Frame.Missing"/> among them stands for "does not happen".</param>
    public static byte[] Encode(ReadOnlySpan<long> values, bool mayMiss)
    {
        var frame = Frame.Of(values, mayMiss);
        var codes = new ulong[values.Length];
        frame.ToCodes(values, codes);
        var (width, exceptions, highest) = ChooseWidth(codes);
        var placeWidth = PlaceWidth(values.Length);
        var low = BitPacking.Size(values.Length, width);
        var places = BitPacking.Size(exceptions, placeWidth);
        var highWidth = exceptions == 0 ? 0 : highest - width;
        var bytes = new byte[Frame.HeadSize + low + places + BitPacking.Size(exceptions, highWidth)];
        frame.Write(bytes, values.Length, width, highWidth, exceptions);
        BitPacking.Pack(codes, width, bytes.AsSpan(Frame.HeadSize));
        if (exceptions > 0)
            PackExceptions(codes, width, highWidth, placeWidth, exceptions, bytes.AsSpan(Frame.HeadSize + low), places);
        return bytes;
    }

    private static void PackExceptions(
        ReadOnlySpan<ulong> codes, int width, int highWidth, int placeWidth, int exceptions, Span<byte> target, int placesSize)
    {
        var places = new ulong[exceptions];
        var highs = new ulong[exceptions];
        var found = 0;
        for (var i = 0; i < codes.Length; i++)
        {
            if (codes[i] >> width == 0)
                continue;
            places[found] = (ulong)i;
            highs[found++] = codes[i] >> width;
        }
        BitPacking.Pack(places, placeWidth, target);
        BitPacking.Pack(highs, highWidth, target[placesSize..]);
    }

    /// <summary>Reads back exactly what was encoded.</summary>
    /// <exception cref="StoreDamagedException">The bytes are not of this layout.</exception>
    public static long[] Decode(ReadOnlySpan<byte> bytes)
    {
        if (bytes.Length < Frame.HeadSize)
            throw new StoreDamagedException("A block of samples is too short to have a head.");
        var (frame, count, width, highWidth, exceptions) = Frame.Read(bytes);
        var placeWidth = PlaceWidth(count);
        var body = bytes[Frame.HeadSize..];
        if (count < 0 || exceptions < 0 || exceptions > count || width > 64 || width + highWidth > 64
            || body.Length != (long)BitPacking.Size(count, width)
                + BitPacking.Size(exceptions, placeWidth) + BitPacking.Size(exceptions, highWidth))
            throw new StoreDamagedException("A block of samples does not have the length that its head states.");
        var codes = new ulong[count];
        BitPacking.Unpack(body, width, codes);
        body = body[BitPacking.Size(count, width)..];
        var places = new ulong[exceptions];
        var highs = new ulong[exceptions];
        BitPacking.Unpack(body, placeWidth, places);
        BitPacking.Unpack(body[BitPacking.Size(exceptions, placeWidth)..], highWidth, highs);
        for (var i = 0; i < exceptions; i++)
            codes[(int)places[i]] |= highs[i] << width;
        var values = new long[count];
        frame.FromCodes(codes, values);
        return values;
    }

    /// <summary>
    /// The width with the least bits in all: a bit less for every value against a place and high bits for each that then does not fit.
    /// </summary>
    private static (int Width, int Exceptions, int Highest) ChooseWidth(ReadOnlySpan<ulong> codes)
    {
        Span<int> needing = stackalloc int[65];
        needing.Clear();
        foreach (var code in codes)
            needing[64 - BitOperations.LeadingZeroCount(code)]++;
        var highest = needing.LastIndexOfAnyExcept(0);
        var (best, bestExceptions, least) = (Math.Max(highest, 0), 0, long.MaxValue);
        var exceptions = 0;
        // At width 64 nothing is above; a shift by 64 is never asked for.
        for (var width = Math.Max(highest, 0); width >= 0; exceptions += needing[width], width--)
        {
            var bits = (long)codes.Length * width + (long)exceptions * (PlaceWidth(codes.Length) + highest - width);
            if (bits >= least)
                continue;
            (best, bestExceptions, least) = (width, exceptions, bits);
        }
        return (best, bestExceptions, highest);
    }

    private static int PlaceWidth(int count) => count <= 1 ? 0 : 64 - BitOperations.LeadingZeroCount((ulong)(count - 1));
}
