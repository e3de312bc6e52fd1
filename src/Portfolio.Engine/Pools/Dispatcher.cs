using Portfolio.Engine.Networks;

namespace Portfolio.Engine.Pools;

/// <summary>
/// Schedules the part of a network that pools can move, one iteration at a time. Reads work and earliest starts (by links from work
/// before the pools) from the rows and leaves starts and finishes there. Belongs to one thread; allocates nothing per iteration.
/// Layout: rows run along iterations, the dispatcher along activities, so both are turned once per chunk, tile by tile.
/// </summary>
internal abstract class Dispatcher
{
    private const int Tile = 16;

    private readonly ForwardPass _pass;
    private readonly ScheduleRows _rows;
    private readonly bool[] _branched; // [local] stands in a chance branch
    private readonly int[] _work, _starts, _finishes; // [iteration][local]

    protected Dispatcher(PoolNetwork pools, ForwardPass pass, ScheduleRows rows)
    {
        (Pools, _pass, _rows) = (pools, pass, rows);
        _branched = [.. pools.Activity.Select(a => pools.Network.Fork[a] >= 0)];
        (Work, Starts, Finishes) = (new int[pools.Count], new int[pools.Count], new int[pools.Count]);
        var turned = pools.Count * rows.Capacity;
        (_work, _starts, _finishes) = (new int[turned], new int[turned], new int[turned]);
    }

    protected PoolNetwork Pools { get; }

    /// <summary>[local] minutes of work in this iteration.</summary>
    protected int[] Work { get; }

    protected int[] Starts { get; }

    protected int[] Finishes { get; }

    /// <summary>Iteration of the chunk at work.</summary>
    protected int Iteration { get; private set; }

    /// <summary>Schedules the first <paramref name="count"/> iterations of the chunk.</summary>
    /// <exception cref="InvalidOperationException">A demand can never be met; rules refuse such documents.</exception>
    public void Run(int count)
    {
        for (var l = 0; l < Pools.Count; l += Tile)
            Turn(l, count);
        for (Iteration = 0; Iteration < count; Iteration++)
        {
            var at = Iteration * Pools.Count;
            _work.AsSpan(at, Pools.Count).CopyTo(Work);
            _starts.AsSpan(at, Pools.Count).CopyTo(Starts);
            Dispatch();
            Starts.CopyTo(_starts.AsSpan(at));
            Finishes.CopyTo(_finishes.AsSpan(at));
        }
        for (var l = 0; l < Pools.Count; l += Tile)
            TurnBack(l, count);
    }

    protected abstract void Dispatch();

    protected bool Absent(int local) => _branched[local] && _pass.Absent(Pools.Activity[local], Iteration);

    /// <summary>Started, and nothing holds the remaining work back.</summary>
    protected bool UnderWay(int local, int earliest) => earliest <= Pools.Resumes[local];

    /// <summary>The earliest start by all links; those from work that pools move are added to what the rows hold.</summary>
    protected int EarliestStart(int local)
    {
        var earliest = Starts[local];
        var calendar = Pools.Calendar[local];
        foreach (ref readonly var link in Pools.LinksOf(local))
        {
            var bound = link.FromFinish ? Finishes[link.Predecessor] : ActualOrStart(link.Predecessor);
            if (link.Lag != 0 && !Absent(local) && !Absent(link.Predecessor))
                bound = calendar.Shift(bound, link.Lag);
            earliest = Math.Max(earliest, link.ToStart ? bound : calendar.Back(bound, Work[local]));
        }
        return Work[local] > 0 ? calendar.Begin(earliest) : earliest;
    }

    // Links from the start of work under way count from when it really started.
    private int ActualOrStart(int local) => Pools.Started(local) ? Pools.Network.ActualStart[Pools.Activity[local]] : Starts[local];

    private void Turn(int first, int count)
    {
        for (var l = first; l < Math.Min(first + Tile, Pools.Count); l++)
        {
            var work = _rows.Work(Pools.Activity[l], count);
            var starts = _rows.Start(Pools.Activity[l], count);
            for (var k = 0; k < count; k++)
                (_work[k * Pools.Count + l], _starts[k * Pools.Count + l]) = (work[k], starts[k]);
        }
    }

    private void TurnBack(int first, int count)
    {
        for (var l = first; l < Math.Min(first + Tile, Pools.Count); l++)
        {
            var starts = _rows.Start(Pools.Activity[l], count);
            var finishes = _rows.Finish(Pools.Activity[l], count);
            for (var k = 0; k < count; k++)
                (starts[k], finishes[k]) = (_starts[k * Pools.Count + l], _finishes[k * Pools.Count + l]);
            if (Pools.Started(l))
                starts.Fill(Pools.Network.ActualStart[Pools.Activity[l]]);
        }
    }
}
