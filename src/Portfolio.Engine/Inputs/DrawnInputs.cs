using Portfolio.Engine.Dependence;
using Portfolio.Engine.Draws;
using Portfolio.Engine.Networks;

namespace Portfolio.Engine.Inputs;

/// <summary>
/// Draws the inputs of a chunk. <see cref="Begin"/> works what activities share: factors, drivers, events and branches; durations and
/// costs are then drawn row by row. Each draw is a function of seed, key and iteration alone. Layout: rows of as many entries as the chunk
/// has iterations.
/// </summary>
internal sealed class DrawnInputs : ChunkInputs
{
    private readonly Network _network;
    private readonly EstimateSet _estimates;
    private readonly EventSet _events;
    private readonly ForkSet _forks;
    private readonly DependenceModel _dependence;
    private readonly DriverFactors[] _drivers;
    private readonly double[] _factors;       // [project] factor score
    private readonly double[] _driverScores;  // [driver]
    private readonly double[] _durationFactor; // [driver]
    private readonly double[] _costFactor;    // [driver]
    private readonly double[] _delays;        // [delay row] working days
    private readonly double[] _eventCost;     // [project] money
    private readonly int[] _picks;            // [fork]
    private readonly double[] _uniforms, _scores, _values, _rates, _product;
    private ulong _seed;
    private long _first;
    private int _count;

    public DrawnInputs(
        Network network, EstimateSet estimates, EventSet events, ForkSet forks, DependenceModel dependence, DriverFactors[] drivers,
        int capacity)
    {
        (_network, _estimates, _events, _forks, _dependence, _drivers) = (network, estimates, events, forks, dependence, drivers);
        _factors = new double[network.Projects.Count * capacity];
        _driverScores = new double[drivers.Length * capacity];
        _durationFactor = new double[drivers.Length * capacity];
        _costFactor = new double[drivers.Length * capacity];
        _delays = new double[events.DelayRows * capacity];
        _eventCost = new double[network.Projects.Count * capacity];
        _picks = new int[forks.Count * capacity];
        (_uniforms, _scores, _values) = (new double[capacity], new double[capacity], new double[capacity]);
        (_rates, _product) = (new double[capacity], new double[capacity]);
    }

    public override int Count => _count;

    public override ReadOnlySpan<int> Picks(int fork) => _picks.AsSpan(fork * _count, _count);

    /// <summary>Moves to iterations <paramref name="first"/> … first + count − 1; count at most the capacity.</summary>
    public void Begin(ulong seed, long first, int count)
    {
        (_seed, _first, _count) = (seed, first, count);
        _dependence.Scores(seed, first, count, _factors, _driverScores);
        for (var d = 0; d < _drivers.Length; d++)
            _drivers[d].Read(Row(_driverScores, d), Row(_durationFactor, d), Row(_costFactor, d));
        PickBranches();
        HappenEvents();
    }

    public override void Durations(int activity, Span<int> minutes)
    {
        var delays = _events.DelayRow[activity] is >= 0 and var delay ? Row(_delays, delay) : (RowOrNumber)0;
        if (_estimates.Duration[activity] is { } estimate)
        {
            var days = Draw(estimate, activity, _values);
            ValueRows.ToMinutes(days, Product(_durationFactor, _estimates.DurationDrivers[activity]), delays, minutes);
        }
        else
        {
            ValueRows.ToMinutes(0, 1, delays, minutes);
        }
        ClearAbsent(activity, minutes);
    }

    public override void AddCosts(int activity, ReadOnlySpan<int> minutes, Span<double> cost)
    {
        var (stated, rate) = (_estimates.Fixed[activity], _estimates.Rate[activity]);
        if (stated is null && rate is null)
            return;
        var once = stated is null ? 0 : WhereItHappens(Draw(stated, activity, _values), activity);
        var factors = Product(_costFactor, _estimates.CostDrivers[activity]);
        if (rate is null)
            ValueRows.AddProduct(cost, once, factors);
        else
            ValueRows.AddWorked(cost, once, Draw(rate, activity, _rates), minutes, factors);
    }

    public override void AddEventCosts(int project, Span<double> cost) => ValueRows.AddProduct(cost, Row(_eventCost, project), 1);

    private Span<double> Row(double[] rows, int row) => rows.AsSpan(row * _count, _count);

    // The marginal at Φ(√r·F + √(1−r)·ε), worked in the room given.
    private RowOrNumber Draw(Estimate estimate, int activity, double[] room)
    {
        if (estimate.Certain)
            return estimate.Base;
        var scores = Scores(estimate.Key);
        var project = _network.ProjectOf[activity];
        var (loading, own) = (_estimates.Loading[project], _estimates.Own[project]);
        if (loading > 0)
            ValueRows.Mix(loading, Row(_factors, project), own, scores);
        var values = room.AsSpan(0, _count);
        estimate.Marginal.Read(scores, values);
        return values;
    }

    // What the drivers together multiply by.
    private RowOrNumber Product(double[] factors, int[] drivers)
    {
        if (drivers.Length == 0)
            return 1;
        var product = Row(factors, drivers[0]);
        foreach (var driver in drivers.AsSpan(1))
        {
            var room = _product.AsSpan(0, _count);
            ValueRows.Multiply(product, Row(factors, driver), room);
            product = room;
        }
        return product;
    }

    private Span<double> UniformsOf(ulong key)
    {
        var uniforms = _uniforms.AsSpan(0, _count);
        Uniforms.Fill(_seed, key, _first, uniforms);
        return uniforms;
    }

    private Span<double> Scores(ulong key)
    {
        var scores = _scores.AsSpan(0, _count);
        NormalScore.Fill(_seed, key, _first, scores);
        return scores;
    }

    // A fixed cost, 0 where the activity does not happen. Daily rates need no such care: there are no minutes there.
    private RowOrNumber WhereItHappens(RowOrNumber values, int activity)
    {
        if (_network.Fork[activity] < 0)
            return values;
        var row = _values.AsSpan(0, _count);
        for (var k = 0; k < row.Length; k++)
            row[k] = values[k];
        ClearAbsent(activity, row);
        return row;
    }

    private void ClearAbsent<T>(int activity, Span<T> row) where T : struct
    {
        if (_network.Fork[activity] is not (>= 0 and var fork))
            return;
        var picks = Picks(fork);
        for (var k = 0; k < row.Length; k++)
        {
            if (picks[k] != _network.Branch[activity])
                row[k] = default;
        }
    }

    private void PickBranches()
    {
        for (var fork = 0; fork < _forks.Count; fork++)
        {
            var picks = _picks.AsSpan(fork * _count, _count);
            if (_forks.Certain[fork])
            {
                picks.Fill(_forks.Base[fork]);
                continue;
            }
            var uniforms = UniformsOf(_forks.Key[fork]);
            for (var k = 0; k < picks.Length; k++)
                picks[k] = _forks.Pick(fork, uniforms[k]);
        }
    }

    private void HappenEvents()
    {
        Array.Clear(_delays);
        for (var project = 0; project < _network.Projects.Count; project++)
            Row(_eventCost, project).Fill(_events.ResponseCost[project]);
        Span<bool> happens = stackalloc bool[_count];
        foreach (var stated in _events.Events)
        {
            var uniforms = UniformsOf(stated.Key);
            for (var k = 0; k < uniforms.Length; k++)
                happens[k] = uniforms[k] < stated.Probability;
            foreach (var impact in stated.Impacts)
                Strike(impact, happens);
        }
    }

    // One severity, at which both the delay and the cost are read.
    private void Strike(CompiledImpact impact, ReadOnlySpan<bool> happens)
    {
        var severity = Scores(impact.Key);
        var values = _values.AsSpan(0, _count);
        if (impact.Delay is not null)
        {
            impact.Delay.Read(severity, values);
            var delays = Row(_delays, _events.DelayRow[impact.Activity]);
            for (var k = 0; k < values.Length; k++)
                delays[k] += happens[k] ? Math.Max(values[k], 0) : 0;
        }
        if (impact.Cost is not null)
        {
            impact.Cost.Read(severity, values);
            if (impact.Activity >= 0)
                ClearAbsent(impact.Activity, values);
            var cost = Row(_eventCost, impact.Project);
            for (var k = 0; k < values.Length; k++)
                cost[k] += happens[k] ? values[k] : 0;
        }
    }
}
