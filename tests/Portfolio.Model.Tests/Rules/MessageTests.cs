using Portfolio.Model.Distributions;
using Portfolio.Model.Documents;

namespace Portfolio.Model.Tests.Rules;

/// <summary>What a planner reads: the offending values and what would be right.</summary>
public sealed class MessageTests
{
    [Fact]
    public void Ranges_out_of_order() => Reads(
        "The values must rise: low 9, most likely 5, high 20 do not.", Sound.WithDuration(new Pert(9, 5, 20)));

    [Fact]
    public void Demands_that_never_fit() => Reads(
        "A20 needs 3 of the pool rig, which in the end has 2: it could never start.",
        Sound.WithActivity(1, a => a with { Demands = [new("rig", 3)] }));

    [Fact]
    public void Dates_of_progress() => Reads(
        "2026-12-03 is not before the status date 2026-12-01; progress is reported up to the beginning of that day.",
        Sound.WithActivity(1, a => a with { ActualStart = Sound.Day(3), Remaining = new Constant(1) }));

    [Fact]
    public void Probabilities() => Reads(
        "The probabilities of the outcomes add up to 0.75; they must add up to 1.",
        Sound.WithDuration(new Discrete([new(3, 0.5), new(4, 0.25)])));

    [Fact]
    public void Money() => Reads(
        "10.505 has more decimals than the currency; it has 2.", Sound.WithActivity(1, a => a with { Cost = new(null, null, 10.505m) }));

    [Fact]
    public void An_activity_without_an_id_is_called_by_its_place()
    {
        var document = Sound.WithProject(p => p with { Activities = [.. p.Activities, new Activity { Id = "" }] });
        Reads("Activity 5 has no duration; only milestones and finished work can do without.", document);
        Assert.Equal("weir-lock/4", Sound.FaultsOf(document)[0].Subject);
    }

    [Fact]
    public void Control_characters_are_not_repeated() => Reads(
        "The name \"two\ufffdlines\" holds a control character, such as a line break or a tab.", Sound.With(s => s with { Name = "two\nlines" }));

    private static void Reads(string expected, PortfolioDocument document) => Assert.Equal(expected, Assert.Single(Sound.FaultsOf(document)).Message);
}
