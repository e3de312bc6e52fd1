using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;
using System.Runtime.Intrinsics.X86;
using Portfolio.Engine.Draws;

namespace Portfolio.Engine.Distributions;

/// <summary>
/// A smooth function of the normal score as polynomials of degree 5 on sixteen equal intervals between −4 and 4, which meet at their ends.
/// Layout: the constant terms of all pieces, then their linear terms, and so on: sixteen doubles are two registers, out of which one
/// instruction takes the right term for each of eight scores. One score in 16,000 lies outside; there the exact formula is worked.
/// </summary>
internal static class ScorePieces
{
    public const int Pieces = 16, Terms = 6;

    /// <summary>Numbers in a table of pieces, and nodes at which the function must be known.</summary>
    public const int Length = Pieces * Terms;

    /// <summary>Scores between ± this may be read; a little less than the pieces cover, so that no rounding reaches past them.</summary>
    public const double Reach = 3.999;

    private const double PerUnit = 2, FirstMiddle = 7.5;

    // Adding 1.5·2⁵² leaves the nearest whole number in the low bits of a double's pattern.
    private const double ToWhole = 6755399441055744.0;

    // ½·cos(πj/5): the Chebyshev points with both ends, from −½ to ½ about the middle of a piece.
    private static ReadOnlySpan<double> Points =>
        [-0.5, -0.4045084971874737, -0.15450849718747373, 0.15450849718747373, 0.4045084971874737, 0.5];

    /// <summary>The score of a node, 0 … <see cref="Length"/> − 1, piece after piece; nodes lie symmetrically about 0.</summary>
    public static double Node(int node) => (node / Terms - FirstMiddle + Points[node % Terms]) / PerUnit;

    /// <summary>The pieces of a function.</summary>
    public static double[] Of(Func<double, double> function)
    {
        var pieces = new double[Length];
        Fit([.. Enumerable.Range(0, Length).Select(node => function(Node(node)))], pieces);
        return pieces;
    }

    /// <summary>The pieces of the function with these values at the nodes; the spans must not overlap.</summary>
    public static void Fit(ReadOnlySpan<double> at, Span<double> pieces)
    {
        Span<double> terms = stackalloc double[Terms];
        for (var piece = 0; piece < Pieces; piece++)
        {
            at.Slice(piece * Terms, Terms).CopyTo(terms);
            Interpolate(terms);
            for (var term = 0; term < Terms; term++)
                pieces[term * Pieces + piece] = terms[term];
        }
    }

    /// <summary>offset + scale times the function, in place.</summary>
    public static void Scale(double offset, double scale, Span<double> pieces)
    {
        foreach (ref var term in pieces)
            term *= scale;
        foreach (ref var constant in pieces[..Pieces])
            constant += offset;
    }

    /// <summary>Values at scores between ±<see cref="Reach"/>; elsewhere something.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> At(ReadOnlySpan<double> pieces, Vector512<double> scores)
    {
        ref var term = ref MemoryMarshal.GetReference(pieces);
        var place = Wide.Fused(scores, Vector512.Create(PerUnit), Vector512.Create(FirstMiddle));
        var whole = place + Vector512.Create(ToWhole);
        var within = place - (whole - Vector512.Create(ToWhole));
        var piece = whole.AsInt64();
        var high = Wide.Fused(Pick(ref term, 5, piece), within, Pick(ref term, 4, piece));
        var middle = Wide.Fused(Pick(ref term, 3, piece), within, Pick(ref term, 2, piece));
        var low = Wide.Fused(Pick(ref term, 1, piece), within, Pick(ref term, 0, piece));
        var square = within * within;
        return Wide.Fused(Wide.Fused(high, square, middle), square, low);
    }

    /// <summary>True where pieces cannot be read.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> Beyond(Vector512<double> scores) =>
        Vector512.GreaterThanOrEqual(Vector512.Abs(scores), Vector512.Create(Reach));

    // The term of the piece that the low four bits of each lane tell.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector512<double> Pick(ref double terms, int term, Vector512<long> piece)
    {
        ref var first = ref Unsafe.Add(ref terms, term * Pieces);
        if (Avx512F.IsSupported)
            return Avx512F.PermuteVar8x64x2(Vector512.LoadUnsafe(ref first), piece, Vector512.LoadUnsafe(ref first, Wide.Lanes));
        return Vector512.Create(
            One(ref first, piece[0]), One(ref first, piece[1]), One(ref first, piece[2]), One(ref first, piece[3]),
            One(ref first, piece[4]), One(ref first, piece[5]), One(ref first, piece[6]), One(ref first, piece[7]));
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static double One(ref double terms, long piece) => Unsafe.Add(ref terms, (nint)(piece & (Pieces - 1)));

    // Values at the points become the terms of the polynomial through them: divided differences, then powers by Horner's rule.
    private static void Interpolate(Span<double> terms)
    {
        for (var order = 1; order < Terms; order++)
        {
            for (var j = Terms - 1; j >= order; j--)
                terms[j] = (terms[j] - terms[j - 1]) / (Points[j] - Points[j - order]);
        }
        for (var k = Terms - 2; k >= 0; k--)
        {
            for (var j = k; j < Terms - 1; j++)
                terms[j] -= Points[k] * terms[j + 1];
        }
    }
}
