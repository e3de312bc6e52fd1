using Portfolio.Model.Documents;
using Portfolio.Model.Faults;
using Portfolio.Model.Rules;

namespace Portfolio.Model.Tests.Rules;

/// <summary>A write of one part is checked against the outlines of the others.</summary>
public sealed class PartByPartTests
{
    [Fact]
    public void A_project_sent_alone_is_checked_without_the_others()
    {
        var project = Sound.WeirLock with { Calendar = "six-day", Activities = [.. Sound.WeirLock.Activities, Sound.Work("A40", "A99") with { Drivers = ["sky"] }] };
        var faults = ProjectRules.Check(project, ProjectOutline.Of(project), PortfolioContext.Of(Sound.Settings), "");
        Assert.Equal(
            [
                new("/activities/4/drivers/0", "weir-lock/A40", RuleCodes.DriverUnknown, "There is no driver sky."),
                new("/activities/4/predecessors/0", "weir-lock/A40", RuleCodes.ActivityUnknown,
                    "A40 waits for A99, which is no activity of weir-lock."),
                new Fault("/calendar", "weir-lock", RuleCodes.CalendarUnknown, "There is no calendar six-day."),
            ],
            faults.OrderBy(f => f.Path, StringComparer.Ordinal));
    }

    [Fact]
    public void What_breaks_in_stored_parts_has_no_path()
    {
        var shorter = Sound.WeirLock with { Activities = [.. Sound.WeirLock.Activities.Where(a => a.Id is not ("A10" or "A20"))] };
        var faults = PortfolioRules.Check(Sound.Settings, null, [new(ProjectOutline.Of(shorter), ""), new(ProjectOutline.Of(Sound.Quay), null)]);
        Assert.Equal([("", "event/storm", RuleCodes.ActivityUnknown), ("", "quay/B10", RuleCodes.ActivityUnknown)],
            faults.Select(f => (f.Path, f.Subject, f.Code)).Order());
    }

    [Fact]
    public void A_cycle_across_projects_is_reported_where_something_was_sent()
    {
        var quay = Sound.Quay with { Activities = [Sound.Work("B10", "weir-lock/A30")] };
        var weir = Sound.WeirLock with { Activities = [Sound.Work("A10"), Sound.Work("A20", "A10", "quay/B10"), Sound.Work("A30", "A20")] };
        var settings = Sound.Settings with { Dependence = new(), RiskEvents = [] };
        var sent = PortfolioRules.Check(settings, null, [new(ProjectOutline.Of(weir), null), new(ProjectOutline.Of(quay), "")]).Single();
        var stored = PortfolioRules.Check(settings, null, [new(ProjectOutline.Of(weir), null), new(ProjectOutline.Of(quay), null)]).Single();
        Assert.Equal(("/activities/0/predecessors/0", "quay/B10"), (sent.Path, sent.Subject));
        Assert.Equal(("", "weir-lock/A20"), (stored.Path, stored.Subject));
    }

    [Fact]
    public void Settings_sent_alone_are_checked_without_projects() => Assert.Equal(
        new Fault("/defaultCalendar", "settings", RuleCodes.CalendarUnknown, "There is no calendar five-day."),
        SettingsRules.Check(Sound.Settings with { Calendars = [] }, "").Single());

    [Fact]
    public void An_outline_knows_activities_and_links()
    {
        var outline = ProjectOutline.Of(Sound.Quay);
        Assert.Equal(["B10", "B20"], outline.ActivityIds);
        Assert.True(outline is { ReachesOut: true, HasFinish: true });
        Assert.Equal([new(0, 0, -1, "weir-lock", "A10"), new OutlineLink(1, 0, 0, null, null)], outline.Links);
        Assert.Equal((1, -1), (outline.Find("B20"), outline.Find("b20")));
    }
}
