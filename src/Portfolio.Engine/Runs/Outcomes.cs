using Portfolio.Engine.Calendars;
using Portfolio.Engine.Inputs;
using Portfolio.Engine.Networks;
using Portfolio.Engine.Pools;
using Portfolio.Model.Documents;

namespace Portfolio.Engine.Runs;

/// <summary>
/// Works a chunk of iterations through: schedules, then forms finishes and costs (contract section 4, items 6–8). Belongs to one thread;
/// allocates nothing per chunk.
/// </summary>
internal sealed class Outcomes
{
    private readonly Plan _plan;
    private readonly Network _network;
    private readonly ChunkInputs _inputs;
    private readonly ScheduleRows _rows;
    private readonly ForwardPass _pass;
    private readonly Dispatcher? _dispatcher;
    private readonly int[] _firstStart;
    private readonly double[] _cost;

    public Outcomes(Plan plan, ChunkInputs inputs, int capacity)
    {
        (_plan, _network, _inputs) = (plan, plan.Network, inputs);
        _rows = new ScheduleRows(_network.Count, capacity);
        _pass = new ForwardPass(_network, _rows, inputs);
        _firstStart = new int[capacity];
        _cost = new double[capacity];
        if (plan.Pools is { } pools)
            _dispatcher = plan.LocalLine is { } line ? new InOrderDispatcher(pools, _pass, _rows, line) : new PassingDispatcher(pools, _pass, _rows);
    }

    /// <summary>Starts, finishes and work of the chunk last scheduled.</summary>
    public ScheduleRows Rows => _rows;

    /// <summary>Places every activity in every iteration of the chunk that the inputs stand at.</summary>
    public void Schedule()
    {
        var count = _inputs.Count;
        for (var a = 0; a < _network.Count; a++)
        {
            if (!_network.Finished(a))
                _inputs.Durations(a, _rows.Work(a, count));
        }
        foreach (var activity in _plan.Stages.Before)
            _pass.Place(activity);
        if (_dispatcher is not null)
        {
            foreach (var activity in _plan.Stages.Dispatched)
                _pass.EarliestStarts(activity, _rows.Start(activity, count), _plan.Stages);
            for (var k = 0; k < count; k++)
                _dispatcher.Run(k);
        }
        foreach (var activity in _plan.Stages.After)
            _pass.Place(activity);
    }

    /// <summary>Finish of a project, the latest finish of what happens; <see cref="BlockSamples.Absent"/> without activities.</summary>
    public void Finish(int project, Span<int> finish)
    {
        finish.Fill(BlockSamples.Absent);
        for (var a = _network.ProjectStart[project]; a < _network.ProjectStart[project + 1]; a++)
        {
            var row = _rows.Finish(a, finish.Length);
            for (var k = 0; k < finish.Length; k++)
            {
                if (row[k] > finish[k] && !_pass.Absent(a, k))
                    finish[k] = row[k];
            }
        }
    }

    /// <summary>Cost of a project in whole minor units, given its finishes.</summary>
    public void Cost(int project, ReadOnlySpan<int> finish, Span<double> minor)
    {
        var cost = _cost.AsSpan(0, finish.Length);
        cost.Clear();
        if (_network.ProjectStart[project] < _network.ProjectStart[project + 1])
        {
            _inputs.AddEventCosts(project, cost);
            AddActivities(project, cost);
            AddOverhead(project, finish, cost);
        }
        for (var k = 0; k < cost.Length; k++)
            minor[k] = Money.ToMinor(cost[k], _plan.MinorPerUnit);
    }

    /// <summary>Finish of a milestone, <see cref="BlockSamples.Absent"/> where it does not happen.</summary>
    public void MilestoneFinish(int activity, Span<int> finish)
    {
        _rows.Finish(activity, finish.Length).CopyTo(finish);
        for (var k = 0; k < finish.Length; k++)
        {
            if (_pass.Absent(activity, k))
                finish[k] = BlockSamples.Absent;
        }
    }

    private void AddActivities(int project, Span<double> cost)
    {
        var actual = 0.0;
        for (var a = _network.ProjectStart[project]; a < _network.ProjectStart[project + 1]; a++)
        {
            actual += (double)(_network.Activities[a].Cost?.Actual ?? 0);
            if (!_network.Finished(a))
                _inputs.AddCosts(a, _rows.Work(a, cost.Length), cost);
        }
        for (var k = 0; k < cost.Length; k++)
            cost[k] += actual;
    }

    // Per working day from the first start (the status date once anything has started) to the finish, never below 0.
    private void AddOverhead(int project, ReadOnlySpan<int> finish, Span<double> cost)
    {
        if (_network.Projects[project].Overhead is not { } overhead)
            return;
        var first = _firstStart.AsSpan(0, cost.Length);
        FirstStarts(project, finish, first);
        var calendar = _network.ProjectCalendar[project];
        for (var k = 0; k < cost.Length; k++)
        {
            var worked = Math.Max(calendar.Worked(finish[k]) - calendar.Worked(first[k]), 0);
            cost[k] += overhead.PerDay * Minutes.Days(worked) + (double)overhead.Actual;
        }
    }

    private void FirstStarts(int project, ReadOnlySpan<int> finish, Span<int> first)
    {
        if (_network.Begun(project))
        {
            first.Fill(WorkTime.Instant(_network.Projects[project].StatusDate));
            return;
        }
        finish.CopyTo(first);
        for (var a = _network.ProjectStart[project]; a < _network.ProjectStart[project + 1]; a++)
        {
            var row = _rows.Start(a, first.Length);
            for (var k = 0; k < first.Length; k++)
            {
                if (row[k] < first[k] && !_pass.Absent(a, k))
                    first[k] = row[k];
            }
        }
    }
}
