using Portfolio.Engine.Draws;
using Xunit;

namespace Portfolio.Engine.Tests.Draws;

public sealed class PhiloxTests
{
    // First three rows: Random123, commit 9545ff6, tests/kat_vectors, lines 24–29 (philox4x32, 10 rounds). The rest: an independent
    // implementation in Python.
    [Theory]
    [InlineData(0u, 0u, 0u, 0u, 0u, 0u, 0x6627e8d5u, 0xe169c58du, 0xbc57ac4cu, 0x9b00dbd8u)]
    [InlineData(~0u, ~0u, ~0u, ~0u, ~0u, ~0u, 0x408f276du, 0x41c83b0eu, 0xa20bc7c6u, 0x6d5451fdu)]
    [InlineData(0x243f6a88u, 0x85a308d3u, 0x13198a2eu, 0x03707344u, 0xa4093822u, 0x299f31d0u, 0xd16cfe09u, 0x94fdccebu, 0x5001e420u, 0x24126ea1u)]
    [InlineData(1u, 0u, 0u, 0u, 0u, 0u, 0xf8e4cca4u, 0x5cb200dbu, 0xb1a574ebu, 0x097eff67u)]
    [InlineData(0u, 0u, 0u, 0u, 1u, 0u, 0xe3e80670u, 0xe50a0ebcu, 0x95f222c0u, 0xb615aa27u)]
    [InlineData(0u, 1u, 2u, 3u, 42u, 0u, 0xd2843e81u, 0x78e09181u, 0x0df2b1d4u, 0xda4be44au)]
    public void Known_answers(uint c0, uint c1, uint c2, uint c3, uint k0, uint k1, uint w0, uint w1, uint w2, uint w3) =>
        Assert.Equal((w0, w1, w2, w3), Philox.Block(c0, c1, c2, c3, k0, k1));

    // C++26 [rand.predef]: the 10,000th word of philox4x32 with the default seed 20111115.
    [Fact]
    public void Ten_thousandth_word_of_the_stream() =>
        Assert.Equal(1955073260u, Philox.Block(9999 / 4, 0, 0, 0, 20111115, 0).W3);

    [Theory]
    [InlineData(0, 64)]
    [InlineData(1, 1)]
    [InlineData(7, 83)]
    [InlineData(4096, 4096)]
    [InlineData(999_983, 37)]
    public void Spans_hold_what_single_blocks_give_wherever_they_begin(long first, int count)
    {
        var (seed, hash) = (0x1234_5678_9ABC_DEF0UL, 0xFEDC_BA98_7654_3210UL);
        var u = new double[count];
        Uniforms.Fill(seed, hash, first, u);
        for (var i = 0; i < count; i++)
        {
            var pair = (uint)((first + i) / 2);
            var (w0, w1, w2, w3) = Philox.Block(pair, 0, (uint)hash, (uint)(hash >> 32), (uint)seed, (uint)(seed >> 32));
            Assert.Equal((first + i) % 2 == 0 ? Uniforms.Of(w0, w1) : Uniforms.Of(w2, w3), u[i]);
        }
    }

    // The zero vector's words as 53-bit uniforms, computed independently in Python.
    [Fact]
    public void Words_become_53_bit_uniforms()
    {
        var u = new double[2];
        Uniforms.Fill(0, 0, 0, u);
        Assert.Equal([0.39904647084896455, 0.7357127844834426], u);
    }

    [Fact]
    public void A_uniform_is_never_0_or_1()
    {
        Assert.Equal(Math.ScaleB(1, -54), Uniforms.Of(0, 0));
        Assert.Equal(1 - Math.ScaleB(1, -53), Uniforms.Of(uint.MaxValue, uint.MaxValue));
    }
}
