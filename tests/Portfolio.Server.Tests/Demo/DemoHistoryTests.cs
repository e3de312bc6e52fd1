using Portfolio.Engine;
using Portfolio.Engine.Runs;
using Portfolio.Model.Rules;
using Portfolio.Server.Demo;

namespace Portfolio.Server.Tests.Demo;

/// <summary>The half year of the demo: valid in every week whatever the day, the same for the same day, and worth looking at.</summary>
public class DemoHistoryTests
{
    private static readonly DateOnly Today = new(2026, 12, 1);

    // A Tuesday, a Monday, a Sunday, a leap day, the turn of a year, and days in the storm season.
    public static TheoryData<DateOnly> Days => new(
        Today, new DateOnly(2026, 11, 30), new DateOnly(2026, 11, 29), new DateOnly(2028, 2, 29), new DateOnly(2027, 1, 1),
        new DateOnly(2027, 4, 28), new DateOnly(2030, 7, 6));

    [Theory, MemberData(nameof(Days))]
    public void All_weeks_are_valid_and_end_on_the_26_sundays_before_the_day(DateOnly today)
    {
        var weeks = DemoHistory.Weeks(today);
        Assert.Equal(Enumerable.Range(1, 26), weeks.Select(week => week.Number));
        Assert.InRange(today.DayNumber - weeks[^1].AsOf.DayNumber, 1, 7);
        for (var week = 0; week < weeks.Count; week++)
        {
            Assert.Equal(weeks[^1].AsOf.AddDays(-7 * (25 - week)), weeks[week].AsOf);
            Assert.Equal(DayOfWeek.Sunday, weeks[week].AsOf.DayOfWeek);
            var model = DemoWeeks.Model(weeks[week]);
            var valid = ValidPortfolio.Check(model, out var faults);
            Assert.True(valid is not null, $"Week {week + 1}: {string.Join("; ", faults)}");
            Assert.InRange(model.Projects.Sum(project => project.Activities.Count), 450, 560);
            Assert.All(model.Projects, project => Assert.True(project.StatusDate <= weeks[week].AsOf, project.Id));
        }
        // Compiling refuses correlations and stated percentiles that cannot be.
        Assert.NotNull(Plan.Compile(ValidPortfolio.Check(DemoWeeks.Model(weeks[0]), out _)!));
        Assert.NotNull(Plan.Compile(ValidPortfolio.Check(DemoWeeks.Model(weeks[^1]), out _)!));
    }

    [Fact]
    public void The_same_day_gives_the_same_bytes() =>
        Assert.Equal(DemoHistory.Weeks(Today).Select(DemoWeeks.Parts), DemoHistory.Weeks(Today).Select(DemoWeeks.Parts));

    [Fact]
    public void Days_of_one_week_give_the_same_history() =>
        Assert.Equal(DemoHistory.Weeks(Today).Select(DemoWeeks.Parts), DemoHistory.Weeks(Today.AddDays(4)).Select(DemoWeeks.Parts));

    [Fact]
    public void A_week_changes_most_reports_but_leaves_other_parts_alone()
    {
        var weeks = DemoHistory.Weeks(Today).Select(DemoWeeks.Parts).ToList();
        var changed = weeks.Zip(weeks.Skip(1), (before, after) => after.Keys.Count(part => before[part] != after[part])).ToList();
        Assert.All(changed, count => Assert.InRange(count, 6, 13));
        Assert.True(changed.Count(count => count <= 11) >= 12, string.Join(" ", changed));
        Assert.True(weeks.Select(parts => parts[""]).Distinct().Count() is > 4 and < 14);
    }

    [Fact]
    public void Every_week_says_what_happened() =>
        Assert.All(DemoHistory.Weeks(Today), week => Assert.InRange(week.Note.Length, 20, 500));

    [Fact]
    public void Risks_come_true_scope_is_added_and_capacity_is_lost_and_regained()
    {
        var weeks = DemoHistory.Weeks(Today).Select(DemoWeeks.Model).ToList();
        var risks = weeks.Select(week => week.Projects.Single(project => project.Id == "quay-wall-north").RiskEvents).ToList();
        Assert.Contains(risks[0], risk => risk.Id == "boulders");
        Assert.DoesNotContain(risks[^1], risk => risk.Id == "boulders");
        Assert.DoesNotContain(weeks[0].Projects.SelectMany(project => project.Activities), activity => activity.Id.StartsWith('G'));
        Assert.Contains(weeks[^1].Projects.SelectMany(project => project.Activities), activity => activity.Id.StartsWith('G'));
        var divers = weeks.Select(week => week.Settings.Pools.Single(pool => pool.Id == "dive-teams").CapacityChanges).ToList();
        Assert.Empty(divers[0]);
        Assert.Equal([1.0, 2.0], divers[^1].Select(change => change.Capacity));
        Assert.True(divers[^1][1].From < divers[5][1].From, "The team comes back earlier than announced.");
    }

    [Fact]
    public void Dates_move_in_both_directions_and_the_portfolio_ends_later()
    {
        var weeks = DemoHistory.Weeks(Today);
        var (first, last) = (Level80(weeks[0]), Level80(weeks[^1]));
        var days = first.Zip(last, (then, now) => (now - then) / 1440).ToList();
        Assert.True(last.Max() > first.Max(), "The latest project drifts later.");
        Assert.True(days.Count(moved => moved > 14) >= 3, string.Join(" ", days));
        Assert.Contains(days, moved => moved < -14);
    }

    /// <summary>P80 of every project's finish in minutes, 1,024 iterations with the portfolio's seed.</summary>
    private static List<int> Level80(DemoWeek week)
    {
        const int iterations = 1024;
        var model = DemoWeeks.Model(week);
        var plan = Plan.Compile(ValidPortfolio.Check(model, out _)!);
        var finishes = new List<int[]>();
        plan.Run(
            model.Settings.Seed, 0, iterations, new RunOptions(2), block => finishes.AddRange(block.Finish),
            TestContext.Current.CancellationToken);
        return [.. finishes.Select(finish => finish.Take(iterations).Order().ElementAt((iterations * 8 / 10) - 1))];
    }
}
