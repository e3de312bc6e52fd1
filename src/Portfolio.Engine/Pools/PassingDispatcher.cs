using Portfolio.Engine.Calendars;
using Portfolio.Engine.Networks;

namespace Portfolio.Engine.Pools;

/// <summary>
/// Rule <c>passing</c>: the clock moves through the instants at which work becomes ready, units come free or a capacity changes; at each,
/// again and again the first in the order that is ready and fits is started (parallel schedule generation, Kolisch 1996, with a fixed
/// order and calendars). Behind one that waits others may pass, except work of a project with a worse priority on a pool it draws on.
/// <para>
/// Work that waits is tried again only where something eased: units came free, a capacity changed or work before it started. A pool without
/// room for its smallest demand is left at once, as is one at which everything further down the order is hindered.
/// </para>
/// </summary>
internal sealed class PassingDispatcher : Dispatcher
{
    private readonly int[] _stack, _next; // by depth: a local whose dates are known, and the next successor to pass them on to
    private readonly double[] _used;
    private readonly bool[] _eased; // [pool] waiting work may fit now
    private readonly WaitingWork _waiting;
    private readonly RankSet _arrived; // became ready, not tried yet
    private readonly InstantHeap _running, _future;
    private readonly WorkTime[] _calendars; // those of work with demands
    private int _arrivals;

    public PassingDispatcher(PoolNetwork pools, ForwardPass pass, ScheduleRows rows)
        : base(pools, pass, rows)
    {
        (_stack, _next) = (new int[pools.Count], new int[pools.Count]);
        _used = new double[pools.Pools.Length];
        _eased = new bool[pools.Pools.Length];
        _waiting = new WaitingWork(pools);
        _arrived = new RankSet(pools.Demanding);
        (_running, _future) = (new InstantHeap(pools.Count), new InstantHeap(pools.Demanding));
        _calendars = [.. pools.ByRank.Select(pools.Calendar).Distinct()];
    }

    /// <summary>When set, receives every local in the sequence in which its dates become known.</summary>
    public List<int>? Sequence { get; set; }

    protected override void Dispatch()
    {
        Reset();
        foreach (var root in Pools.Roots)
        {
            if (Release(root))
                Pass(root);
        }
        var now = int.MinValue;
        var change = 0;
        while (_future.Count > 0 || _waiting.Count > 0)
        {
            now = Math.Max(now, NextInstant(change));
            while (_running.Count > 0 && _running.Instant <= now)
                Free(_running.Pop());
            for (; change < Pools.CapacityChanges.Length && Pools.CapacityChanges[change].Instant <= now; change++)
                _eased[Pools.CapacityChanges[change].Pool] = true;
            Serve(now, Working(now));
        }
    }

    private void Reset()
    {
        Array.Clear(_used);
        Array.Clear(_eased);
        _running.Clear();
        _future.Clear();
        _waiting.Clear();
    }

    private int NextInstant(int change)
    {
        var next = _future.Count > 0 ? _future.Instant : int.MaxValue;
        if (_waiting.Count > 0)
        {
            if (_running.Count > 0)
                next = Math.Min(next, _running.Instant);
            if (change < Pools.CapacityChanges.Length)
                next = Math.Min(next, Pools.CapacityChanges[change].Instant);
        }
        return next < int.MaxValue ? next : throw new InvalidOperationException("A demand can never be met.");
    }

    // True when no calendar rests at this instant.
    private bool Working(int now)
    {
        foreach (var calendar in _calendars)
        {
            if (calendar.Begin(now) != now)
                return false;
        }
        return true;
    }

    // Tries in the order what has arrived and what may fit now. Where some calendar rests at this instant everything is tried, for work that
    // cannot begin before its next working instant does not wait until then and hinders nobody.
    private void Serve(int now, bool working)
    {
        if (!working)
            Array.Fill(_eased, true);
        var cursor = 0;
        while (true)
        {
            while (_future.Count > 0 && _future.Instant <= now)
            {
                var rank = Pools.Facts[_future.Pop()].Rank;
                _arrived.Add(rank);
                _arrivals++;
                cursor = Math.Min(cursor, rank);
            }
            var next = NextToTry(cursor, now, working);
            if (next == int.MaxValue)
                break;
            cursor = next + 1;
            Try(Pools.ByRank[next], now, working);
        }
        Array.Clear(_eased);
    }

    private int NextToTry(int cursor, int now, bool working)
    {
        var next = _arrivals > 0 ? _arrived.Next(cursor) : int.MaxValue;
        for (var pool = 0; pool < _eased.Length; pool++)
        {
            if (!_eased[pool])
                continue;
            if (working && !Pools.HasRoom(pool, now, _used[pool]))
                _eased[pool] = false;
            else
                next = Math.Min(next, _waiting.Next(pool, cursor));
        }
        return next;
    }

    private void Try(int local, int now, bool working)
    {
        var rank = Pools.Facts[local].Rank;
        var waited = !(_arrivals > 0 && _arrived.Next(rank) == rank);
        if (!waited)
        {
            _arrived.Remove(rank);
            _arrivals--;
        }
        if (State[local].Work > 0)
        {
            var begin = working ? now : Pools.Calendar(local).Begin(now);
            if (begin == now && (Hindered(local, working) || !Pools.Fits(local, now, _used)))
            {
                if (!waited)
                    _waiting.Add(local);
                return;
            }
            if (waited)
                Leave(local);
            if (begin > now)
            {
                _future.Push(begin, local);
                return;
            }
        }
        var finish = Pools.Calendar(local).Add(now, State[local].Work);
        if (State[local].Work > 0)
            Hold(local, finish);
        Know(local, now, finish);
        Pass(local);
    }

    // Waits no longer: those whom it hindered may pass.
    private void Leave(int local)
    {
        _waiting.Remove(local);
        foreach (ref readonly var demand in Pools.DemandsOf(local))
            _eased[demand.Pool] = true;
    }

    // Work of a project with a better priority waits for one of its pools. All that follows in the order is hindered there too.
    private bool Hindered(int local, bool working)
    {
        var hindered = false;
        foreach (ref readonly var demand in Pools.DemandsOf(local))
        {
            if (!_waiting.Hinders(demand.Pool, local))
                continue;
            hindered = true;
            if (working && !Pools.Started(local))
                _eased[demand.Pool] = false;
        }
        return hindered;
    }

    private void Hold(int local, int finish)
    {
        foreach (ref readonly var demand in Pools.DemandsOf(local))
            _used[demand.Pool] += demand.Units;
        _running.Push(finish, local);
    }

    private void Free(int local)
    {
        foreach (ref readonly var demand in Pools.DemandsOf(local))
        {
            _used[demand.Pool] -= demand.Units;
            _eased[demand.Pool] = true;
        }
    }

    // The dates of one are known: its successors that wait for nothing else are released, each with what follows it before the next.
    private void Pass(int known)
    {
        var depth = 0;
        (_stack[0], _next[0]) = (known, Pools.Facts[known].FirstSuccessor);
        while (depth >= 0)
        {
            if (_next[depth] == Pools.Facts[_stack[depth] + 1].FirstSuccessor)
            {
                depth--;
                continue;
            }
            var successor = Pools.Successors[_next[depth]++];
            if (--State[successor].Left == 0 && Release(successor))
            {
                depth++;
                (_stack[depth], _next[depth]) = (successor, Pools.Facts[successor].FirstSuccessor);
            }
        }
    }

    // True when the dates are known at once; otherwise it joins those that become ready later.
    private bool Release(int local)
    {
        var earliest = EarliestStart(local);
        var demands = Pools.Facts[local].Rank >= 0 && !Absent(local);
        if (demands && !UnderWay(local, earliest))
        {
            _future.Push(earliest, local);
            return false;
        }
        var finish = Pools.Calendar(local).Add(earliest, State[local].Work);
        if (demands && finish > earliest)
            Hold(local, finish);
        Know(local, earliest, finish);
        return true;
    }

    private void Know(int local, int start, int finish)
    {
        (State[local].Start, State[local].Finish) = (start, finish);
        Sequence?.Add(local);
    }
}
