using System.Runtime.InteropServices;

namespace Portfolio.Store.Samples;

/// <summary>
/// Between the values of a block and the bytes that are kept. Codec 1 packs whole numbers, codec 2 keeps doubles as they are.
/// </summary>
internal static class SampleCodec
{
    private const int Packed = 1;
    private const int Raw = 2;

    // Beyond 2^53 a double no longer tells neighbouring whole numbers apart.
    private const double LargestWhole = 9007199254740992;

    public static (int Codec, byte[] Bytes) Encode(ReadOnlySpan<int> minutes)
    {
        var wide = new long[minutes.Length];
        for (var i = 0; i < wide.Length; i++)
            wide[i] = minutes[i];
        return (Packed, IntegerCodec.Encode(wide, mayMiss: true));
    }

    public static (int Codec, byte[] Bytes) Encode(ReadOnlySpan<double> money)
    {
        var whole = new long[money.Length];
        for (var i = 0; i < whole.Length; i++)
        {
            if (!(Math.Abs(money[i]) <= LargestWhole))
                return (Raw, KeepRaw(money));
            whole[i] = (long)money[i];
            // Bit by bit, so that fractions and the negative zero are kept too.
            if (BitConverter.DoubleToInt64Bits(whole[i]) != BitConverter.DoubleToInt64Bits(money[i]))
                return (Raw, KeepRaw(money));
        }
        return (Packed, IntegerCodec.Encode(whole, mayMiss: false));
    }

    public static int[] DecodeMinutes(long codec, ReadOnlySpan<byte> bytes)
    {
        if (codec != Packed)
            throw new InvalidOperationException("The series was not kept as minutes.");
        var values = IntegerCodec.Decode(bytes);
        var minutes = new int[values.Length];
        for (var i = 0; i < minutes.Length; i++)
            minutes[i] = (int)values[i];
        return minutes;
    }

    public static double[] DecodeMoney(long codec, ReadOnlySpan<byte> bytes)
    {
        if (codec == Raw)
            return ReadRaw(bytes);
        var values = IntegerCodec.Decode(bytes);
        var money = new double[values.Length];
        for (var i = 0; i < money.Length; i++)
            money[i] = values[i];
        return money;
    }

    private static byte[] KeepRaw(ReadOnlySpan<double> values)
    {
        var bits = MemoryMarshal.Cast<double, ulong>(values);
        var bytes = new byte[8 * bits.Length];
        BitPacking.Pack(bits, 64, bytes);
        return bytes;
    }

    private static double[] ReadRaw(ReadOnlySpan<byte> bytes)
    {
        var values = new double[bytes.Length / 8];
        BitPacking.Unpack(bytes, 64, MemoryMarshal.Cast<double, ulong>(values.AsSpan()));
        return values;
    }
}
