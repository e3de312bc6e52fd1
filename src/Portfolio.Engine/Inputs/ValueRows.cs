using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;
using Portfolio.Engine.Calendars;

namespace Portfolio.Engine.Inputs;

/// <summary>
/// Arithmetic on rows of drawn values, eight iterations at a time; the same bits at every vector width. Rows of one call have one length.
/// </summary>
internal static class ValueRows
{
    private const int Lanes = 8;

    // Adding 1.5·2⁵² leaves a double's nearest whole number, ties to even, in the low bits of its pattern.
    private const double ToWhole = 6755399441055744.0;

    /// <summary>values = max(values, 0).</summary>
    public static void Floor(Span<double> values)
    {
        ref var v = ref MemoryMarshal.GetReference(values);
        var k = 0;
        for (; k <= values.Length - Lanes; k += Lanes)
            Vector512.Max(Vector512.LoadUnsafe(ref v, (nuint)k), Vector512<double>.Zero).StoreUnsafe(ref v, (nuint)k);
        for (; k < values.Length; k++)
            values[k] = Math.Max(values[k], 0);
    }

    /// <summary>values *= factors.</summary>
    public static void Multiply(Span<double> values, ReadOnlySpan<double> factors)
    {
        ref var v = ref MemoryMarshal.GetReference(values);
        ref var f = ref MemoryMarshal.GetReference(factors[..values.Length]);
        var k = 0;
        for (; k <= values.Length - Lanes; k += Lanes)
            (Vector512.LoadUnsafe(ref v, (nuint)k) * Vector512.LoadUnsafe(ref f, (nuint)k)).StoreUnsafe(ref v, (nuint)k);
        for (; k < values.Length; k++)
            values[k] *= factors[k];
    }

    /// <summary>values += addends.</summary>
    public static void Add(Span<double> values, ReadOnlySpan<double> addends)
    {
        ref var v = ref MemoryMarshal.GetReference(values);
        ref var a = ref MemoryMarshal.GetReference(addends[..values.Length]);
        var k = 0;
        for (; k <= values.Length - Lanes; k += Lanes)
            (Vector512.LoadUnsafe(ref v, (nuint)k) + Vector512.LoadUnsafe(ref a, (nuint)k)).StoreUnsafe(ref v, (nuint)k);
        for (; k < values.Length; k++)
            values[k] += addends[k];
    }

    /// <summary>scores = loading·factor + own·scores.</summary>
    public static void Mix(double loading, ReadOnlySpan<double> factor, double own, Span<double> scores)
    {
        ref var s = ref MemoryMarshal.GetReference(scores);
        ref var f = ref MemoryMarshal.GetReference(factor[..scores.Length]);
        var k = 0;
        for (; k <= scores.Length - Lanes; k += Lanes)
        {
            var mixed = Vector512.Create(loading) * Vector512.LoadUnsafe(ref f, (nuint)k)
                + Vector512.Create(own) * Vector512.LoadUnsafe(ref s, (nuint)k);
            mixed.StoreUnsafe(ref s, (nuint)k);
        }
        for (; k < scores.Length; k++)
            scores[k] = loading * factor[k] + own * scores[k];
    }

    /// <summary>cost += rates × the working days that the minutes make.</summary>
    public static void AddWorked(Span<double> cost, ReadOnlySpan<double> rates, ReadOnlySpan<int> minutes)
    {
        ref var c = ref MemoryMarshal.GetReference(cost);
        ref var r = ref MemoryMarshal.GetReference(rates[..cost.Length]);
        ref var m = ref MemoryMarshal.GetReference(minutes[..cost.Length]);
        var k = 0;
        for (; k <= cost.Length - Lanes; k += Lanes)
        {
            var (lower, upper) = Vector256.Widen(Vector256.LoadUnsafe(ref m, (nuint)k));
            var days = Vector512.ConvertToDouble(Vector512.Create(lower, upper)) / Vector512.Create((double)WorkTime.MinutesPerDay);
            (Vector512.LoadUnsafe(ref c, (nuint)k) + Vector512.LoadUnsafe(ref r, (nuint)k) * days).StoreUnsafe(ref c, (nuint)k);
        }
        for (; k < cost.Length; k++)
            cost[k] += rates[k] * Minutes.Days(minutes[k]);
    }

    /// <summary>Working days, none negative, as whole minutes; as <see cref="Minutes.OfWork"/>.</summary>
    public static void ToMinutes(ReadOnlySpan<double> days, Span<int> minutes)
    {
        ref var d = ref MemoryMarshal.GetReference(days[..minutes.Length]);
        ref var m = ref MemoryMarshal.GetReference(minutes);
        var k = 0;
        for (; k <= minutes.Length - 2 * Lanes; k += 2 * Lanes)
        {
            var (lower, upper) = (Whole(Vector512.LoadUnsafe(ref d, (nuint)k)), Whole(Vector512.LoadUnsafe(ref d, (nuint)(k + Lanes))));
            Vector512.Narrow(lower, upper).StoreUnsafe(ref m, (nuint)k);
        }
        for (; k < minutes.Length; k++)
            minutes[k] = Minutes.OfWork(days[k]);
    }

    private static Vector512<long> Whole(Vector512<double> days)
    {
        var minutes = Vector512.Min(days * Vector512.Create((double)WorkTime.MinutesPerDay), Vector512.Create(Minutes.Longest));
        return (minutes + Vector512.Create(ToWhole)).AsInt64();
    }
}
