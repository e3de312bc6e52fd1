using Portfolio.Model.Documents;
using Xunit;
using static Portfolio.Engine.Tests.TestPlan;

namespace Portfolio.Engine.Tests.Networks;

/// <summary>
/// Seven activities with links of all four types, leads and lags; dates confirmed by a linear program over the constraints
/// S_j ≥ F_i + l, S_j ≥ S_i + l, F_j ≥ F_i + l, F_j ≥ S_i + l.
/// </summary>
public sealed class SevenActivityNetworkTests
{
    [Fact]
    public void DatesAreThoseOfTheLinearProgram()
    {
        (double, double)[] expected = [(0, 5), (5, 11), (2, 6), (9, 17), (7, 10), (13, 20), (20, 22)];
        Assert.Equal(expected, Compile(Seven()).BaseDates());
    }

    // The start of F drives, not its finish; of D too: on the critical path, and yet they may grow.
    [Theory]
    [InlineData(8, 7, 22)]
    [InlineData(8, 9, 22)]
    [InlineData(8, 10, 23)]
    [InlineData(11, 7, 22)]
    [InlineData(12, 7, 23)]
    public void WorkWhoseStartDrivesMayGrow(double d, double f, double finish) =>
        Assert.Equal(finish, Compile(Seven(d, f)).BaseDates().Max(x => x.Finish));

    [Fact]
    public void AnEarliestStartThatStaysWithinTheFloatMovesOnlyItsActivity()
    {
        var dates = Compile(Seven(earliestE: Start.AddDays(12))).BaseDates();
        Assert.Equal((12, 15), dates[4]);
        Assert.Equal(22, dates.Max(x => x.Finish));
    }

    // Wiest, J. Operations Management 1(3), 1981: a longer activity that ends earlier what follows its start.
    [Theory]
    [InlineData(3, 14)]
    [InlineData(6, 11)]
    public void LongerWorkBehindAFinishToFinishLinkEndsEarlierAndIsWarnedOf(double b, double finish)
    {
        var plan = Compile(
            Work("A", 10), Work("B", b, new Link("A", LinkType.FinishToFinish)), Work("C", 6, new Link("B", LinkType.StartToStart, 1)));
        Assert.Equal(finish, plan.BaseDates().Max(x => x.Finish));
        Assert.Equal(["project/B"], plan.Warnings.Single(w => w.Code == "schedule.reverse").Subjects);
    }

    [Fact]
    public void OnlyWorkWhoseStartDrivesIsWarnedOf()
    {
        var plan = Compile(Work("A", 10), Work("B", 3, new Link("A", LinkType.FinishToFinish)), Work("C", 6, After("B")));
        Assert.DoesNotContain(plan.Warnings, w => w.Code == "schedule.reverse");
    }

    private static Activity[] Seven(double d = 8, double f = 7, DateOnly? earliestE = null) =>
    [
        Work("A", 5),
        Work("B", 6, After("A")),
        Work("C", 4, new Link("A", LinkType.StartToStart, 2)),
        Work("D", d, After("B", -2), new Link("C", LinkType.FinishToFinish, 3)),
        Work("E", 3, After("C", 1)) with { EarliestStart = earliestE },
        Work("F", f, new Link("D", LinkType.StartToStart, 4), new Link("E", LinkType.FinishToFinish, 2)),
        Work("G", 2, After("D"), new Link("F", LinkType.StartToFinish, 9), After("E")),
    ];
}
