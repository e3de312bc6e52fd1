using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace Portfolio.Engine.Draws;

/// <summary>
/// Exponential and logarithm of our own: those of the C library differ in the last bit from one processor to the next, and every draw must
/// be
/// the same everywhere. Relative error below 4·10⁻¹⁶ (tested).
/// </summary>
internal static class Elementary
{
    /// <summary>Arguments of the exponential are held within ±this, so that results stay normal numbers.</summary>
    public const double ExpLimit = 708;

    private const ulong OneBits = 0x3FF0_0000_0000_0000;
    private const ulong RootHalfBits = 0x3FE6_A09E_667F_3BCD;
    private const double TwoTo52 = 4503599627370496;

    // ln 2 in two parts; the first has 21 trailing zero bits, so that its product with an exponent is exact.
    private const double LnTwoHigh = 0.69314718036912381649, LnTwoLow = 1.9082149292705877e-10, PerLnTwo = 1.4426950408889634;

    // Taylor series of exp on |x| ≤ ln 2 / 2: 1/13! … 1/0!; the rest is below 5e-18.
    private static ReadOnlySpan<double> ExpSeries =>
    [
        1.0 / 6227020800, 1.0 / 479001600, 1.0 / 39916800, 1.0 / 3628800, 1.0 / 362880, 1.0 / 40320, 1.0 / 5040,
        1.0 / 720, 1.0 / 120, 1.0 / 24, 1.0 / 6, 1.0 / 2, 1, 1,
    ];

    // ln((1 + s)/(1 − s)) = 2(s + s³/3 + s⁵/5 + …) on |s| ≤ 0.1716: 2/21 … 2/3, the leading 2 apart; the rest is below 2e-17.
    private static ReadOnlySpan<double> LogSeries =>
        [2.0 / 21, 2.0 / 19, 2.0 / 17, 2.0 / 15, 2.0 / 13, 2.0 / 11, 2.0 / 9, 2.0 / 7, 2.0 / 5, 2.0 / 3];

    public static double Exp(double x) => Exp(Vector512.Create(x), Vector512<double>.Zero).ToScalar();

    public static double Log(double x) => Log(Vector512.Create(x)).ToScalar();

    /// <summary>e^(x + rest), |rest| small against 1.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> Exp(Vector512<double> x, Vector512<double> rest)
    {
        x = Vector512.MinNative(Vector512.MaxNative(x, Vector512.Create(-ExpLimit)), Vector512.Create(ExpLimit));
        var rounding = Vector512.Create(1.5 * TwoTo52);
        var power = (x * Vector512.Create(PerLnTwo) + rounding) - rounding;
        var r = (x - power * Vector512.Create(LnTwoHigh)) - power * Vector512.Create(LnTwoLow) + rest;
        var scale = Vector512.ShiftLeft((power + Vector512.Create(TwoTo52 + 1023)).AsUInt64(), 52).AsDouble();
        return Wide.Polynomial(ExpSeries, r) * scale;
    }

    /// <summary>ln x of positive normal numbers.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> Log(Vector512<double> x)
    {
        var bits = x.AsUInt64();
        var biased = Vector512.ShiftRightLogical(bits + Vector512.Create(OneBits - RootHalfBits), 52);
        var fraction = (bits + Vector512.Create(OneBits) - Vector512.ShiftLeft(biased, 52)).AsDouble(); // √½ ≤ fraction < √2
        var exponent = (biased | Vector512.Create(TwoTo52).AsUInt64()).AsDouble() - Vector512.Create(TwoTo52 + 1023);
        var one = Vector512.Create(1.0);
        var s = (fraction - one) / (fraction + one);
        var square = s * s;
        var series = s * (Wide.Polynomial(LogSeries, square) * square) + exponent * Vector512.Create(LnTwoLow);
        return exponent * Vector512.Create(LnTwoHigh) + ((s + s) + series);
    }
}
