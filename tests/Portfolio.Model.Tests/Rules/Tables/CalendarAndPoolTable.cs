using Portfolio.Model.Distributions;
using Portfolio.Model.Documents;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Tests.Rules.Tables;

internal static class CalendarAndPoolTable
{
    private static readonly WorkCalendar Week = Sound.Settings.Calendars[0];
    private static readonly Pool Rig = Sound.Settings.Pools[0];
    private static readonly Driver Ground = Sound.Settings.Drivers[0];

    public static IEnumerable<RuleCase> Cases => [.. Calendars, .. Pools, .. Drivers];

    private static IEnumerable<RuleCase> Calendars =>
    [
        new(RuleCodes.IdDuplicate, "/settings/calendars/1/id", "calendar/five-day", Sound.With(s => s with { Calendars = [Week, Week] }),
            Sound.With(s => s with { Calendars = [Week, Week with { Id = "Five-day" }] })),
        new(RuleCodes.IdReserved, "/settings/calendars/1/id", "calendar/every-day",
            Sound.With(s => s with { Calendars = [Week, Week with { Id = "every-day" }] })),
        Calendar(RuleCodes.CalendarNoWork, "", c => c with { WorkingWeekdays = [], ExtraWorkingDates = [] }, c => c with { WorkingWeekdays = [] }),
        Calendar(RuleCodes.DateRepeated, "/nonWorkingDates/1", c => c with { NonWorkingDates = [Sound.Day(25), Sound.Day(25)] },
            c => c with { NonWorkingDates = [Sound.Day(25), Sound.Day(26)], ExtraWorkingDates = [Sound.Day(25)] }),
        Calendar(RuleCodes.DateRange, "/extraWorkingDates/0", c => c with { ExtraWorkingDates = [new(2200, 1, 1)] },
            c => c with { ExtraWorkingDates = [DateOnly.MinValue, DateOnly.MinValue] }),
        Calendar(RuleCodes.LimitExceeded, "", c => c with { NonWorkingDates = Days(5_000) }, c => c with { NonWorkingDates = Days(4_999) }),
    ];

    private static IEnumerable<RuleCase> Pools =>
    [
        new(RuleCodes.IdDuplicate, "/settings/pools/1/id", "pool/rig", Sound.With(s => s with { Pools = [Rig, Rig] })),
        new(RuleCodes.IdFormat, "/settings/pools/1/id", "pool/-a", Sound.With(s => s with { Pools = [Rig, Rig with { Id = "-a" }] }),
            Sound.With(s => s with { Pools = [Rig, Rig with { Id = "a-._9" }] })),
        new(RuleCodes.IdFormat, "/settings/pools/1/id", "pool/" + new string('a', 65),
            Sound.With(s => s with { Pools = [Rig, Rig with { Id = new string('a', 65) }] }),
            Sound.With(s => s with { Pools = [Rig, Rig with { Id = new string('a', 64) }] })),
        Pool(RuleCodes.CapacityRange, "/capacity", p => p with { Capacity = -1 }, p => p with { Capacity = 0 }),
        Pool(FaultCodes.NumberNotFinite, "/capacity", p => p with { Capacity = double.PositiveInfinity }, p => p with { Capacity = double.NaN }),
        Pool(RuleCodes.CapacityRange, "/capacityChanges/0/capacity", Changes(-2, Date(2027, 1, 1)), Changes(2.5, Date(2027, 1, 1))),
        Pool(RuleCodes.DateRange, "/capacityChanges/0/from", Changes(2, Date(1969, 1, 1)), Changes(2, Date(1970, 1, 1))),
        Pool(RuleCodes.CapacityOrder, "/capacityChanges/1/from", Changes(2, Date(2027, 1, 1), Date(2027, 1, 1)), Changes(2, Date(2027, 1, 1), Date(2027, 1, 2))),
        Pool(RuleCodes.CapacityOrder, "/capacityChanges/1/from", Changes(2, Date(2027, 1, 2), Date(2027, 1, 1))),
        Pool(RuleCodes.LimitExceeded, "/capacityChanges", Changes(2, Days(1_001)), Changes(2, Days(1_000))),
        Pool(RuleCodes.TextLength, "/name", p => p with { Name = new('x', 201) }),
    ];

    private static IEnumerable<RuleCase> Drivers =>
    [
        new(RuleCodes.IdDuplicate, "/settings/drivers/2/id", "driver/ground", Sound.With(s => s with { Drivers = [.. s.Drivers, Ground] })),
        Driver(RuleCodes.ProbabilityRange, "/probability", d => d with { Probability = 1.01 }, d => d with { Probability = 1 }),
        Driver(RuleCodes.ProbabilityRange, "/probability", d => d with { Probability = -0.1 }, d => d with { Probability = 0 }),
        Driver(RuleCodes.DriverNoFactor, "", d => d with { DurationFactor = null }, d => d with { CostFactor = Unreadable.Instance }),
        Driver(RuleCodes.DistributionNegative, "/durationFactor", d => d with { DurationFactor = new Uniform(-0.1, 1) }, d => d with { DurationFactor = new Uniform(0, 1) }),
        Driver(RuleCodes.DistributionRange, "/costFactor", d => d with { CostFactor = new Constant(1_001) }, d => d with { CostFactor = new Constant(1_000) }),
    ];

    private static Func<Pool, Pool> Changes(double capacity, params DateOnly[] from) =>
        p => p with { CapacityChanges = [.. from.Select(d => new CapacityChange(d, capacity))] };

    private static DateOnly Date(int year, int month, int day) => new(year, month, day);

    private static DateOnly[] Days(int count) => [.. Enumerable.Range(0, count).Select(i => new DateOnly(2027, 1, 1).AddDays(i))];

    private static RuleCase Calendar(string code, string member, Func<WorkCalendar, WorkCalendar> broken, Func<WorkCalendar, WorkCalendar>? sound = null) =>
        new(code, "/settings/calendars/0" + member, "calendar/five-day", Sound.With(s => s with { Calendars = [broken(Week)] }),
            Sound.With(s => s with { Calendars = [(sound ?? (c => c))(Week)] }));

    private static RuleCase Pool(string code, string member, Func<Pool, Pool> broken, Func<Pool, Pool>? sound = null) =>
        new(code, "/settings/pools/0" + member, "pool/rig", Sound.With(s => s with { Pools = [broken(Rig)] }),
            Sound.With(s => s with { Pools = [(sound ?? (p => p))(Rig)] }));

    private static RuleCase Driver(string code, string member, Func<Driver, Driver> broken, Func<Driver, Driver>? sound = null) =>
        new(code, "/settings/drivers/0" + member, "driver/ground", Sound.With(s => s with { Drivers = [broken(Ground), s.Drivers[1]] }),
            Sound.With(s => s with { Drivers = [(sound ?? (d => d))(Ground), s.Drivers[1]] }));
}
