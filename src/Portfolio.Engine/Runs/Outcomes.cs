using Portfolio.Engine.Inputs;
using Portfolio.Engine.Networks;
using Portfolio.Engine.Pools;

namespace Portfolio.Engine.Runs;

/// <summary>
/// Works a chunk of iterations through, activity by activity: draws its work, places it, adds its cost and its dates to its project
/// (contract section 4, items 6–8). Only what pools can move is set aside for the dispatcher in between. Belongs to one thread; allocates
/// nothing per chunk.
/// </summary>
internal sealed class Outcomes
{
    private readonly Plan _plan;
    private readonly Network _network;
    private readonly ChunkInputs _inputs;
    private readonly ScheduleRows _rows;
    private readonly ForwardPass _pass;
    private readonly Dispatcher? _dispatcher;
    private readonly ProjectRows _projects;
    private readonly int[] _milestone; // [activity] place among the milestones, or −1

    public Outcomes(Plan plan, ChunkInputs inputs, int capacity, RowLayout? layout = null)
    {
        (_plan, _network, _inputs) = (plan, plan.Network, inputs);
        _rows = new ScheduleRows(layout ?? plan.Layout, capacity);
        _pass = new ForwardPass(_network, _rows, inputs);
        _projects = new ProjectRows(_network, capacity);
        _milestone = new int[_network.Count];
        Array.Fill(_milestone, -1);
        foreach (var (activity, place) in MilestoneInfo.Activities(_network).Select((a, m) => (a, m)))
            _milestone[activity] = place;
        if (plan.Pools is { } pools)
            _dispatcher = plan.LocalLine is { } line
                ? new InOrderDispatcher(pools, _pass, _rows, line)
                : new PassingDispatcher(pools, _pass, _rows);
    }

    /// <summary>What the chunk last worked left; of every activity only with a full layout.</summary>
    public ScheduleRows Rows => _rows;

    /// <summary>Works the iterations that the inputs stand at and writes them to the samples from <paramref name="offset"/> on.</summary>
    public void Work(BlockSamples samples, int offset)
    {
        var count = _inputs.Count;
        _projects.Begin(_inputs);
        foreach (var activity in _plan.Stages.First)
        {
            Draw(activity, count);
            if (_plan.Stages.IsDispatched(activity))
                _pass.EarliestStarts(activity, _rows.Start(activity, count), _plan.Stages);
            else
                Finish(activity, samples, offset);
        }
        _dispatcher?.Run(count);
        foreach (var activity in _plan.Stages.Dispatched)
            Count(activity, samples, offset);
        foreach (var activity in _plan.Stages.After)
        {
            Draw(activity, count);
            Finish(activity, samples, offset);
        }
        for (var p = 0; p < _network.Projects.Count; p++)
            _projects.End(p, _plan.MinorPerUnit, samples.Finish[p].AsSpan(offset, count), samples.Cost[p].AsSpan(offset, count));
    }

    private void Draw(int activity, int count)
    {
        if (!_network.Finished(activity))
            _inputs.Durations(activity, _rows.Work(activity, count));
    }

    private void Finish(int activity, BlockSamples samples, int offset)
    {
        _pass.Place(activity);
        Count(activity, samples, offset);
    }

    private void Count(int activity, BlockSamples samples, int offset)
    {
        var count = _inputs.Count;
        var finish = _rows.Finish(activity, count);
        if (!_network.Finished(activity))
            _inputs.AddCosts(activity, _rows.Work(activity, count), _projects.Cost(_network.ProjectOf[activity], count));
        if (_network.Fork[activity] < 0)
            _projects.Cover(_network.ProjectOf[activity], _rows.Start(activity, count), finish);
        else
            _projects.CoverWhere(_network.ProjectOf[activity], _rows.Start(activity, count), finish,
                _inputs.Picks(_network.Fork[activity]), _network.Branch[activity]);
        if (_milestone[activity] >= 0)
            Reach(activity, finish, samples.MilestoneFinish[_milestone[activity]].AsSpan(offset, count));
    }

    private void Reach(int milestone, ReadOnlySpan<int> finish, Span<int> reached)
    {
        var scale = _network.Scale;
        for (var k = 0; k < reached.Length; k++)
            reached[k] = scale.ToMinutes(finish[k]);
        if (_network.Fork[milestone] < 0)
            return;
        for (var k = 0; k < reached.Length; k++)
        {
            if (_pass.Absent(milestone, k))
                reached[k] = BlockSamples.Absent;
        }
    }
}
