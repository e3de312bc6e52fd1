using Portfolio.Model.Distributions;
using Portfolio.Model.Documents;
using static Portfolio.Engine.Tests.TestPlan;

namespace Portfolio.Engine.Tests.Networks;

/// <summary>
/// Small random networks of one project for properties that hold whatever the network; the same seed makes the same network.
/// </summary>
internal sealed class RandomNetwork
{
    private static readonly Pool[] NoPools = [];

    private readonly Random _random;

    public RandomNetwork(int seed, bool pools, bool allLinks = false)
    {
        _random = new Random(seed);
        Pools = pools ? [.. Enumerable.Range(0, _random.Next(1, 3)).Select(Pool)] : NoPools;
        var n = _random.Next(6, 14);
        var activities = Enumerable.Range(0, n).Select(a => Activity(a, allLinks)).ToArray();
        Activities = activities;
    }

    public Pool[] Pools { get; }

    public Activity[] Activities { get; }

    public static WorkCalendar FiveDays { get; } = new(
        "five",
        [DayOfWeek.Monday, DayOfWeek.Tuesday, DayOfWeek.Wednesday, DayOfWeek.Thursday, DayOfWeek.Friday],
        [Start.AddDays(9)],
        [Start.AddDays(12)]);

    public Plan Compile(PoolRule rule) => Compile(rule, null, Activities, Pools);

    public static Plan Compile(PoolRule rule, IReadOnlyList<Engine.Pools.ActivityId>? keep, Activity[] activities, Pool[] pools) =>
        TestPlan.Compile(Settings(rule, pools) with { Calendars = [FiveDays] }, keep, Project(activities));

    /// <summary>The same work, less of it for one activity.</summary>
    public Activity[] Shorter()
    {
        var a = Among(i => Length(Activities[i]) > 0);
        return Changed(a, Longer(Activities[a], -0.25 * _random.Next(1, (int)(Length(Activities[a]) * 4) + 1)));
    }

    /// <summary>The same work, more of it for one activity.</summary>
    public Activity[] Longer()
    {
        var a = _random.Next(Activities.Length);
        return Changed(a, Longer(Activities[a], 0.25 * _random.Next(1, 20)));
    }

    /// <summary>One link fewer; the same where there is none.</summary>
    public Activity[] LessLinked()
    {
        if (Activities.All(x => x.Predecessors.Count == 0))
            return Activities;
        var a = Among(i => Activities[i].Predecessors.Count > 0);
        var gone = _random.Next(Activities[a].Predecessors.Count);
        return Changed(a, Activities[a] with { Predecessors = [.. Activities[a].Predecessors.Where((_, i) => i != gone)] });
    }

    /// <summary>One pool with more units from some day on or throughout.</summary>
    public Pool[] Larger()
    {
        var p = _random.Next(Pools.Length);
        var more = 0.5 * _random.Next(1, 4);
        var larger = Pools[p] with
        {
            Capacity = Pools[p].Capacity + _random.Next(0, 2) * more,
            CapacityChanges = [.. Pools[p].CapacityChanges.Select(c => c with { Capacity = c.Capacity + more })],
        };
        return [.. Pools.Select((pool, i) => i == p ? larger : pool)];
    }

    private Activity[] Changed(int a, Activity to) => [.. Activities.Select((activity, i) => i == a ? to : activity)];

    private int Among(Func<int, bool> condition)
    {
        int[] possible = [.. Enumerable.Range(0, Activities.Length).Where(condition)];
        return possible[_random.Next(possible.Length)];
    }

    private static double Length(Activity activity) => ((Constant)(activity.Remaining ?? activity.Duration)!).Value;

    private static Activity Longer(Activity activity, double days) => activity.UnderWay
        ? activity with { Remaining = new Constant(Length(activity) + days) }
        : activity with { Duration = new Constant(Length(activity) + days) };

    private Pool Pool(int number)
    {
        var changes = Enumerable.Range(0, _random.Next(0, 3))
            .Select(i => new CapacityChange(Start.AddDays(4 + 7 * i + _random.Next(0, 6)), _random.Next(0, 4))).ToList();
        changes.Add(new CapacityChange(Start.AddDays(30), _random.Next(2, 4)));
        return new Pool($"pool-{number}", null, _random.Next(1, 4), changes);
    }

    private Activity Activity(int a, bool allLinks)
    {
        var length = new Constant(_random.NextDouble() < 0.05 ? 0 : 0.25 * _random.Next(1, 30));
        var underWay = _random.NextDouble() < 0.08;
        return new Activity
        {
            Id = $"A{a}",
            Duration = length,
            Remaining = underWay ? length : null,
            ActualStart = underWay ? Start.AddDays(-_random.Next(1, 9)) : null,
            Calendar = _random.NextDouble() < 0.4 ? FiveDays.Id : null,
            EarliestStart = _random.NextDouble() < 0.1 ? Start.AddDays(_random.Next(0, 20)) : null,
            Predecessors = [.. Enumerable.Range(0, a).Where(_ => _random.NextDouble() < 1.6 / a).Select(p => Link(p, allLinks))],
            Demands = [.. Pools.Where(_ => _random.NextDouble() < 0.6).Select(p => new Demand(p.Id, 0.5 * _random.Next(1, 5)))],
        };
    }

    private Link Link(int predecessor, bool allLinks)
    {
        var draw = _random.NextDouble();
        var type = draw < 0.6 ? LinkType.FinishToStart
            : draw < 0.75 || !allLinks ? LinkType.StartToStart
            : draw < 0.88 ? LinkType.FinishToFinish
            : LinkType.StartToFinish;
        return new Link($"A{predecessor}", type, _random.NextDouble() < 0.5 ? 0 : 0.5 * _random.Next(-4, 9));
    }
}
