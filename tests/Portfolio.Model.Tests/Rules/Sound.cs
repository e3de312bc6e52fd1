using Portfolio.Model.Distributions;
using Portfolio.Model.Documents;
using Portfolio.Model.Faults;
using Portfolio.Model.Rules;

namespace Portfolio.Model.Tests.Rules;

/// <summary>A small portfolio that breaks no rule, and ways to change one thing in it.</summary>
internal static class Sound
{
    public static readonly DateOnly Status = new(2026, 12, 1);

    public static readonly Settings Settings = new()
    {
        Name = "Harbour and water authority",
        Currency = "EUR",
        TimeZone = "Europe/Lisbon",
        Commitments = new(new(2028, 3, 31), 50_000_000.50m),
        ProgrammeCommitments = new Dictionary<string, Commitments> { ["locks"] = new(new(2028, 1, 31), null) },
        Calendars =
        [
            new("five-day", [DayOfWeek.Monday, DayOfWeek.Tuesday, DayOfWeek.Wednesday, DayOfWeek.Thursday, DayOfWeek.Friday], [Day(25)], [Day(26)]),
        ],
        DefaultCalendar = "five-day",
        Pools = [new("rig", "Piling rig", 3, [new(new(2027, 1, 1), 0), new(new(2027, 3, 1), 2)])],
        Drivers = [new("ground", "Ground conditions", 0.6, new Uniform(1, 1.4), null), new("prices", null, 1, null, new Constant(1.1))],
        Dependence = new() { BetweenProjects = 0.1, WithinProgramme = 0.3, Pairs = [new("driver/ground", "project/quay", 0.4)], Stated = true },
        RiskEvents =
        [
            new()
            {
                Id = "storm",
                Probability = 0.2,
                Impacts = [new("weir-lock/A20", null, new Constant(5), null), new(null, "quay", null, new Constant(90_000))],
                Responses = [new() { Id = "shelter", Cost = 20_000, Probability = 0.05, Project = "quay" }],
            },
        ],
    };

    public static readonly Project WeirLock = new()
    {
        Id = "weir-lock",
        Name = "Weir lock",
        Programme = "locks",
        Tags = new Dictionary<string, string> { ["funding"] = "state" },
        StatusDate = Status,
        Commitments = new(new(2027, 12, 31), 20_000_000),
        Correlation = 0.3,
        Drivers = ["prices"],
        Overhead = new(1_500, 12_000),
        Activities =
        [
            Work("A10") with { ActualStart = Day(1, 11), Remaining = new Constant(4) },
            Work("A20", "A10") with { Drivers = ["ground"], Demands = [new("rig", 2)], Calendar = "every-day" },
            Work("A30", "A20"),
            new() { Id = "M1", Milestone = true, Commitment = new(2027, 11, 30), Predecessors = [new("A20"), new("A30", LinkType.FinishToFinish, 2)] },
        ],
        RiskEvents =
        [
            new()
            {
                Id = "flood",
                Probability = 0.1,
                Impacts = [new("A20", null, new Triangular(2, 5, 20), new Constant(-100)), new(null, null, null, new Constant(50_000))],
                Responses = [new() { Id = "dam", Cost = 15_000 }, new() { Id = "pumps", Cost = 9_000, Taken = true }],
            },
        ],
        ChanceBranches = [new("permit", null, [new("granted", 0.7, []), new("refused", 0.3, ["A30"])])],
    };

    public static readonly Project Quay = new()
    {
        Id = "quay",
        Programme = "harbour",
        StatusDate = Status,
        Activities = [Work("B10", "weir-lock/A10"), Work("B20", "B10")],
    };

    public static readonly PortfolioDocument Document = new(Settings, [WeirLock, Quay]);

    public static DateOnly Day(int day, int month = 12) => new(2026, month, day);

    public static Activity Work(string id, params string[] predecessors) => new()
    {
        Id = id,
        Duration = new Pert(8, 10, 20),
        Cost = new(new Constant(100_000), new Constant(2_000), 0),
        Predecessors = [.. predecessors.Select(p => new Link(p))],
    };

    public static PortfolioDocument With(Func<Settings, Settings> change) => Document with { Settings = change(Settings) };

    /// <summary>With another weir-lock, the first project.</summary>
    public static PortfolioDocument WithProject(Func<Project, Project> change) => Document with { Projects = [change(WeirLock), Quay] };

    /// <summary>With another activity of weir-lock: 0 is A10 (under way), 1 A20, 2 A30, 3 the milestone M1.</summary>
    public static PortfolioDocument WithActivity(int index, Func<Activity, Activity> change) => WithProject(project => project with
    {
        Activities = [.. project.Activities.Select((activity, i) => i == index ? change(activity) : activity)],
    });

    public static PortfolioDocument WithDuration(Distribution duration) => WithActivity(1, a => a with { Duration = duration });

    public static IReadOnlyList<Fault> FaultsOf(PortfolioDocument document)
    {
        var valid = ValidPortfolio.Check(document, out var faults);
        Assert.Equal(faults.Count == 0, valid is not null);
        return faults;
    }
}
