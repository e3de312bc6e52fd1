using Portfolio.Engine.Calendars;
using Portfolio.Engine.Inputs;
using Portfolio.Engine.Networks;
using Portfolio.Engine.Pools;
using Portfolio.Engine.Runs;
using Portfolio.Model.Distributions;
using Portfolio.Model.Documents;
using Portfolio.Model.Rules;
using Xunit;

namespace Portfolio.Engine.Tests;

/// <summary>Short ways to small portfolios, their plans and what comes of them. Time is counted from the status date, in days.</summary>
internal static class TestPlan
{
    public static readonly DateOnly Start = new(2027, 1, 4);

    /// <summary>Work of so many days, every day worked.</summary>
    public static Activity Work(string id, Distribution duration, params Link[] predecessors) =>
        new() { Id = id, Duration = duration, Predecessors = predecessors };

    public static Activity Work(string id, double days, params Link[] predecessors) => Work(id, new Constant(days), predecessors);

    public static Link After(string predecessor, double lag = 0) => new(predecessor, LinkType.FinishToStart, lag);

    public static Project Project(params Activity[] activities) => new() { Id = "project", StatusDate = Start, Activities = activities };

    public static Settings Settings(PoolRule rule = PoolRule.Passing, params Pool[] pools) =>
        new() { Name = "Test", Currency = "EUR", Pools = pools, PoolRule = rule };

    public static Plan Compile(Settings settings, params Project[] projects) => Compile(settings, null, projects);

    public static Plan Compile(Settings settings, IReadOnlyList<ActivityId>? keepOrder, params Project[] projects)
    {
        var valid = ValidPortfolio.Check(new PortfolioDocument(settings, projects), out var faults);
        Assert.Empty(faults);
        return Plan.Compile(valid!, keepOrder is null ? null : new CompileOptions(keepOrder));
    }

    public static Plan Compile(params Activity[] activities) => Compile(Settings(), Project(activities));

    /// <summary>Days from the status date.</summary>
    public static double Days(int instant) => Minutes.Days(instant - WorkTime.Instant(Start));

    /// <summary>Base start and finish of every activity in document order, in days from the status date.</summary>
    public static (double Start, double Finish)[] BaseDates(this Plan plan) =>
        [.. plan.BaseInstants().Select(x => (Days(x.Start), Days(x.Finish)))];

    /// <summary>Base start and finish of every activity in document order, as minutes since 1970-01-01.</summary>
    public static (int Start, int Finish)[] BaseInstants(this Plan plan)
    {
        var inputs = new BaseInputs(plan.Network, plan.Estimates, plan.Events, plan.Forks);
        var outcomes = new Outcomes(plan, inputs, 1, RowLayout.Full(plan.Network.Count));
        outcomes.Work(new BlockSamples(0, 1, plan.Network.Projects.Count, plan.Milestones.Count), 0);
        int Minute(Span<int> row) => plan.Network.Scale.ToMinutes(row[0]);
        return [.. Enumerable.Range(0, plan.Network.Count).Select(a => (Minute(outcomes.Rows.Start(a, 1)), Minute(outcomes.Rows.Finish(a, 1))))];
    }

    /// <summary>Finishes of the first project in days from the status date, rising.</summary>
    public static double[] Finishes(this Plan plan, int iterations)
    {
        var finishes = new double[iterations];
        plan.Run(1, 0, iterations, new RunOptions(2), block =>
        {
            for (var k = 0; k < block.Count; k++)
                finishes[block.Block * BlockSamples.Size + k] = Days(block.Finish[0][k]);
        });
        Array.Sort(finishes);
        return finishes;
    }
}
