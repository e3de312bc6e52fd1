using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;
using System.Runtime.Intrinsics.X86;

namespace Portfolio.Engine.Draws;

/// <summary>
/// Uniform draws on the open interval (0, 1) with 53 bits, a function of seed, key and iteration alone. The block with counter
/// (⌊i/2⌋, 0, key hash) and the seed as key serves two iterations: words 0 and 1 the even one, words 2 and 3 the odd one.
/// Every vector width gives the same bits.
/// </summary>
internal static class Uniforms
{
    /// <summary>Largest double below 1; rounding would otherwise reach 1 where all 53 bits are set.</summary>
    public const double Greatest = 1 - 1.0 / (1L << 53);

    private const double Unit = 1.0 / (1L << 53);

    /// <summary>Iterations served by one step of the wide loop.</summary>
    private const int Stride = 16;

    /// <summary>
    /// Fills <paramref name="u"/> with the draws of the iterations from <paramref name="firstIteration"/> (≥ 0, below 2³³) on.
    /// </summary>
    public static void Fill(ulong seed, ulong keyHash, long firstIteration, Span<double> u)
    {
        var done = 0;
        if ((firstIteration & 1) != 0 && u.Length > 0)
            u[done++] = Pair(seed, keyHash, firstIteration >> 1).Odd;
        done += FillWide(seed, keyHash, (firstIteration + done) >> 1, u[done..]);
        for (; done < u.Length; done += 2)
        {
            var (even, odd) = Pair(seed, keyHash, (firstIteration + done) >> 1);
            u[done] = even;
            if (done + 1 < u.Length)
                u[done + 1] = odd;
        }
    }

    /// <summary>The uniform that 64 random bits stand for: their upper 53 and a half, never 0 or 1.</summary>
    public static double Of(uint high, uint low) =>
        Math.Min(((((ulong)high << 32) | low) >> 11) * Unit + Unit / 2, Greatest);

    private static (double Even, double Odd) Pair(ulong seed, ulong keyHash, long pair)
    {
        var (w0, w1, w2, w3) = Philox.Block((uint)pair, 0, (uint)keyHash, (uint)(keyHash >> 32), (uint)seed, (uint)(seed >> 32));
        return (Of(w0, w1), Of(w2, w3));
    }

    private static int FillWide(ulong seed, ulong keyHash, long firstPair, Span<double> u)
    {
        var steps = u.Length / Stride;
        ref var target = ref MemoryMarshal.GetReference(u);
        var counter = Vector512.Create((ulong)firstPair) + Vector512.Create(0UL, 1, 2, 3, 4, 5, 6, 7);
        for (var step = 0; step < steps; step++)
        {
            var c0 = counter;
            var c1 = Vector512<ulong>.Zero;
            var c2 = Vector512.Create((ulong)(uint)keyHash);
            var c3 = Vector512.Create(keyHash >> 32);
            Philox.Block(ref c0, ref c1, ref c2, ref c3, (uint)seed, (uint)(seed >> 32));
            Interleave(Of(c0, c1), Of(c2, c3), ref Unsafe.Add(ref target, step * Stride));
            counter += Vector512.Create(8UL);
        }

        return steps * Stride;
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector512<double> Of(Vector512<ulong> high, Vector512<ulong> low)
    {
        var word = Vector512.Create((ulong)uint.MaxValue);
        var bits = Vector512.ShiftLeft(high & word, 21) | Vector512.ShiftRightLogical(low & word, 11);
        var u = Vector512.ConvertToDouble(bits) * Vector512.Create(Unit) + Vector512.Create(Unit / 2);
        return Vector512.MinNative(u, Vector512.Create(Greatest));
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void Interleave(Vector512<double> even, Vector512<double> odd, ref double target)
    {
        if (Avx512F.IsSupported)
        {
            Avx512F.PermuteVar8x64x2(even, Vector512.Create(0L, 8, 1, 9, 2, 10, 3, 11), odd).StoreUnsafe(ref target);
            Avx512F.PermuteVar8x64x2(even, Vector512.Create(4L, 12, 5, 13, 6, 14, 7, 15), odd).StoreUnsafe(ref target, 8);
            return;
        }

        for (var lane = 0; lane < 8; lane++)
        {
            Unsafe.Add(ref target, 2 * lane) = even.GetElement(lane);
            Unsafe.Add(ref target, 2 * lane + 1) = odd.GetElement(lane);
        }
    }
}
