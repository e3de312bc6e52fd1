using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;

namespace Portfolio.Engine.Distributions;

/// <summary>
/// A smooth function of the normal score as cubic pieces on equal intervals of 1/8 from −8.5 to 8.5; scores beyond are read at the end.
/// Layout: four coefficients of the place within the interval (0…1), constant first, interval after interval.
/// </summary>
internal static class ScorePieces
{
    private const int PerUnit = 8, Intervals = 136;
    private const double First = -8.5;

    /// <summary>Knots beyond either end that the slopes need.</summary>
    private const int Margin = 3;

    /// <summary>Numbers in a table of pieces.</summary>
    public const int Length = 4 * Intervals;

    /// <summary>Knots at which the function must be known.</summary>
    public const int Knots = Intervals + 1 + 2 * Margin;

    /// <summary>The score of a knot, 0 … <see cref="Knots"/> − 1; knots lie symmetrically about 0.</summary>
    public static double Knot(int k) => First + (double)(k - Margin) / PerUnit;

    /// <summary>
    /// Pieces that meet with their first derivative: cubic Hermite interpolation of <paramref name="at"/> (values at the knots) with slopes by
    /// the sixth-order central difference, scaled to offset + scale·value.
    /// </summary>
    public static void Write(ReadOnlySpan<double> at, double offset, double scale, Span<double> pieces)
    {
        var slope = Slope(at, Margin);
        for (var i = 0; i < Intervals; i++)
        {
            var k = i + Margin;
            var rise = at[k + 1] - at[k];
            var next = Slope(at, k + 1);
            var piece = pieces.Slice(4 * i, 4);
            piece[0] = offset + scale * at[k];
            piece[1] = scale * slope;
            piece[2] = scale * (3 * rise - 2 * slope - next);
            piece[3] = scale * (slope + next - 2 * rise);
            slope = next;
        }
    }

    /// <summary>Values at the scores, held between <paramref name="least"/> and <paramref name="greatest"/>.</summary>
    public static void Read(ReadOnlySpan<double> pieces, ReadOnlySpan<double> scores, Span<double> values, double least, double greatest)
    {
        values = values[..scores.Length];
        ref var table = ref MemoryMarshal.GetReference(pieces[..Length]);
        for (var i = 0; i < scores.Length; i++)
        {
            var place = double.MinNative(double.MaxNative((scores[i] - First) * PerUnit, 0), Intervals - 1e-9);
            var interval = (int)place;
            place -= interval;
            ref var piece = ref Unsafe.Add(ref table, 4 * interval);
            var value = Math.FusedMultiplyAdd(Unsafe.Add(ref piece, 3), place, Unsafe.Add(ref piece, 2));
            value = Math.FusedMultiplyAdd(Math.FusedMultiplyAdd(value, place, Unsafe.Add(ref piece, 1)), place, piece);
            values[i] = double.MinNative(double.MaxNative(value, least), greatest);
        }
    }

    private static double Slope(ReadOnlySpan<double> at, int k) =>
        (45 * (at[k + 1] - at[k - 1]) - 9 * (at[k + 2] - at[k - 2]) + (at[k + 3] - at[k - 3])) / 60;
}
