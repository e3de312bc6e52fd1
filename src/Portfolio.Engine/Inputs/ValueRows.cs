using System.Runtime.CompilerServices;
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

    /// <summary>product = left × right; the product may be one of them.</summary>
    public static void Multiply(ReadOnlySpan<double> left, ReadOnlySpan<double> right, Span<double> product)
    {
        ref var l = ref MemoryMarshal.GetReference(left[..product.Length]);
        ref var r = ref MemoryMarshal.GetReference(right[..product.Length]);
        ref var p = ref MemoryMarshal.GetReference(product);
        var k = 0;
        for (; k <= product.Length - Lanes; k += Lanes)
            (Vector512.LoadUnsafe(ref l, (nuint)k) * Vector512.LoadUnsafe(ref r, (nuint)k)).StoreUnsafe(ref p, (nuint)k);
        for (; k < product.Length; k++)
            product[k] = left[k] * right[k];
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

    /// <summary>cost += values × factors.</summary>
    public static void AddProduct(Span<double> cost, RowOrNumber values, RowOrNumber factors)
    {
        ref var c = ref MemoryMarshal.GetReference(cost);
        var k = 0;
        for (; k <= cost.Length - Lanes; k += Lanes)
            (Vector512.LoadUnsafe(ref c, (nuint)k) + values.Eight(k) * factors.Eight(k)).StoreUnsafe(ref c, (nuint)k);
        for (; k < cost.Length; k++)
            cost[k] += values[k] * factors[k];
    }

    /// <summary>cost += (values + rates × the working days that the minutes make) × factors.</summary>
    public static void AddWorked(
        Span<double> cost, RowOrNumber values, RowOrNumber rates, ReadOnlySpan<int> minutes, RowOrNumber factors)
    {
        ref var c = ref MemoryMarshal.GetReference(cost);
        ref var m = ref MemoryMarshal.GetReference(minutes[..cost.Length]);
        var k = 0;
        for (; k <= cost.Length - Lanes; k += Lanes)
        {
            var (lower, upper) = Vector256.Widen(Vector256.LoadUnsafe(ref m, (nuint)k));
            var days = Vector512.ConvertToDouble(Vector512.Create(lower, upper)) / Vector512.Create((double)WorkTime.MinutesPerDay);
            var paid = (values.Eight(k) + rates.Eight(k) * days) * factors.Eight(k);
            (Vector512.LoadUnsafe(ref c, (nuint)k) + paid).StoreUnsafe(ref c, (nuint)k);
        }
        for (; k < cost.Length; k++)
            cost[k] += (values[k] + rates[k] * Minutes.Days(minutes[k])) * factors[k];
    }

    /// <summary>Whole minutes, as <see cref="Minutes.OfWork"/>, of the days, negative ones counted as 0, × factors + delays, none negative.</summary>
    public static void ToMinutes(RowOrNumber days, RowOrNumber factors, RowOrNumber delays, Span<int> minutes)
    {
        ref var m = ref MemoryMarshal.GetReference(minutes);
        var k = 0;
        for (; k <= minutes.Length - 2 * Lanes; k += 2 * Lanes)
        {
            var lower = Whole(days.Eight(k), factors.Eight(k), delays.Eight(k));
            var upper = Whole(days.Eight(k + Lanes), factors.Eight(k + Lanes), delays.Eight(k + Lanes));
            Vector512.Narrow(lower, upper).StoreUnsafe(ref m, (nuint)k);
        }
        for (; k < minutes.Length; k++)
            minutes[k] = Minutes.OfWork(Math.Max(days[k], 0) * factors[k] + delays[k]);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector512<long> Whole(Vector512<double> days, Vector512<double> factors, Vector512<double> delays)
    {
        var worked = Vector512.MaxNative(days, Vector512<double>.Zero) * factors + delays;
        var minutes = Vector512.MinNative(worked * Vector512.Create((double)WorkTime.MinutesPerDay), Vector512.Create(Minutes.Longest));
        return (minutes + Vector512.Create(ToWhole)).AsInt64();
    }
}
