using Portfolio.Model.Documents;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Tests.Rules.Tables;

internal static class ProjectTable
{
    public static IEnumerable<RuleCase> Cases =>
    [
        Case(RuleCodes.TextLength, "name", p => p with { Name = new('n', 201) }, p => p with { Name = null }),
        new(RuleCodes.IdFormat, "/projects/1/id", "qu ay", Second(p => p with { Id = "qu ay" })),
        Case(RuleCodes.IdFormat, "programme", p => p with { Programme = "lo/cks" }),
        Case(RuleCodes.TextControl, "tags/area", p => p with { Tags = Tag("area", "a\tb") }, p => p with { Tags = Tag("area", "a b") }),
        Case(RuleCodes.TextLength, "tags/" + new string('k', 201), p => p with { Tags = Tag(new('k', 201), "a") }, p => p with { Tags = Tag(new('k', 200), "a") }),
        Case(RuleCodes.PriorityRange, "priority", p => p with { Priority = 0 }, p => p with { Priority = 1 }),
        Case(RuleCodes.DateRange, "statusDate", p => p with { StatusDate = new(2200, 1, 1) }, p => p with { StatusDate = DateOnly.MinValue }),
        Case(RuleCodes.CalendarUnknown, "calendar", p => p with { Calendar = "six-day" }, p => p with { Calendar = "every-day" }),
        Case(RuleCodes.MoneyNegative, "commitments/budget", p => p with { Commitments = new(null, -1) }, p => p with { Commitments = new(null, null) }),
        Case(RuleCodes.CorrelationRange, "correlation", p => p with { Correlation = 1 }, p => p with { Correlation = 0.99 }),
        Case(RuleCodes.CorrelationRange, "correlation", p => p with { Correlation = -0.1 }, p => p with { Correlation = 0 }),
        Case(RuleCodes.DriverUnknown, "drivers/1", p => p with { Drivers = ["prices", "sky"] }),
        Case(RuleCodes.DriverRepeated, "drivers/1", p => p with { Drivers = ["prices", "prices"] }, p => p with { Drivers = ["prices", "ground"] }),
        Case(RuleCodes.MoneyNegative, "overhead/perDay", p => p with { Overhead = new(-1, 0) }, p => p with { Overhead = new(0, -20) }),
        Case(RuleCodes.MoneyRange, "overhead/perDay", p => p with { Overhead = new(2e13, 0) }, p => p with { Overhead = new(0.001, 0) }),
        Case(FaultCodes.MoneyDecimals, "overhead/actual", p => p with { Overhead = new(1, 0.001m) }, p => p with { Overhead = new(1, 0.01m) }),
        Case(RuleCodes.LimitExceeded, "activities", p => Many(p, 5_001), p => Many(p, 5_000)),
        new(RuleCodes.IdDuplicate,
            "/projects/0/activities/4/id", "weir-lock/A10", Sound.WithProject(p => p with { Activities = [.. p.Activities, Sound.Work("A10")] }),
            Sound.WithProject(p => p with { Activities = [.. p.Activities, Sound.Work("a10")] })),
        new(RuleCodes.IdFormat,
            "/projects/0/activities/4/id", "weir-lock/a/b", Sound.WithProject(p => p with { Activities = [.. p.Activities, Sound.Work("a/b")] }),
            Sound.WithProject(p => p with { Activities = [.. p.Activities, Sound.Work(""), Sound.Work("")] })),
        new(RuleCodes.TextControl,
            "/projects/0/activities/1/name", "weir-lock/A20", Sound.WithActivity(1, a => a with { Name = "\u001b" })),
        new(RuleCodes.TextLength,
            "/projects/0/activities/1/tags/k", "weir-lock/A20", Sound.WithActivity(1, a => a with { Tags = Tag("k", new('v', 201)) })),
        new(RuleCodes.CalendarUnknown,
            "/projects/0/activities/1/calendar", "weir-lock/A20", Sound.WithActivity(1, a => a with { Calendar = "night" })),
        new(RuleCodes.DriverUnknown,
            "/projects/0/activities/1/drivers/0", "weir-lock/A20", Sound.WithActivity(1, a => a with { Drivers = ["Ground"] })),
        new(RuleCodes.DriverRepeated,
            "/projects/0/activities/1/drivers/1", "weir-lock/A20", Sound.WithActivity(1, a => a with { Drivers = ["ground", "ground"] }),
            Sound.WithActivity(1, a => a with { Drivers = ["ground", "prices"] })),
    ];

    private static Dictionary<string, string> Tag(string key, string value) => new() { [key] = value };

    private static Project Many(Project project, int count) => project with
    {
        Activities = [.. project.Activities, .. Enumerable.Range(0, count - project.Activities.Count).Select(i => Sound.Work("W" + i))],
    };

    private static PortfolioDocument Second(Func<Project, Project> change) =>
        new(Sound.Settings with { Dependence = new(), RiskEvents = [] }, [Sound.WeirLock, change(Sound.Quay)]);

    private static RuleCase Case(string code, string member, Func<Project, Project> broken, Func<Project, Project>? sound = null) =>
        new(code, "/projects/0/" + member, "weir-lock", WithoutLocks(broken), WithoutLocks(sound ?? (p => p)));

    // Nothing is promised for a programme, so that a changed one is the only mistake.
    private static PortfolioDocument WithoutLocks(Func<Project, Project> change) => Sound.WithProject(change) with
    {
        Settings = Sound.Settings with { ProgrammeCommitments = new Dictionary<string, Commitments>() },
    };
}
