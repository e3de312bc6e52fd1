using CsCheck;
using Portfolio.Store.Samples;

namespace Portfolio.Store.Tests.Samples;

public sealed class BitPackingTests
{
    [Fact]
    public void Five_numbers_of_three_bits_lie_lowest_bit_first()
    {
        var bytes = new byte[2];
        // 001 010 011 100 101, from the low end: 1 + 2·8 + 3·64 + 4·512 + 5·4096 = 22737 = 0x58D1
        BitPacking.Pack([1, 2, 3, 4, 5], 3, bytes);
        Assert.Equal([0xD1, 0x58], bytes);
    }

    [Fact]
    public void What_is_packed_at_any_width_comes_back_and_nothing_behind_it_is_touched() =>
        Gen.Select(Gen.Int[0, 64], Gen.ULong.Array[0, 200]).Sample((width, values) =>
        {
            var mask = width == 64 ? ulong.MaxValue : (1UL << width) - 1;
            var bytes = new byte[BitPacking.Size(values.Length, width) + 1];
            bytes[^1] = 0xA5;
            BitPacking.Pack(values, width, bytes);
            var back = new ulong[values.Length];
            BitPacking.Unpack(bytes.AsSpan(0, bytes.Length - 1), width, back);
            Assert.Equal(values.Select(value => value & mask), back);
            Assert.Equal(0xA5, bytes[^1]);
        });
}
