using System.Numerics;
using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using System.Runtime.Intrinsics.X86;

namespace Portfolio.Engine.Draws;

/// <summary>The standard normal distribution: scores of uniforms and back. The same bits on every processor.</summary>
internal static class NormalScore
{
    /// <summary>Standard normal draws of the iterations from <paramref name="firstIteration"/> on.</summary>
    public static void Fill(ulong seed, ulong keyHash, long firstIteration, Span<double> scores)
    {
        Uniforms.Fill(seed, keyHash, firstIteration, scores);
        InverseNormal.Map(scores, scores);
    }

    /// <summary>Φ⁻¹(u), 0 &lt; u &lt; 1; relative error below 2·10⁻¹⁵.</summary>
    public static double Inverse(double u) => Wide.At(new InverseNormal(), u);

    /// <summary>Φ⁻¹ of each; the spans may be the same.</summary>
    public static void Inverse(ReadOnlySpan<double> u, Span<double> scores) => InverseNormal.Map(u, scores);

    /// <summary>Φ(z), relative error below 2·10⁻¹⁵ in the lower tail down to z = −37.5 (10⁻³⁰⁸), where it stays.</summary>
    public static double Phi(double z) => Wide.At(new NormalCdf(), z);

    /// <summary>Φ of each; the spans may be the same.</summary>
    public static void Phi(ReadOnlySpan<double> scores, Span<double> u) => Wide.Map(new NormalCdf(), scores, u);
}

/// <summary>Φ⁻¹ by algorithm AS 241, PPND16: Wichura, Applied Statistics 37(3), 1988, 477–484; coefficients as published, highest first.</summary>
internal readonly struct InverseNormal : IWideFunction
{
    private const double CentralHalfWidth = 0.425;

    private const int TailBatch = 64;

    private static ReadOnlySpan<double> CentralA =>
    [
        2.5090809287301226727e3, 3.3430575583588128105e4, 6.7265770927008700853e4, 4.5921953931549871457e4,
        1.3731693765509461125e4, 1.9715909503065514427e3, 1.3314166789178437745e2, 3.3871328727963666080,
    ];

    private static ReadOnlySpan<double> CentralB =>
    [
        5.2264952788528545610e3, 2.8729085735721942674e4, 3.9307895800092710610e4, 2.1213794301586595867e4,
        5.3941960214247511077e3, 6.8718700749205790830e2, 4.2313330701600911252e1, 1,
    ];

    private static ReadOnlySpan<double> TailC =>
    [
        7.74545014278341407640e-4, 2.27238449892691845833e-2, 2.41780725177450611770e-1, 1.27045825245236838258,
        3.64784832476320460504, 5.76949722146069140550, 4.63033784615654529590, 1.42343711074968357734,
    ];

    private static ReadOnlySpan<double> TailD =>
    [
        1.05075007164441684324e-9, 5.47593808499534494600e-4, 1.51986665636164571966e-2, 1.48103976427480074590e-1,
        6.89767334985100004550e-1, 1.67638483018380384940, 2.05319162663775882187, 1,
    ];

    private static ReadOnlySpan<double> FarE =>
    [
        2.01033439929228813265e-7, 2.71155556874348757815e-5, 1.24266094738807843860e-3, 2.65321895265761230930e-2,
        2.96560571828504891230e-1, 1.78482653991729133580, 5.46378491116411436990, 6.65790464350110377720,
    ];

    private static ReadOnlySpan<double> FarF =>
    [
        2.04426310338993978564e-15, 1.42151175831644588870e-7, 1.84631831751005468180e-5, 7.86869131145613259100e-4,
        1.48753612908506148525e-2, 1.36929880922735805310e-1, 5.99832206555887937690e-1, 1,
    ];

    /// <summary>
    /// Φ⁻¹ of each; the spans may be the same. The central formula is worked for all; the 15 % in the tails, whose formula costs several times
    /// as much, are then gathered and worked together.
    /// </summary>
    [SkipLocalsInit]
    public static void Map(ReadOnlySpan<double> u, Span<double> scores)
    {
        scores = scores[..u.Length];
        Span<double> tails = stackalloc double[TailBatch + 2 * Wide.Lanes];
        Span<double> places = stackalloc double[TailBatch + 2 * Wide.Lanes];
        var found = 0;
        var i = 0;
        for (; i <= u.Length - Wide.Lanes; i += Wide.Lanes)
        {
            var x = Vector512.Create(u.Slice(i, Wide.Lanes));
            var q = x - Vector512.Create(0.5);
            found += Gather(x, Vector512.GreaterThan(Vector512.Abs(q), Vector512.Create(CentralHalfWidth)), i, tails[found..], places[found..]);
            Central(q).CopyTo(scores[i..]);
            if (found >= TailBatch)
                found = Scatter(tails, places, found, scores);
        }
        for (; i < u.Length; i++)
            (tails[found], places[found++]) = (u[i], i);
        Scatter(tails, places, found, scores);
    }

    public Vector512<double> At(Vector512<double> u)
    {
        var q = u - Vector512.Create(0.5);
        var central = Vector512.LessThanOrEqual(Vector512.Abs(q), Vector512.Create(CentralHalfWidth));
        return Vector512.ConditionalSelect(central, Central(q), Tail(u, q));
    }

    // Appends the numbers in the tails and their places; returns how many. Writes a whole vector, of which only those count.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static int Gather(Vector512<double> u, Vector512<double> outside, int first, Span<double> tails, Span<double> places)
    {
        var mask = outside.ExtractMostSignificantBits();
        var place = Vector512.Create((double)first) + Vector512.Create(0.0, 1, 2, 3, 4, 5, 6, 7);
        if (Avx512F.IsSupported)
        {
            Avx512F.Compress(u, outside, u).CopyTo(tails);
            Avx512F.Compress(place, outside, place).CopyTo(places);
            return BitOperations.PopCount(mask);
        }
        var found = 0;
        for (var lane = 0; lane < Wide.Lanes; lane++)
        {
            (tails[found], places[found]) = (u[lane], first + lane);
            found += (int)(mask >> lane) & 1;
        }
        return found;
    }

    // Works the gathered numbers and puts them in their places; none is left.
    private static int Scatter(Span<double> gathered, ReadOnlySpan<double> places, int found, Span<double> scores)
    {
        gathered[found..].Fill(0.5);
        for (var i = 0; i < found; i += Wide.Lanes)
            default(InverseNormal).At(Vector512.Create<double>(gathered.Slice(i, Wide.Lanes))).CopyTo(gathered[i..]);
        for (var i = 0; i < found; i++)
            scores[(int)places[i]] = gathered[i];
        return 0;
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector512<double> Central(Vector512<double> q)
    {
        var square = Vector512.Create(CentralHalfWidth * CentralHalfWidth) - q * q;
        return q * Wide.Polynomial(CentralA, square) / Wide.Polynomial(CentralB, square);
    }

    private static Vector512<double> Tail(Vector512<double> u, Vector512<double> q)
    {
        var tail = Vector512.Sqrt(-Elementary.Log(Vector512.MinNative(u, Vector512.Create(1.0) - u)));
        var near = tail - Vector512.Create(1.6);
        var (over, under) = (Wide.Polynomial(TailC, near), Wide.Polynomial(TailD, near));
        var far = Vector512.GreaterThan(tail, Vector512.Create(5.0));
        if (far != Vector512<double>.Zero) // once in 40 thousand million draws
            (over, under) = Far(tail, far, over, under);
        var score = over / under;
        return Vector512.ConditionalSelect(Vector512.LessThan(q, Vector512<double>.Zero), -score, score);
    }

    [MethodImpl(MethodImplOptions.NoInlining)]
    private static (Vector512<double> Over, Vector512<double> Under) Far(
        Vector512<double> tail, Vector512<double> far, Vector512<double> over, Vector512<double> under)
    {
        var r = tail - Vector512.Create(5.0);
        return (Vector512.ConditionalSelect(far, Wide.Polynomial(FarE, r), over), Vector512.ConditionalSelect(far, Wide.Polynomial(FarF, r), under));
    }
}

/// <summary>
/// Φ(z) = e^(−z²/2)·P(t)/(|z| + 5) with t = (|z| − 5)/(|z| + 5) for z ≤ 0, one less that above. P is the Chebyshev interpolant of degree 24 of
/// Φ(−z)·e^(z²/2)·(z + 5), computed with 50 digits; its own error is below 10⁻¹⁶.
/// </summary>
internal readonly struct NormalCdf : IWideFunction
{
    private const double Furthest = 37.5;

    private static ReadOnlySpan<double> P =>
    [
        1.293585043172264e-10, -1.3257025388451077e-10, -1.5616328191231981e-09, 1.2682007125726964e-09, 1.1312676436572751e-08,
        -6.932887246302887e-09, -7.048962494230879e-08, 3.856007040219001e-08, 4.364151268952791e-07, -3.3353249867432987e-07,
        -2.770734796050303e-06, 3.979355531855443e-06, 1.6681634711293694e-05, -4.976232562740196e-05, -5.937580520734689e-05,
        0.0005448989678067301, -0.0007978693896214666, -0.0029933767588929696, 0.02079506679927978, -0.0691186387070788,
        0.16502036617040705, -0.3135331566712811, 0.4953056159699761, -0.665382502890057, 0.769193049750063,
    ];

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector512<double> At(Vector512<double> x)
    {
        var tail = Tail(x);
        return Vector512.ConditionalSelect(Vector512.LessThan(x, Vector512<double>.Zero), tail, Vector512.Create(1.0) - tail);
    }

    /// <summary>Φ(−|z|).</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> Tail(Vector512<double> z)
    {
        var a = Vector512.MinNative(Vector512.Abs(z), Vector512.Create(Furthest));
        var inverse = Vector512.Create(1.0) / (a + Vector512.Create(5.0));
        var t = (a - Vector512.Create(5.0)) * inverse;

        // a²/2 with all its digits: the square of a rounded to sixteenths is exact, the rest is small.
        var rounding = Vector512.Create(1.5 * (1L << 48));
        var coarse = (a + rounding) - rounding;
        var half = Vector512.Create(-0.5);
        var density = Elementary.Exp(half * coarse * coarse, half * (a - coarse) * (a + coarse));
        return Wide.Polynomial(P, t) * inverse * density;
    }
}
