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
        InstantRows.Add(network.Calendar[activity], start, rows.Work(activity, count), finish);
        if (network.UnderWay(activity))
            start.Fill(network.ActualStart[activity]);
        else if (network.StartMatters[activity])
            InstantRows.Begin(network.Calendar[activity], start, rows.Work(activity, count));
    }

    /// <summary>
    /// Earliest starts by the status date, <c>earliestStart</c> and the links; with <paramref name="beforePools"/> by the links from work
    /// that
    /// no pool can move. Not yet moved to a working instant.
    /// </summary>
    public void EarliestStarts(int activity, Span<int> starts, Stages? beforePools)
    {
        var bound = network.Status[activity];
        var first = true; // nothing stands in the row yet
        foreach (ref readonly var link in network.LinksOf(activity))
        {
            if (beforePools is not null && !beforePools.IsBefore(link.Predecessor))
                continue;
            var moved = Bound(activity, link, starts.Length);
            if (first)
                InstantRows.Latest(bound, moved, starts);
            else
                InstantRows.Latest(moved, starts);
            first = false;
        }
        if (first)
            starts.Fill(bound);
        if (network.EarliestStart[activity] is var earliest and not Network.None)
            WaitFor(activity, earliest, starts);
    }

    /// <summary>True when the activity stands in a branch that iteration k of the chunk does not take.</summary>
    public bool Absent(int activity, int k) =>
        network.Fork[activity] is >= 0 and var fork && inputs.Picks(fork)[k] != network.Branch[activity];

    // Work that does not happen passes on dates only: its earliest start does not count.
    private void WaitFor(int activity, int earliest, Span<int> starts)
    {
        for (var k = 0; k < starts.Length; k++)
        {
            if (earliest > starts[k] && !Absent(activity, k))
                starts[k] = earliest;
        }
    }

    // The earliest starts by one link: the predecessor's own row where the link does not move it.
    private ReadOnlySpan<int> Bound(int activity, in NetworkLink link, int count)
    {
        var from = link.FromFinish ? rows.Finish(link.Predecessor, count) : rows.Start(link.Predecessor, count);
        var bounds = _bound.AsSpan(0, count);
        ReadOnlySpan<int> moved = from;
        if (link.Lag != 0)
        {
            if (network.Fork[activity] >= 0 || network.Fork[link.Predecessor] >= 0)
                ShiftWhatHappens(activity, link, from, bounds);
            else
                InstantRows.Shift(network.Calendar[activity], from, link.Lag, bounds);
            moved = bounds;
        }
        if (!link.ToStart)
        {
            InstantRows.Back(network.Calendar[activity], moved, rows.Work(activity, count), bounds);
            moved = bounds;
        }
        return moved;
    }

    // Links into and out of work that does not happen act without lag.
    private void ShiftWhatHappens(int activity, in NetworkLink link, ReadOnlySpan<int> from, Span<int> bounds)
    {
        var calendar = network.Calendar[activity];
        for (var k = 0; k < bounds.Length; k++)
            bounds[k] = calendar.Shift(from[k], Absent(activity, k) || Absent(link.Predecessor, k) ? 0 : link.Lag);
    }
}
