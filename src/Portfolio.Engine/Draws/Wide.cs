using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace Portfolio.Engine.Draws;

/// <summary>A function of one number, worked eight numbers at a time.</summary>
internal interface IWideFunction
{
    Vector512<double> At(Vector512<double> x);
}

/// <summary>
/// Applies functions to spans. Only +, −, ×, ÷, √, bit operations and the fused multiply-add of IEEE 754 are used, all of which round once
/// and correctly, so that the results have the same bits at every vector width and in whichever lane a number stands; where 512-bit registers
/// or the fused operation are absent the runtime splits or emulates them.
/// </summary>
internal static class Wide
{
    public const int Lanes = 8;

    /// <summary>Writes f(<paramref name="x"/>) to <paramref name="y"/> (at least as long; may be the same span).</summary>
    public static void Map<TFunction>(TFunction function, ReadOnlySpan<double> x, Span<double> y)
        where TFunction : struct, IWideFunction
    {
        y = y[..x.Length];
        ref var source = ref MemoryMarshal.GetReference(x);
        ref var target = ref MemoryMarshal.GetReference(y);
        var whole = x.Length - x.Length % Lanes;
        for (var i = 0; i < whole; i += Lanes)
            function.At(Vector512.LoadUnsafe(ref source, (nuint)i)).StoreUnsafe(ref target, (nuint)i);
        if (whole < x.Length)
            MapRest(function, x[whole..], y[whole..]);
    }

    /// <summary>f at one number, the same bits as within a span.</summary>
    public static double At<TFunction>(TFunction function, double x)
        where TFunction : struct, IWideFunction => function.At(Vector512.Create(x)).ToScalar();

    /// <summary>y += factor·x, number by number; <paramref name="y"/> is at least as long.</summary>
    public static void AddScaled(double factor, ReadOnlySpan<double> x, Span<double> y)
    {
        y = y[..x.Length];
        ref var source = ref MemoryMarshal.GetReference(x);
        ref var target = ref MemoryMarshal.GetReference(y);
        var i = 0;
        for (; i + Lanes <= x.Length; i += Lanes)
        {
            var sum = Fused(Vector512.Create(factor), Vector512.LoadUnsafe(ref source, (nuint)i), Vector512.LoadUnsafe(ref target, (nuint)i));
            sum.StoreUnsafe(ref target, (nuint)i);
        }

        for (; i < x.Length; i++)
            y[i] = Math.FusedMultiplyAdd(factor, x[i], y[i]);
    }

    private static void MapRest<TFunction>(TFunction function, ReadOnlySpan<double> x, Span<double> y)
        where TFunction : struct, IWideFunction
    {
        Span<double> rest = stackalloc double[Lanes];
        rest.Fill(x[0]);
        x.CopyTo(rest);
        function.At(Vector512.Create<double>(rest)).CopyTo(rest);
        rest[..x.Length].CopyTo(y);
    }

    /// <summary>
    /// Polynomial, highest coefficient first: groups of four terms by Estrin's scheme, the groups by Horner's rule in x⁴. As many operations as
    /// Horner's rule throughout, but a quarter as long a chain of them, and it is the chain that costs time.
    /// </summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> Polynomial(ReadOnlySpan<double> coefficients, Vector512<double> x)
    {
        ref var c = ref MemoryMarshal.GetReference(coefficients);
        var (x2, x4) = (x * x, x * x * (x * x));
        var i = (coefficients.Length - 1) % 4 + 1;
        var sum = Vector512.Create(c);
        if (i > 1)
            sum = Fused(sum, x, Vector512.Create(Unsafe.Add(ref c, 1)));
        if (i == 3)
            sum = Fused(sum, x, Vector512.Create(Unsafe.Add(ref c, 2)));
        if (i == 4)
            sum = Fused(sum, x2, Fused(Vector512.Create(Unsafe.Add(ref c, 2)), x, Vector512.Create(Unsafe.Add(ref c, 3))));
        for (; i < coefficients.Length; i += 4)
        {
            var upper = Fused(Vector512.Create(Unsafe.Add(ref c, i)), x, Vector512.Create(Unsafe.Add(ref c, i + 1)));
            var lower = Fused(Vector512.Create(Unsafe.Add(ref c, i + 2)), x, Vector512.Create(Unsafe.Add(ref c, i + 3)));
            sum = Fused(sum, x4, Fused(upper, x2, lower));
        }

        return sum;
    }

    /// <summary>x·y + z rounded once.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> Fused(Vector512<double> x, Vector512<double> y, Vector512<double> z) => Vector512.FusedMultiplyAdd(x, y, z);
}
