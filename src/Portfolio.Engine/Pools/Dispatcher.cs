using Portfolio.Engine.Networks;

namespace Portfolio.Engine.Pools;

/// <summary>
/// Schedules the part of a network that pools can move, one iteration at a time. Reads work and earliest starts (by links from work
/// before the pools) from the rows and leaves starts and finishes there. Belongs to one thread; allocates nothing per iteration.
/// Layout: rows run along iterations, the dispatcher along activities, so a few iterations at a time are turned, tile by tile.
/// </summary>
internal abstract class Dispatcher
{
    private const int Tile = 16, Turned = 32;

    private readonly ForwardPass _pass;
    private readonly ScheduleRows _rows;
    private readonly int[] _work, _starts; // [iteration][local]; the finish takes the place of the work

    protected Dispatcher(PoolNetwork pools, ForwardPass pass, ScheduleRows rows)
    {
        (Pools, _pass, _rows) = (pools, pass, rows);
        State = new LocalState[pools.Count];
        (_work, _starts) = (new int[pools.Count * Turned], new int[pools.Count * Turned]);
    }

    protected PoolNetwork Pools { get; }

    /// <summary>[local] what is known in the iteration at work; starts are earliest starts until the dates are known.</summary>
    protected LocalState[] State { get; }

    /// <summary>Iteration of the chunk at work.</summary>
    protected int Iteration { get; private set; }

    /// <summary>Schedules the first <paramref name="count"/> iterations of the chunk.</summary>
    /// <exception cref="InvalidOperationException">A demand can never be met; rules refuse such documents.</exception>
    public void Run(int count)
    {
        for (var from = 0; from < count; from += Turned)
        {
            var to = Math.Min(from + Turned, count);
            for (var l = 0; l < Pools.Count; l += Tile)
                Turn(l, from, to);
            for (Iteration = from; Iteration < to; Iteration++)
                RunOne((Iteration - from) * Pools.Count);
            for (var l = 0; l < Pools.Count; l += Tile)
                TurnBack(l, from, to);
        }
    }

    private void RunOne(int at)
    {
        for (var l = 0; l < State.Length; l++)
            State[l] = new LocalState { Work = _work[at + l], Start = _starts[at + l], Left = Pools.LinksOf(l).Length };
        Dispatch();
        for (var l = 0; l < State.Length; l++)
            (_starts[at + l], _work[at + l]) = (State[l].Start, State[l].Finish);
    }

    protected abstract void Dispatch();

    protected bool Absent(int local) => Pools.Facts[local].Branched && _pass.Absent(Pools.Activity[local], Iteration);

    /// <summary>Started, and nothing holds the remaining work back.</summary>
    protected bool UnderWay(int local, int earliest) => earliest <= Pools.Facts[local].Resumes;

    /// <summary>The earliest start by all links; those from work that pools move are added to what the rows hold.</summary>
    protected int EarliestStart(int local)
    {
        var (earliest, work) = (State[local].Start, State[local].Work);
        var calendar = Pools.Calendar(local);
        foreach (ref readonly var link in Pools.LinksOf(local))
        {
            var bound = link.FromFinish ? State[link.Predecessor].Finish : ActualOrStart(link.Predecessor);
            if (link.Lag != 0 && !Absent(local) && !Absent(link.Predecessor))
                bound = calendar.Shift(bound, link.Lag);
            earliest = Math.Max(earliest, link.ToStart ? bound : calendar.Back(bound, work));
        }
        return work > 0 ? calendar.Begin(earliest) : earliest;
    }

    // Links from the start of work under way count from when it really started.
    private int ActualOrStart(int local) => Pools.Started(local) ? Pools.Network.ActualStart[Pools.Activity[local]] : State[local].Start;

    private void Turn(int first, int from, int to)
    {
        for (var l = first; l < Math.Min(first + Tile, Pools.Count); l++)
        {
            var work = _rows.Work(Pools.Activity[l], to)[from..];
            var starts = _rows.Start(Pools.Activity[l], to)[from..];
            for (var k = 0; k < work.Length; k++)
                (_work[k * Pools.Count + l], _starts[k * Pools.Count + l]) = (work[k], starts[k]);
        }
    }

    private void TurnBack(int first, int from, int to)
    {
        for (var l = first; l < Math.Min(first + Tile, Pools.Count); l++)
        {
            var starts = _rows.Start(Pools.Activity[l], to)[from..];
            var finishes = _rows.Finish(Pools.Activity[l], to)[from..];
            for (var k = 0; k < starts.Length; k++)
                (starts[k], finishes[k]) = (_starts[k * Pools.Count + l], _work[k * Pools.Count + l]);
            if (Pools.Started(l))
                starts.Fill(Pools.Network.ActualStart[Pools.Activity[l]]);
        }
    }
}

/// <summary>An activity in one iteration: minutes of work, start and finish, and how many predecessors' dates are not known yet.</summary>
internal struct LocalState
{
    public int Work, Start, Finish, Left;
}
