using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using System.Runtime.Intrinsics.X86;

namespace Portfolio.Engine.Draws;

/// <summary>
/// Philox4x32-10: a counter of four 32-bit words and a key of two give four random words, with no state between calls.
/// Salmon, Moraes, Dror and Shaw, "Parallel random numbers: as easy as 1, 2, 3", SC'11, 2011.
/// </summary>
internal static class Philox
{
    private const int Rounds = 10;
    private const uint MultiplierA = 0xD2511F53, MultiplierB = 0xCD9E8D57;
    private const uint WeylA = 0x9E3779B9, WeylB = 0xBB67AE85;

    /// <summary>The four words of one counter.</summary>
    public static (uint W0, uint W1, uint W2, uint W3) Block(uint c0, uint c1, uint c2, uint c3, uint k0, uint k1)
    {
        for (var round = 0; round < Rounds; round++)
        {
            var a = (ulong)MultiplierA * c0;
            var b = (ulong)MultiplierB * c2;
            (c0, c1, c2, c3) = ((uint)(b >> 32) ^ c1 ^ k0, (uint)b, (uint)(a >> 32) ^ c3 ^ k1, (uint)a);
            k0 += WeylA;
            k1 += WeylB;
        }

        return (c0, c1, c2, c3);
    }

    /// <summary>
    /// The same for eight counters at once; a lane's low 32 bits hold its word, what stands above them on the way is ignored and
    /// may be anything in the result.
    /// </summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static void Block(
        ref Vector512<ulong> c0, ref Vector512<ulong> c1, ref Vector512<ulong> c2, ref Vector512<ulong> c3, uint k0, uint k1)
    {
        var multiplierA = Vector512.Create((ulong)MultiplierA);
        var multiplierB = Vector512.Create((ulong)MultiplierB);
        for (var round = 0; round < Rounds; round++)
        {
            var a = Product(multiplierA, c0);
            var b = Product(multiplierB, c2);
            c0 = Vector512.ShiftRightLogical(b, 32) ^ c1 ^ Vector512.Create((ulong)k0);
            c1 = b;
            c2 = Vector512.ShiftRightLogical(a, 32) ^ c3 ^ Vector512.Create((ulong)k1);
            c3 = a;
            k0 += WeylA;
            k1 += WeylB;
        }
    }

    /// <summary>64-bit products of the lanes' low 32 bits.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector512<ulong> Product(Vector512<ulong> left, Vector512<ulong> right)
    {
        if (Avx512F.IsSupported)
            return Avx512F.Multiply(left.AsUInt32(), right.AsUInt32());
        if (Avx2.IsSupported)
        {
            return Vector512.Create(
                Avx2.Multiply(left.GetLower().AsUInt32(), right.GetLower().AsUInt32()),
                Avx2.Multiply(left.GetUpper().AsUInt32(), right.GetUpper().AsUInt32()));
        }

        var low = Vector512.Create((ulong)uint.MaxValue);
        return (left & low) * (right & low);
    }
}
