using Portfolio.Engine.Calendars;
using Portfolio.Engine.Inputs;
using Portfolio.Engine.Networks;
using Portfolio.Model.Documents;

namespace Portfolio.Engine.Runs;

/// <summary>
/// Finishes, first starts and costs of projects over the iterations of a chunk, gathered from their activities (contract section 4,
/// item 8). Projects without activities count nowhere: no finish, no cost. Belongs to one thread.
/// </summary>
internal sealed class ProjectRows
{
    private readonly Network _network;
    private readonly int _capacity;
    private readonly int[] _finish;
    private readonly int[] _first;
    private readonly double[] _cost;
    private readonly bool[] _fromFirstStart; // [project] overhead runs from the first start that was drawn
    private readonly double[] _actual;       // [project] what has been spent

    public ProjectRows(Network network, int capacity)
    {
        (_network, _capacity) = (network, capacity);
        var projects = network.Projects;
        _finish = new int[projects.Count * capacity];
        _first = new int[projects.Count * capacity];
        _cost = new double[projects.Count * capacity];
        _fromFirstStart = [.. projects.Select((project, p) => project.Overhead is not null && !network.Begun(p))];
        _actual = [.. projects.Select(p => (double)(p.Activities.Sum(a => a.Cost?.Actual ?? 0) + (p.Overhead?.Actual ?? 0)))];
    }

    public Span<double> Cost(int project, int count) => _cost.AsSpan(project * _capacity, count);

    /// <summary>Forgets the chunk before; costs begin with what is spent and what events and responses cost.</summary>
    public void Begin(ChunkInputs inputs)
    {
        Array.Fill(_finish, BlockSamples.Absent);
        Array.Fill(_first, int.MaxValue);
        for (var p = 0; p < _network.Projects.Count; p++)
        {
            var cost = Cost(p, inputs.Count);
            cost.Fill(_actual[p]);
            if (_network.Projects[p].Activities.Count > 0)
                inputs.AddEventCosts(p, cost);
        }
    }

    /// <summary>An activity that always happens.</summary>
    public void Cover(int project, ReadOnlySpan<int> start, ReadOnlySpan<int> finish)
    {
        InstantRows.Latest(finish, _finish.AsSpan(project * _capacity, finish.Length));
        if (_fromFirstStart[project])
            InstantRows.Earliest(start, _first.AsSpan(project * _capacity, start.Length));
    }

    /// <summary>An activity that happens in the iterations that pick its branch.</summary>
    public void CoverWhere(int project, ReadOnlySpan<int> start, ReadOnlySpan<int> finish, ReadOnlySpan<int> picks, int branch)
    {
        var latest = _finish.AsSpan(project * _capacity, finish.Length);
        var first = _first.AsSpan(project * _capacity, start.Length);
        for (var k = 0; k < picks.Length; k++)
        {
            if (picks[k] != branch)
                continue;
            latest[k] = Math.Max(latest[k], finish[k]);
            first[k] = Math.Min(first[k], start[k]);
        }
    }

    /// <summary>The project's finishes, minutes since 1970-01-01, and costs in whole minor units.</summary>
    public void End(int project, double minorPerUnit, Span<int> finish, Span<double> minor)
    {
        if (_network.Projects[project].Activities.Count == 0)
        {
            finish.Fill(BlockSamples.Absent);
            minor.Clear();
            return;
        }
        var latest = _finish.AsSpan(project * _capacity, finish.Length);
        var cost = Cost(project, finish.Length);
        AddOverhead(project, latest, cost);
        for (var k = 0; k < finish.Length; k++)
        {
            finish[k] = _network.Scale.ToMinutes(latest[k]);
            minor[k] = Money.ToMinor(cost[k], minorPerUnit);
        }
    }

    // Per working day from the first start (the status date once anything has started) to the finish, never below 0.
    private void AddOverhead(int project, ReadOnlySpan<int> finish, Span<double> cost)
    {
        if (_network.Projects[project].Overhead is not { } overhead)
            return;
        var calendar = _network.ProjectCalendar[project];
        var status = _network.Status[_network.ProjectStart[project]];
        var first = _first.AsSpan(project * _capacity, finish.Length);
        for (var k = 0; k < cost.Length; k++)
        {
            var from = _fromFirstStart[project] ? Math.Min(first[k], finish[k]) : status;
            cost[k] += overhead.PerDay * Minutes.Days(Math.Max(calendar.Worked(finish[k]) - calendar.Worked(from), 0));
        }
    }
}
