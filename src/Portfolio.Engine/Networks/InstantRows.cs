using System.Runtime.Intrinsics;
using Portfolio.Engine.Calendars;

namespace Portfolio.Engine.Networks;

/// <summary>
/// Calendar arithmetic on rows of instants. In the scale of working time it is shifts and sums, several iterations at a time; in minutes
/// it goes through the calendar's tables one by one. All rows have one length; target and source may be the same row.
/// </summary>
internal static class InstantRows
{
    private const int Lanes = 16;

    /// <summary>Ends of work begun at the starts; no work leaves the instant.</summary>
    public static void Add(WorkTime calendar, ReadOnlySpan<int> starts, ReadOnlySpan<int> work, Span<int> ends)
    {
        var k = 0;
        if (calendar.Working)
        {
            for (; k <= ends.Length - Lanes; k += Lanes)
            {
                var (start, minutes) = (Sixteen(starts, k), Sixteen(work, k));
                var end = At(calendar, (start >> calendar.GapBits) + minutes);
                Vector512.ConditionalSelect(Vector512.GreaterThan(minutes, Vector512<int>.Zero), end, start).CopyTo(ends[k..]);
            }
        }
        for (; k < ends.Length; k++)
            ends[k] = calendar.Add(starts[k], work[k]);
    }

    /// <summary>Instants moved by a lag or lead that is not 0.</summary>
    public static void Shift(WorkTime calendar, ReadOnlySpan<int> from, int lag, Span<int> to)
    {
        var k = 0;
        if (calendar.Working)
        {
            for (; k <= to.Length - Lanes; k += Lanes)
                At(calendar, Vector512.Max((Sixteen(from, k) >> calendar.GapBits) + Vector512.Create(lag), Vector512<int>.Zero))
                    .CopyTo(to[k..]);
        }
        for (; k < to.Length; k++)
            to[k] = calendar.Shift(from[k], lag);
    }

    /// <summary>Starts of work that ends at the instants, up to the gap before a working instant; no work leaves the instant.</summary>
    public static void Back(WorkTime calendar, ReadOnlySpan<int> ends, ReadOnlySpan<int> work, Span<int> starts)
    {
        var k = 0;
        if (calendar.Working)
        {
            for (; k <= starts.Length - Lanes; k += Lanes)
            {
                var (end, minutes) = (Sixteen(ends, k), Sixteen(work, k));
                var start = Vector512.Max((end >> calendar.GapBits) - minutes, Vector512<int>.Zero) << calendar.GapBits;
                Vector512.ConditionalSelect(Vector512.GreaterThan(minutes, Vector512<int>.Zero), start, end).CopyTo(starts[k..]);
            }
        }
        for (; k < starts.Length; k++)
            starts[k] = calendar.Back(ends[k], work[k]);
    }

    /// <summary>Moves the starts of work to the working instant at or after them.</summary>
    public static void Begin(WorkTime calendar, Span<int> starts, ReadOnlySpan<int> work)
    {
        var k = 0;
        if (calendar.Working)
        {
            // Only what starts at the end of a working day moves, and that is seldom: one vector in some hundred.
            for (; k <= starts.Length - Lanes; k += Lanes)
            {
                var start = Sixteen(starts, k);
                if (WholeDays(start >> calendar.GapBits) != Vector512<int>.Zero)
                    BeginEach(calendar, starts.Slice(k, Lanes), work[k..]);
            }
        }
        BeginEach(calendar, starts[k..], work[k..]);
    }

    private static void BeginEach(WorkTime calendar, Span<int> starts, ReadOnlySpan<int> work)
    {
        for (var k = 0; k < starts.Length; k++)
            starts[k] = work[k] > 0 ? calendar.Begin(starts[k]) : starts[k];
    }

    /// <summary>The later of an instant and a row.</summary>
    public static void Latest(int bound, ReadOnlySpan<int> bounds, Span<int> starts)
    {
        var k = 0;
        for (; k <= starts.Length - Lanes; k += Lanes)
            Vector512.Max(Sixteen(bounds, k), Vector512.Create(bound)).CopyTo(starts[k..]);
        for (; k < starts.Length; k++)
            starts[k] = Math.Max(bounds[k], bound);
    }

    /// <summary>The later of two rows, into the second.</summary>
    public static void Latest(ReadOnlySpan<int> bounds, Span<int> starts)
    {
        var k = 0;
        for (; k <= starts.Length - Lanes; k += Lanes)
            Vector512.Max(Sixteen(bounds, k), Sixteen(starts, k)).CopyTo(starts[k..]);
        for (; k < starts.Length; k++)
            starts[k] = Math.Max(starts[k], bounds[k]);
    }

    /// <summary>The earlier of two rows, into the second.</summary>
    public static void Earliest(ReadOnlySpan<int> bounds, Span<int> starts)
    {
        var k = 0;
        for (; k <= starts.Length - Lanes; k += Lanes)
            Vector512.Min(Sixteen(bounds, k), Sixteen(starts, k)).CopyTo(starts[k..]);
        for (; k < starts.Length; k++)
            starts[k] = Math.Min(starts[k], bounds[k]);
    }

    private static Vector512<int> Sixteen(ReadOnlySpan<int> row, int first) => Vector512.Create(row.Slice(first, Lanes));

    // The earliest instant with that W; work beyond the calendar's end is clamped.
    private static Vector512<int> At(WorkTime calendar, Vector512<int> worked) => Vector512.ConditionalSelect(
        Vector512.GreaterThan(worked, Vector512.Create(calendar.MostWorked)), Vector512.Create(calendar.Horizon), worked << calendar.GapBits);

    // Minutes, not negative, that make whole days: multiplied by the inverse of 45 modulo 2³² and turned right by five bits
    // (1,440 = 45·2⁵) multiples of 1,440, and they alone, stay at or below 2³²/1,440 (Granlund and Montgomery, PLDI 1994).
    private static Vector512<int> WholeDays(Vector512<int> minutes)
    {
        const uint inverse = 2767867813;
        var product = minutes.AsUInt32() * Vector512.Create(inverse);
        var turned = product >>> 5 | product << 27;
        return Vector512.LessThanOrEqual(turned, Vector512.Create(uint.MaxValue / WorkTime.MinutesPerDay)).AsInt32();
    }
}
