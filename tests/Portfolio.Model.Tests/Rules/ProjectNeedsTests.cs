using Portfolio.Model.Documents;
using Portfolio.Model.Rules;

namespace Portfolio.Model.Tests.Rules;

/// <summary>What a project asks of the settings tells whether new settings would break it.</summary>
public sealed class ProjectNeedsTests
{
    private static readonly ProjectNeeds Needs = ProjectNeeds.Of(new Project
    {
        Id = "weir",
        StatusDate = Sound.Status,
        Calendar = "five-day",
        Drivers = ["ground"],
        Activities =
        [
            Sound.Work("A10") with { Demands = [new("crane", 2)], Drivers = ["sky", "ground"] },
            Sound.Work("A20") with { Demands = [new("crane", 1)], Calendar = "six-day" },
            Sound.Work("A30") with { Demands = [new("crane", 9), new("barge", 4)], ActualStart = Sound.Status, ActualFinish = Sound.Status },
        ],
    });

    [Fact]
    public void Each_need_is_named_once_and_finished_work_needs_no_room()
    {
        Assert.Equal(["five-day", "six-day"], Needs.Calendars);
        Assert.Equal(["ground", "sky"], Needs.Drivers);
        Assert.Equal([new("crane", 2), new KeyValuePair<string, double>("barge", 0)], Needs.Pools);
    }

    [Theory]
    [InlineData("five-day six-day", "ground sky", 2, true, true)]
    [InlineData("five-day", "ground sky", 2, true, false)]
    [InlineData("five-day six-day", "ground", 2, true, false)]
    [InlineData("five-day six-day", "ground sky", 1, true, false)]
    [InlineData("five-day six-day", "ground sky", 2, false, false)]
    public void Settings_meet_them_or_not(string calendars, string drivers, double cranes, bool barges, bool met)
    {
        var settings = new Settings
        {
            Name = "n",
            Currency = "EUR",
            Calendars = [.. calendars.Split(' ').Select(id => new WorkCalendar(id, [], [], []))],
            Drivers = [.. drivers.Split(' ').Select(id => new Driver(id, null, 1, null, null))],
            Pools = [new Pool("crane", null, cranes, []), .. barges ? [new Pool("barge", null, 0, [])] : Array.Empty<Pool>()],
        };
        Assert.Equal(met, Needs.AreMetBy(PortfolioContext.Of(settings)));
    }
}
