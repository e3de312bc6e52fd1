using System.Numerics;
using Portfolio.Engine.Calendars;

namespace Portfolio.Engine.Networks;

/// <summary>
/// Calendar arithmetic on rows of instants. In the scale of working time it is shifts and sums, several iterations at a time; in minutes
/// it goes through the calendar's tables one by one. All rows have one length; target and source may be the same row.
/// </summary>
internal static class InstantRows
{
    /// <summary>Ends of work begun at the starts; no work leaves the instant.</summary>
    public static void Add(WorkTime calendar, ReadOnlySpan<int> starts, ReadOnlySpan<int> work, Span<int> ends)
    {
        var k = 0;
        if (calendar.Working)
        {
            for (; k <= ends.Length - Vector<int>.Count; k += Vector<int>.Count)
            {
                var (start, minutes) = (new Vector<int>(starts[k..]), new Vector<int>(work[k..]));
                var end = At(calendar, (start >> calendar.GapBits) + minutes);
                Vector.ConditionalSelect(Vector.GreaterThan(minutes, Vector<int>.Zero), end, start).CopyTo(ends[k..]);
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
            for (; k <= to.Length - Vector<int>.Count; k += Vector<int>.Count)
                At(calendar, Vector.Max((new Vector<int>(from[k..]) >> calendar.GapBits) + new Vector<int>(lag), Vector<int>.Zero))
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
            for (; k <= starts.Length - Vector<int>.Count; k += Vector<int>.Count)
            {
                var (end, minutes) = (new Vector<int>(ends[k..]), new Vector<int>(work[k..]));
                var start = Vector.Max((end >> calendar.GapBits) - minutes, Vector<int>.Zero) << calendar.GapBits;
                Vector.ConditionalSelect(Vector.GreaterThan(minutes, Vector<int>.Zero), start, end).CopyTo(starts[k..]);
            }
        }
        for (; k < starts.Length; k++)
            starts[k] = calendar.Back(ends[k], work[k]);
    }

    /// <summary>Moves the starts of work to the working instant at or after them.</summary>
    public static void Begin(WorkTime calendar, Span<int> starts, ReadOnlySpan<int> work)
    {
        for (var k = 0; k < starts.Length; k++)
            starts[k] = work[k] > 0 ? calendar.Begin(starts[k]) : starts[k];
    }

    /// <summary>The later of two rows, into the second.</summary>
    public static void Latest(ReadOnlySpan<int> bounds, Span<int> starts)
    {
        var k = 0;
        for (; k <= starts.Length - Vector<int>.Count; k += Vector<int>.Count)
            Vector.Max(new Vector<int>(bounds[k..]), new Vector<int>(starts[k..])).CopyTo(starts[k..]);
        for (; k < starts.Length; k++)
            starts[k] = Math.Max(starts[k], bounds[k]);
    }

    /// <summary>The earlier of two rows, into the second.</summary>
    public static void Earliest(ReadOnlySpan<int> bounds, Span<int> starts)
    {
        var k = 0;
        for (; k <= starts.Length - Vector<int>.Count; k += Vector<int>.Count)
            Vector.Min(new Vector<int>(bounds[k..]), new Vector<int>(starts[k..])).CopyTo(starts[k..]);
        for (; k < starts.Length; k++)
            starts[k] = Math.Min(starts[k], bounds[k]);
    }

    // The earliest instant with that W; work beyond the calendar's end is clamped.
    private static Vector<int> At(WorkTime calendar, Vector<int> worked) => Vector.ConditionalSelect(
        Vector.GreaterThan(worked, new Vector<int>(calendar.MostWorked)), new Vector<int>(calendar.Horizon), worked << calendar.GapBits);
}
