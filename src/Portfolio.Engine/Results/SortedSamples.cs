using System.Buffers;
using System.Numerics;

namespace Portfolio.Engine.Results;

/// <summary>
/// The values of one series in rising order, in rented memory: minutes, or whole minor units (exact in a double up to 2⁵³). What does not
/// happen is left out. Dispose it after use; not for sharing.
/// </summary>
internal sealed class SortedSamples : IDisposable
{
    private const int Digit = 11; // bits a pass: 2,048 counters stay in the first-level cache
    private const int SmallEnough = 512;

    private long[] values;

    private SortedSamples(int capacity) => values = ArrayPool<long>.Shared.Rent(capacity);

    /// <summary>The values that happen, rising.</summary>
    public ReadOnlySpan<long> Values => values.AsSpan(0, Count);

    public int Count { get; private set; }

    public static SortedSamples Of(ReadOnlySpan<int> minutes)
    {
        var sorted = new SortedSamples(minutes.Length);
        foreach (var instant in minutes)
            if (instant != Instants.Never) sorted.values[sorted.Count++] = instant;
        sorted.Sort();
        return sorted;
    }

    public static SortedSamples Of(ReadOnlySpan<double> minor)
    {
        var sorted = new SortedSamples(minor.Length) { Count = minor.Length };
        for (var i = 0; i < minor.Length; i++) sorted.values[i] = (long)minor[i];
        sorted.Sort();
        return sorted;
    }

    /// <summary>How many values satisfy a condition that holds for small values and fails for large ones.</summary>
    public int CountWhile(Func<long, bool> holds)
    {
        var (low, high) = (0, Count);
        while (low < high)
        {
            var middle = (low + high) >>> 1;
            if (holds(values[middle])) low = middle + 1;
            else high = middle;
        }
        return low;
    }

    /// <summary>The exact sum.</summary>
    public Int128 Sum()
    {
        Int128 sum = 0;
        foreach (var value in Values) sum += value;
        return sum;
    }

    /// <summary>Standard deviation of the values themselves (divisor n), as the percentiles are those of the values themselves.</summary>
    public double Sd(double mean)
    {
        var squares = 0.0;
        foreach (var value in Values) squares += (value - mean) * (value - mean);
        return Math.Sqrt(squares / Count);
    }

    public void Dispose()
    {
        ArrayPool<long>.Shared.Return(values);
        values = [];
        Count = 0;
    }

    /// <summary>Least-significant-digit radix sort on the distance from the smallest value; as many passes as the range needs.</summary>
    private void Sort()
    {
        var span = values.AsSpan(0, Count);
        if (Count <= SmallEnough)
        {
            span.Sort();
            return;
        }
        var (min, max) = Range(span);
        var other = ArrayPool<long>.Shared.Rent(Count);
        var bits = 64 - BitOperations.LeadingZeroCount((ulong)(max - min));
        for (var shift = 0; shift < bits; shift += Digit)
        {
            Pass(values.AsSpan(0, Count), other, min, shift);
            (values, other) = (other, values);
        }
        ArrayPool<long>.Shared.Return(other);
    }

    private static void Pass(ReadOnlySpan<long> from, Span<long> to, long min, int shift)
    {
        Span<int> place = stackalloc int[1 << Digit];
        place.Clear();
        const ulong mask = (1UL << Digit) - 1;
        foreach (var value in from) place[(int)(((ulong)(value - min) >> shift) & mask)]++;
        var next = 0;
        for (var i = 0; i < place.Length; i++) (place[i], next) = (next, next + place[i]);
        foreach (var value in from) to[place[(int)(((ulong)(value - min) >> shift) & mask)]++] = value;
    }

    private static (long Min, long Max) Range(ReadOnlySpan<long> span)
    {
        var (min, max) = (span[0], span[0]);
        foreach (var value in span) (min, max) = (Math.Min(min, value), Math.Max(max, value));
        return (min, max);
    }
}
