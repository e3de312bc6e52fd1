using Portfolio.Engine.Networks;

namespace Portfolio.Engine.Pools;

/// <summary>
/// Rule <c>inOrder</c>: along a fixed line each starts at the earliest instant at which its units are free, not before the (re)start of
/// anything before it that draws on one of its pools, nor before its predecessors' dates are known. Starts never fall along the line, which
/// makes the policy monotone (activity-based policy; Stork 2001).
/// </summary>
internal sealed class InOrderDispatcher : Dispatcher
{
    private readonly int[] _line;
    private readonly int[] _known;  // [local] instant at which its dates are known
    private readonly int[] _last;   // [pool] latest start so far
    private readonly double[] _used; // [pool] units held at the instant at work
    private readonly InstantHeap[] _held; // [pool] indices of demands that hold units, by finish

    public InOrderDispatcher(PoolNetwork pools, ForwardPass pass, ScheduleRows rows, int[] line)
        : base(pools, pass, rows)
    {
        _line = line;
        _known = new int[pools.Count];
        _last = new int[pools.Pools.Length];
        _used = new double[pools.Pools.Length];
        _held = [.. pools.Pools.Select(_ => new InstantHeap(pools.Demands.Length))];
    }

    protected override void Dispatch()
    {
        Array.Fill(_last, int.MinValue);
        Array.Clear(_used);
        foreach (var held in _held)
            held.Clear();
        foreach (var local in _line)
            Place(local);
    }

    private void Place(int local)
    {
        var start = EarliestStart(local);
        _known[local] = int.MinValue;
        foreach (ref readonly var link in Pools.LinksOf(local))
            _known[local] = Math.Max(_known[local], _known[link.Predecessor]);
        var demands = Pools.Facts[local].Rank >= 0 && !Absent(local);
        if (demands && !UnderWay(local, start))
            _known[local] = start = Wait(local, start);
        (State[local].Start, State[local].Finish) = (start, Pools.Calendar(local).Add(start, State[local].Work));
        if (demands && State[local].Work > 0)
            Hold(local, State[local].Finish);
    }

    // The earliest instant from which the units are free.
    private int Wait(int local, int start)
    {
        start = Math.Max(start, _known[local]);
        foreach (ref readonly var demand in Pools.DemandsOf(local))
            start = Math.Max(start, _last[demand.Pool]);
        var calendar = Pools.Calendar(local);
        while (State[local].Work > 0)
        {
            start = calendar.Begin(start);
            Free(local, start);
            if (Pools.Fits(local, start, _used))
                break;
            start = NextInstant(local, start);
        }
        foreach (ref readonly var demand in Pools.DemandsOf(local))
            _last[demand.Pool] = Math.Max(_last[demand.Pool], start);
        return start;
    }

    // Whoever draws on these pools next starts no earlier, so what has finished by now is done with.
    private void Free(int local, int now)
    {
        foreach (ref readonly var demand in Pools.DemandsOf(local))
        {
            var held = _held[demand.Pool];
            while (held.Count > 0 && held.Instant <= now)
                _used[demand.Pool] -= Pools.Demands[held.Pop()].Units;
        }
    }

    private int NextInstant(int local, int now)
    {
        var next = int.MaxValue;
        foreach (ref readonly var demand in Pools.DemandsOf(local))
        {
            if (_held[demand.Pool].Count > 0)
                next = Math.Min(next, _held[demand.Pool].Instant);
            next = Math.Min(next, Pools.Pools[demand.Pool].NextChange(now));
        }
        return next < int.MaxValue ? next : throw new InvalidOperationException("A demand can never be met.");
    }

    private void Hold(int local, int finish)
    {
        for (var d = Pools.Facts[local].FirstDemand; d < Pools.Facts[local + 1].FirstDemand; d++)
        {
            _used[Pools.Demands[d].Pool] += Pools.Demands[d].Units;
            _held[Pools.Demands[d].Pool].Push(finish, d);
        }
    }
}
