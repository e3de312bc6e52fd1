using System.Buffers;
using System.Buffers.Binary;
using System.Text;

namespace Portfolio.Engine.Results;

/// <summary>Writes whole numbers in as few bytes as they need: 7 bits to a byte, low ones first (LEB128), signed ones folded.</summary>
internal sealed class CompactWriter
{
    private readonly ArrayBufferWriter<byte> bytes = new(512);

    public void Byte(byte value) => bytes.Write([value]);

    public void Unsigned(ulong value)
    {
        for (; value >= 0x80; value >>= 7) Byte((byte)(value | 0x80));
        Byte((byte)value);
    }

    public void Signed(long value) => Unsigned((ulong)((value << 1) ^ (value >> 63)));

    /// <summary>0 for null; otherwise a number that is not negative, plus one.</summary>
    public void Optional(long? value) => Unsigned(value is { } known ? checked((ulong)known + 1) : 0);

    public void Double(double value)
    {
        BinaryPrimitives.WriteDoubleLittleEndian(bytes.GetSpan(sizeof(double)), value);
        bytes.Advance(sizeof(double));
    }

    public void Text(string text)
    {
        Unsigned((ulong)Encoding.UTF8.GetByteCount(text));
        Encoding.UTF8.GetBytes(text, bytes);
    }

    public byte[] ToArray() => bytes.WrittenSpan.ToArray();
}

/// <summary>Reads what <see cref="CompactWriter"/> wrote; <see cref="FormatException"/> when it is cut short or too long.</summary>
internal ref struct CompactReader(ReadOnlySpan<byte> bytes)
{
    private ReadOnlySpan<byte> rest = bytes;

    public readonly bool AtEnd => rest.IsEmpty;

    public byte Byte() => Take(1)[0];

    public ulong Unsigned()
    {
        var value = 0UL;
        for (var shift = 0; shift < 64; shift += 7)
        {
            var next = Byte();
            value |= (ulong)(next & 0x7F) << shift;
            if (next < 0x80) return value;
        }
        throw new FormatException("A number of more than 64 bits.");
    }

    public long Signed()
    {
        var folded = Unsigned();
        return (long)(folded >> 1) ^ -(long)(folded & 1);
    }

    public long? Optional() => Unsigned() is var value and > 0 ? (long)(value - 1) : null;

    public double Double() => BinaryPrimitives.ReadDoubleLittleEndian(Take(sizeof(double)));

    public string Text() => Encoding.UTF8.GetString(Take((int)Math.Min(Unsigned(), int.MaxValue)));

    /// <summary>A level written as the step from the one before in millionths.</summary>
    public Level Level(int before)
    {
        var millionths = (ulong)before + Math.Min(Unsigned(), int.MaxValue);
        return millionths is > 0 and < 100_000_000
            ? Results.Level.OfMillionths((int)millionths)
            : throw new FormatException("An impossible level.");
    }

    private ReadOnlySpan<byte> Take(int count)
    {
        if (rest.Length < count) throw new FormatException("Cut short.");
        var taken = rest[..count];
        rest = rest[count..];
        return taken;
    }
}
