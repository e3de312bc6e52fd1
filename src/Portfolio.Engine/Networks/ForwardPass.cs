using System.Numerics;
using Portfolio.Engine.Inputs;

namespace Portfolio.Engine.Networks;

/// <summary>
/// Places activities one after the other, each over all iterations of a chunk at once, without regard to pools; contract section 4,
/// items 5 and 6. Rows in and out, no allocation. Belongs to one thread.
/// </summary>
internal sealed class ForwardPass(Network network, ScheduleRows rows, ChunkInputs inputs)
{
    private readonly int[] _bound = new int[rows.Capacity];

    /// <summary>Start and finish of one activity, whose predecessors are placed and whose work is drawn.</summary>
    public void Place(int activity)
    {
        var count = inputs.Count;
        var start = rows.Start(activity, count);
        var finish = rows.Finish(activity, count);
        if (network.Finished(activity))
        {
            start.Fill(network.ActualStart[activity]);
            finish.Fill(network.ActualFinish[activity]);
            return;
        }
        EarliestStarts(activity, start, null);
        Finishes(activity, start, finish);
        if (network.UnderWay(activity))
            start.Fill(network.ActualStart[activity]);
    }

    /// <summary>
    /// Earliest starts by the status date, <c>earliestStart</c> and the links, moved to a working instant where there is work to do;
    /// with <paramref name="beforePools"/> by the links from work that no pool can move.
    /// </summary>
    public void EarliestStarts(int activity, Span<int> starts, Stages? beforePools)
    {
        starts.Fill(network.Status[activity]);
        if (network.EarliestStart[activity] is var earliest and not Network.None)
            WaitFor(activity, earliest, starts);
        foreach (ref readonly var link in network.LinksOf(activity))
        {
            if (beforePools is null || beforePools.IsBefore(link.Predecessor))
                Bind(activity, link, starts);
        }
        var calendar = network.Calendar[activity];
        if (calendar.EveryDay)
            return;
        var work = rows.Work(activity, starts.Length);
        for (var k = 0; k < starts.Length; k++)
            starts[k] = work[k] > 0 ? calendar.Begin(starts[k]) : starts[k];
    }

    private void Finishes(int activity, ReadOnlySpan<int> starts, Span<int> finishes)
    {
        var calendar = network.Calendar[activity];
        var work = rows.Work(activity, starts.Length);
        for (var k = 0; k < starts.Length; k++)
            finishes[k] = calendar.Add(starts[k], work[k]);
    }

    // Work that does not happen passes on dates only: its earliest start does not count.
    private void WaitFor(int activity, int earliest, Span<int> starts)
    {
        for (var k = 0; k < starts.Length; k++)
        {
            if (earliest > starts[k] && !Absent(activity, k))
                starts[k] = earliest;
        }
    }

    private void Bind(int activity, in NetworkLink link, Span<int> starts)
    {
        var from = link.FromFinish ? rows.Finish(link.Predecessor, starts.Length) : rows.Start(link.Predecessor, starts.Length);
        var bounds = _bound.AsSpan(0, starts.Length);
        ReadOnlySpan<int> moved = from;
        if (link.Lag != 0)
        {
            Shift(activity, link, from, bounds);
            moved = bounds;
        }
        if (!link.ToStart)
        {
            var calendar = network.Calendar[activity];
            var work = rows.Work(activity, starts.Length);
            for (var k = 0; k < bounds.Length; k++)
                bounds[k] = calendar.Back(moved[k], work[k]);
            moved = bounds;
        }
        Latest(moved, starts);
    }

    // Links into and out of work that does not happen act without lag.
    private void Shift(int activity, in NetworkLink link, ReadOnlySpan<int> from, Span<int> bounds)
    {
        var calendar = network.Calendar[activity];
        var mayBeAbsent = network.Fork[activity] >= 0 || network.Fork[link.Predecessor] >= 0;
        for (var k = 0; k < bounds.Length; k++)
        {
            var lag = mayBeAbsent && (Absent(activity, k) || Absent(link.Predecessor, k)) ? 0 : link.Lag;
            bounds[k] = calendar.Shift(from[k], lag);
        }
    }

    /// <summary>True when the activity stands in a branch that iteration k of the chunk does not take.</summary>
    public bool Absent(int activity, int k) =>
        network.Fork[activity] is >= 0 and var fork && inputs.Picks(fork)[k] != network.Branch[activity];

    private static void Latest(ReadOnlySpan<int> bounds, Span<int> starts)
    {
        var k = 0;
        for (; k <= starts.Length - Vector<int>.Count; k += Vector<int>.Count)
            Vector.Max(new Vector<int>(bounds[k..]), new Vector<int>(starts[k..])).CopyTo(starts[k..]);
        for (; k < starts.Length; k++)
            starts[k] = Math.Max(starts[k], bounds[k]);
    }
}
