using System.Numerics;
using Portfolio.Engine.Networks;

namespace Portfolio.Engine.Pools;

/// <summary>
/// Rule <c>passing</c>: the clock moves through the instants at which work becomes ready, units come free or a capacity changes; at each,
/// again and again the first in the order that is ready and fits is started (parallel schedule generation, Kolisch 1996, with a fixed
/// order and calendars). Behind one that waits others may pass, except work of a project with a worse priority on a pool it draws on.
/// Work that waits is a set of bits by place in the order.
/// </summary>
internal sealed class PassingDispatcher(PoolNetwork pools, ForwardPass pass, ScheduleRows rows) : Dispatcher(pools, pass, rows)
{
    private readonly int[] _left = new int[pools.Count];
    private readonly int[] _stack = new int[pools.Count];
    private readonly int[] _next = new int[pools.Count]; // next successor to pass the dates on to
    private readonly double[] _used = new double[pools.Pools.Length];
    private readonly int[] _waitingPriority = new int[pools.Pools.Length]; // best priority that waits for the pool at this instant
    private readonly InstantHeap _running = new(pools.Count);
    private readonly InstantHeap _future = new(pools.Demanding);
    private readonly ulong[] _pending = new ulong[(pools.Demanding + 63) / 64]; // to be tried at this instant
    private readonly ulong[] _waiting = new ulong[(pools.Demanding + 63) / 64]; // tried, did not fit
    private int _waitingCount;

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
        while (_future.Count > 0 || _waitingCount > 0)
        {
            now = Math.Max(now, NextInstant(ref change, now));
            while (_running.Count > 0 && _running.Instant <= now)
                Free(_running.Pop());
            Serve(now);
        }
    }

    private void Reset()
    {
        for (var l = 0; l < Pools.Count; l++)
            _left[l] = Pools.LinksOf(l).Length;
        Array.Clear(_used);
        _running.Clear();
        _future.Clear();
        Array.Clear(_waiting);
        _waitingCount = 0;
    }

    private int NextInstant(ref int change, int now)
    {
        var next = _future.Count > 0 ? _future.Instant : int.MaxValue;
        if (_waitingCount > 0)
        {
            if (_running.Count > 0)
                next = Math.Min(next, _running.Instant);
            while (change < Pools.CapacityInstants.Length && Pools.CapacityInstants[change] <= now)
                change++;
            if (change < Pools.CapacityInstants.Length)
                next = Math.Min(next, Pools.CapacityInstants[change]);
        }
        return next < int.MaxValue ? next : throw new InvalidOperationException("A demand can never be met.");
    }

    private void Serve(int now)
    {
        Array.Fill(_waitingPriority, int.MaxValue);
        _waiting.CopyTo(_pending, 0);
        Array.Clear(_waiting);
        _waitingCount = 0;
        var word = 0;
        while (true)
        {
            while (_future.Count > 0 && _future.Instant <= now)
            {
                var arrived = _future.Pop();
                _pending[arrived >> 6] |= 1UL << arrived;
                word = Math.Min(word, arrived >> 6);
            }
            while (word < _pending.Length && _pending[word] == 0)
                word++;
            if (word == _pending.Length)
                return;
            var local = (word << 6) + BitOperations.TrailingZeroCount(_pending[word]);
            _pending[word] &= _pending[word] - 1;
            Try(local, now);
        }
    }

    private void Try(int local, int now)
    {
        if (Work[local] > 0)
        {
            var begin = Pools.Network.Calendar[Pools.Activity[local]].Begin(now);
            if (begin > now)
            {
                _future.Push(begin, local);
                return;
            }
            if (!Unhindered(local) || !Pools.Fits(local, now, _used))
            {
                Wait(local);
                return;
            }
        }
        var finish = End(local, now);
        if (Work[local] > 0)
            Hold(local, finish);
        Settle(local, now, finish);
    }

    // No work of a project with a better priority waits for one of its pools.
    private bool Unhindered(int local)
    {
        foreach (ref readonly var demand in Pools.DemandsOf(local))
        {
            if (_waitingPriority[demand.Pool] < Pools.Priority[local])
                return false;
        }
        return true;
    }

    private void Wait(int local)
    {
        _waiting[local >> 6] |= 1UL << local;
        _waitingCount++;
        foreach (ref readonly var demand in Pools.DemandsOf(local))
            _waitingPriority[demand.Pool] = Math.Min(_waitingPriority[demand.Pool], Pools.Priority[local]);
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
            _used[demand.Pool] -= demand.Units;
    }

    private void Settle(int local, int start, int finish)
    {
        Know(local, start, finish);
        Pass(local);
    }

    // The dates of one are known: its successors that wait for nothing else are released, each with what follows it before the next.
    private void Pass(int known)
    {
        var depth = 0;
        _stack[depth] = known;
        _next[known] = Pools.SuccessorStart[known];
        while (depth >= 0)
        {
            var local = _stack[depth];
            if (_next[local] == Pools.SuccessorStart[local + 1])
            {
                depth--;
                continue;
            }
            var successor = Pools.Successors[_next[local]++];
            if (--_left[successor] == 0 && Release(successor))
            {
                _stack[++depth] = successor;
                _next[successor] = Pools.SuccessorStart[successor];
            }
        }
    }

    // True when the dates are known at once; otherwise it joins those that become ready later.
    private bool Release(int local)
    {
        var earliest = EarliestStart(local);
        var demands = local < Pools.Demanding && !Absent(local);
        if (demands && !UnderWay(local, earliest))
        {
            _future.Push(earliest, local);
            return false;
        }
        var finish = End(local, earliest);
        if (demands && finish > earliest)
            Hold(local, finish);
        Know(local, earliest, finish);
        return true;
    }

    private void Know(int local, int start, int finish)
    {
        (Starts[local], Finishes[local]) = (start, finish);
        Sequence?.Add(local);
    }
}
