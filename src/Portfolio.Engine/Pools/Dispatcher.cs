using Portfolio.Engine.Networks;

namespace Portfolio.Engine.Pools;

/// <summary>
/// Schedules the part of a network that pools can move, one iteration at a time. Reads work and earliest starts (by links from work
/// before the pools) from the rows and leaves starts and finishes there. Belongs to one thread; allocates nothing per iteration.
/// </summary>
internal abstract class Dispatcher(PoolNetwork pools, ForwardPass pass, ScheduleRows rows)
{
    protected PoolNetwork Pools { get; } = pools;

    /// <summary>[local] minutes of work in this iteration.</summary>
    protected int[] Work { get; } = new int[pools.Count];

    protected int[] Starts { get; } = new int[pools.Count];

    protected int[] Finishes { get; } = new int[pools.Count];

    /// <summary>Iteration of the chunk at work.</summary>
    protected int Iteration { get; private set; }

    /// <summary>Schedules one iteration of the chunk.</summary>
    /// <exception cref="InvalidOperationException">A demand can never be met; rules refuse such documents.</exception>
    public void Run(int iteration)
    {
        Iteration = iteration;
        for (var l = 0; l < Pools.Count; l++)
        {
            var activity = Pools.Activity[l];
            Work[l] = rows.Work(activity, iteration + 1)[iteration];
            Starts[l] = rows.Start(activity, iteration + 1)[iteration];
        }
        Dispatch();
        for (var l = 0; l < Pools.Count; l++)
        {
            var activity = Pools.Activity[l];
            rows.Start(activity, iteration + 1)[iteration] = Pools.Network.UnderWay(activity) ? Pools.Network.ActualStart[activity] : Starts[l];
            rows.Finish(activity, iteration + 1)[iteration] = Finishes[l];
        }
    }

    protected abstract void Dispatch();

    protected bool Absent(int local) => pass.Absent(Pools.Activity[local], Iteration);

    /// <summary>Started, and nothing holds the remaining work back.</summary>
    protected bool UnderWay(int local, int earliest) => earliest <= Pools.Resumes[local];

    protected int End(int local, int start) => Pools.Network.Calendar[Pools.Activity[local]].Add(start, Work[local]);

    /// <summary>The earliest start by all links; those from work that pools move are added to what the rows hold.</summary>
    protected int EarliestStart(int local)
    {
        var earliest = Starts[local];
        var calendar = Pools.Network.Calendar[Pools.Activity[local]];
        foreach (ref readonly var link in Pools.LinksOf(local))
        {
            var from = link.FromFinish ? Finishes[link.Predecessor] : ActualOrStart(link.Predecessor);
            var lag = link.Lag != 0 && (Absent(local) || Absent(link.Predecessor)) ? 0 : link.Lag;
            var bound = calendar.Shift(from, lag);
            earliest = Math.Max(earliest, link.ToStart ? bound : calendar.Back(bound, Work[local]));
        }
        return Work[local] > 0 ? calendar.Begin(earliest) : earliest;
    }

    // Links from the start of work under way count from when it really started.
    private int ActualOrStart(int local)
    {
        var activity = Pools.Activity[local];
        return Pools.Network.UnderWay(activity) ? Pools.Network.ActualStart[activity] : Starts[local];
    }
}
