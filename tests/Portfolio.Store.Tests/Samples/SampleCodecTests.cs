using CsCheck;
using Portfolio.Store.Samples;

namespace Portfolio.Store.Tests.Samples;

public sealed class SampleCodecTests
{
    private static readonly Gen<int> Minute = Gen.Frequency(
        (6, Gen.Int[29_000_000, 31_000_000]), (1, Gen.Const(int.MinValue)), (1, Gen.Int), (
            1, Gen.Int[20_000, 22_000].Select(days => days * 1440)));

    private static readonly Gen<double> Amount = Gen.Frequency(
        (6, Gen.Long[0, 90_000_000_000].Select(minor => (double)minor)), (
            1, Gen.Long[-9007199254740992, 9007199254740992].Select(minor => (double)minor)));

    private static int[] RoundTrip(int[] values)
    {
        var (codec, bytes) = SampleCodec.Encode(values);
        return SampleCodec.DecodeMinutes(codec, bytes);
    }

    private static double[] RoundTrip(double[] values)
    {
        var (codec, bytes) = SampleCodec.Encode(values);
        return SampleCodec.DecodeMoney(codec, bytes);
    }

    private static void SameBits(double[] expected, double[] actual) =>
        Assert.Equal(expected.Select(BitConverter.DoubleToInt64Bits), actual.Select(BitConverter.DoubleToInt64Bits));

    [Fact]
    public void Any_minutes_come_back() => Minute.Array[0, 300].Sample(values => Assert.Equal(values, RoundTrip(values)));

    [Fact]
    public void Whole_days_come_back() =>
        Gen.Select(Gen.Int[0, 60_000].Array[1, 300], Gen.Bool.Array[300]).Sample((days, happens) =>
        {
            int[] values = [.. days.Select((day, i) => happens[i] ? day * 1440 : int.MinValue)];
            Assert.Equal(values, RoundTrip(values));
        });

    [Fact]
    public void Any_whole_amounts_come_back() => Amount.Array[0, 300].Sample(values => SameBits(values, RoundTrip(values)));

    [Fact]
    public void Any_doubles_at_all_come_back_bit_by_bit() =>
        Gen.Frequency(
            (3, Amount), (1, Gen.Double), (1, Gen.Const(-0.0)), (1, Gen.Const(double.NaN)), (1, Gen.Const(double.NegativeInfinity)))
            .Array[0, 100].Sample(values => SameBits(values, RoundTrip(values)));

    [Theory]
    [InlineData(new int[0])]
    [InlineData(new[] { int.MinValue })]
    [InlineData(new[] { int.MinValue, int.MinValue, int.MinValue })]
    [InlineData(new[] { int.MinValue, int.MaxValue })]
    [InlineData(new[] { int.MinValue + 1, int.MaxValue, int.MinValue })]
    [InlineData(new[] { 5, 5, 5, 5 })]
    public void Corner_cases_come_back(int[] values) => Assert.Equal(values, RoundTrip(values));

    [Theory]
    [InlineData(long.MinValue, long.MaxValue, 0L)]
    [InlineData(long.MaxValue, long.MaxValue, long.MinValue)]
    public void The_widest_range_fits(
        params long[] values) => Assert.Equal(values, IntegerCodec.Decode(IntegerCodec.Encode(values, mayMiss: false)));

    [Fact]
    public void Equal_values_whole_days_and_whole_currency_units_take_little_room()
    {
        Assert.Equal(Frame.HeadSize, Size(_ => 29_000_000));
        Assert.InRange(Size(i => 29_000_000 + i * 7919 % 256 * 1440), 4096, 4096 + 64);
        Assert.InRange(Size(i => i % 4 == 0 ? int.MinValue : 29_000_000 + i * 7919 % 255 * 1440), 4096, 4096 + 64);
        // One outlier in a hundred must not widen the others: 10 bits each, and 41 × (12 + 19) bits beside them.
        Assert.InRange(Size(i => i % 100 == 0 ? 500_000_000 + i : i * 7919 % 1024), 5120, 5120 + 230);

        static int Size(Func<int, int> value) =>
            SampleCodec.Encode(Enumerable.Range(0, 4096).Select(value).ToArray()).Bytes.Length;
    }

    [Fact]
    public void Bytes_that_do_not_fit_their_head_are_refused()
    {
        var (codec, bytes) = SampleCodec.Encode([1, 2, 30]);
        Assert.Throws<StoreDamagedException>(() => SampleCodec.DecodeMinutes(codec, bytes.AsSpan(..^1)));
        Assert.Throws<StoreDamagedException>(() => SampleCodec.DecodeMinutes(codec, bytes.AsSpan(..5)));
        bytes[3] = 0x7F;
        Assert.Throws<StoreDamagedException>(() => SampleCodec.DecodeMinutes(codec, bytes));
    }
}
