using Portfolio.Engine.Pools;
using Portfolio.Engine.Tests.Networks;
using Portfolio.Model.Documents;
using Xunit;
using static Portfolio.Engine.Tests.TestPlan;

namespace Portfolio.Engine.Tests.Pools;

/// <summary>
/// R. L. Graham, Bounds on multiprocessing timing anomalies, SIAM J. Applied Mathematics 17(2), 1969, 416–429: nine tasks on three
/// machines,
/// T1 before T9, T4 before T5 … T8. Under a rule that lets others pass, more machines, shorter tasks, fewer arcs or another list make the
/// whole later; when an order is kept nothing does (activity-based policy; F. Stork, Stochastic resource-constrained project scheduling,
/// 2001).
/// </summary>
public sealed class GrahamTests
{
    private static readonly double[] Times = [3, 2, 2, 2, 4, 4, 4, 4, 9];
    private static readonly int[] List = [1, 2, 3, 4, 5, 6, 7, 8, 9];

    [Fact]
    public void UnderPassingEveryReliefMakesItLater()
    {
        Assert.Equal(12, Makespan(PoolRule.Passing, Tasks(Times, List), 3));
        Assert.Equal(15, Makespan(PoolRule.Passing, Tasks(Times, List), 4));
        Assert.Equal(13, Makespan(PoolRule.Passing, Tasks([.. Times.Select(t => t - 1)], List), 3));
        Assert.Equal(16, Makespan(PoolRule.Passing, Tasks(Times, List, freed: [5, 6]), 3));
        Assert.Equal(14, Makespan(PoolRule.Passing, Tasks(Times, [1, 2, 4, 5, 6, 3, 9, 7, 8]), 3));
    }

    [Fact]
    public void InTheOrderOfTheBaseNoReliefMakesItLater()
    {
        var plan = Compile(Settings(PoolRule.InOrder, Machines(3)), Project(Tasks(Times, List)));
        Assert.Equal(12, plan.BaseDates().Max(x => x.Finish));
        Assert.True(Makespan(PoolRule.InOrder, Tasks(Times, List), 4, plan.Order) <= 12);
        Assert.True(Makespan(PoolRule.InOrder, Tasks([.. Times.Select(t => t - 1)], List), 3, plan.Order) <= 12);
        Assert.True(Makespan(PoolRule.InOrder, Tasks(Times, List, freed: [5, 6]), 3, plan.Order) <= 12);
    }

    // The list itself as the order: 17, and every relief helps (15, 13, 16), worked out by hand.
    [Fact]
    public void InTheOrderOfTheListEveryReliefHelps()
    {
        ActivityId[] order = [.. List.Select(t => new ActivityId("project", $"T{t}"))];
        Assert.Equal(17, Makespan(PoolRule.InOrder, Tasks(Times, List), 3, order));
        Assert.Equal(15, Makespan(PoolRule.InOrder, Tasks(Times, List), 4, order));
        Assert.Equal(13, Makespan(PoolRule.InOrder, Tasks([.. Times.Select(t => t - 1)], List), 3, order));
        Assert.Equal(16, Makespan(PoolRule.InOrder, Tasks(Times, List, freed: [5, 6]), 3, order));
    }

    private static double Makespan(PoolRule rule, Activity[] tasks, double machines, IReadOnlyList<ActivityId>? order = null) =>
        Compile(Settings(rule, Machines(machines)), order, Project(tasks)).BaseDates().Take(9).Max(x => x.Finish);

    private static Pool Machines(double count) => new("machines", null, count, []);

    // Pools serve by latest finish, then by place. What follows T2, and T3, without a machine puts them before T4 where the list does; of
    // the others all may finish last, so that their place decides.
    private static Activity[] Tasks(double[] times, int[] list, int[]? freed = null) =>
    [
        .. list.Select(t => Work($"T{t}", times[t - 1], Before(t, freed ?? [])) with { Demands = [new Demand("machines", 1)] }),
        Work("X2", 6, After("T2")),
        .. list.IndexOf(3) < list.IndexOf(4) ? [Work("X3", 6, After("T3"))] : Array.Empty<Activity>(),
    ];

    private static Link[] Before(int task, int[] freed) => task switch
    {
        9 => [After("T1")],
        5 or 6 or 7 or 8 when !freed.Contains(task) => [After("T4")],
        _ => [],
    };
}
