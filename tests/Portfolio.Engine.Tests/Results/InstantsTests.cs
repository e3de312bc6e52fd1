using System.Globalization;
using Portfolio.Engine.Results;
using Portfolio.Model.Documents;
using Xunit;

namespace Portfolio.Engine.Tests.Results;

public sealed class InstantsTests
{
    private static DateOnly Date(string text) => DateOnly.ParseExact(text, "yyyy-MM-dd", CultureInfo.InvariantCulture);

    private static int At(string date, int minutes = 0) => Instants.ToDay(Date(date)) * Instants.MinutesPerDay + minutes;

    [Theory]
    [InlineData("2028-02-11", 0, "2028-02-10", "2028-02-11")] // midnight ends the day before, and begins its own
    [InlineData("2028-02-11", 1, "2028-02-11", "2028-02-11")]
    [InlineData("2028-02-11", 1439, "2028-02-11", "2028-02-11")]
    [InlineData("2028-03-01", 0, "2028-02-29", "2028-03-01")]
    [InlineData("1970-01-01", 0, "1970-01-01", "1970-01-01")] // the end of 1969 is clamped
    [InlineData("1970-01-01", 1, "1970-01-01", "1970-01-01")]
    [InlineData("1970-01-02", 0, "1970-01-01", "1970-01-02")]
    [InlineData("1970-01-01", -5, "1970-01-01", "1970-01-01")]
    [InlineData("2199-12-31", 1440, "2199-12-31", "2199-12-31")]
    [InlineData("2200-06-01", 7, "2199-12-31", "2199-12-31")]
    public void AnInstantHasTheDayThatEndsNext(string date, int minutes, string ending, string containing)
    {
        Assert.Equal(Date(ending), default(DateRule).Date(At(date, minutes)));
        Assert.Equal(Date(containing), new DateRule(true, 0).Date(At(date, minutes)));
    }

    [Fact]
    public void EveryDayGivesItselfBack()
    {
        for (var day = 0; day <= Instants.LastDay; day++)
        {
            var date = Instants.ToDate(day);
            Assert.Equal(day, Instants.ToDay(date));
            Assert.Equal(day, Instants.DayEndingAt(Instants.EndOf(date)));
        }
        Assert.Equal(new DateOnly(2199, 12, 31), Instants.ToDate(Instants.LastDay));
    }

    [Theory]
    [InlineData(0.0, "2028-02-10")]
    [InlineData(0.0001, "2028-02-11")]
    public void AMeanBetweenTwoMinutesIsDatedToo(double minutes, string expected) =>
        Assert.Equal(Date(expected), default(DateRule).Date(At("2028-02-11") + minutes));

    [Theory]
    [InlineData(LinkType.FinishToStart, "2028-02-10")]
    [InlineData(LinkType.FinishToFinish, "2028-02-10")]
    [InlineData(LinkType.StartToStart, "2028-02-11")]
    [InlineData(LinkType.StartToFinish, "2028-02-11")]
    public void AMilestoneThatOnlyStartsLeadToOpensItsDay(LinkType type, string expected)
    {
        var milestone = new Activity { Id = "M", Milestone = true, Predecessors = [new("A", type)] };
        Assert.Equal(Date(expected), DateRule.OfMilestone(ProjectOf("2028-01-01"), milestone).Date(At("2028-02-11")));
    }

    [Fact]
    public void AMilestoneIsNotDatedBeforeWhatItWaitsFor()
    {
        var after = new Activity { Id = "M", Milestone = true, Predecessors = [new("A")] };
        Assert.Equal(Date("2028-02-11"), DateRule.OfMilestone(ProjectOf("2028-02-11"), after).Date(At("2028-02-11")));
        var early = after with { EarliestStart = Date("2028-02-14") };
        Assert.Equal(Date("2028-02-14"), DateRule.OfMilestone(ProjectOf("2028-02-11"), early).Date(At("2028-02-14")));
        var done = new Activity { Id = "M", Milestone = true, ActualFinish = Date("2028-02-03") };
        Assert.Equal(Date("2028-02-03"), DateRule.OfMilestone(ProjectOf("2028-02-11"), done).Date(Instants.EndOf(Date("2028-02-03"))));
    }

    private static Project ProjectOf(string statusDate) => new() { Id = "P", StatusDate = Date(statusDate) };
}
