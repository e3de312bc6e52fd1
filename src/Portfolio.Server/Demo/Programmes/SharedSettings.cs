using System.Globalization;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Demo.Scope;

namespace Portfolio.Server.Demo.Programmes;

/// <summary>What the projects share: calendars, scarce crews and machines, common causes and how they hang together.</summary>
internal static class SharedSettings
{
    public const string FiveDay = "five-day";

    /// <param name="firstWeek">Sunday of the first week of the history.</param>
    public static SettingsJson From(DateOnly firstWeek) => new()
    {
        Name = "Brindlemouth Water and Harbour Authority",
        Currency = "EUR",
        WeekEnds = "sun",
        FiscalYearStart = "04-01",
        Seed = 2026,
        Iterations = 10_000,
        Calendars = Calendars(firstWeek.Year - 3, firstWeek.Year + 9),
        DefaultCalendar = FiveDay,
        Pools = Pools,
        Drivers = Drivers,
        Dependence = new DependenceJson
        {
            BetweenProjects = 0.1,
            WithinProgramme = 0.25,
            Pairs =
            [
                Pair("driver/ground", "driver/utilities", 0.3),
                Pair("driver/materials", "driver/market", 0.5),
                Pair("driver/labour", "driver/market", 0.4),
                Pair("driver/weather", "programme/harbour", 0.25),
                Pair("driver/market", "portfolio", 0.2),
                Pair("project/quay-wall-north", "project/ferry-terminal", 0.45),
                Pair("project/sewage-main", "project/treatment-works", 0.4),
            ],
        },
        RiskEvents = RiskRegister.OfPortfolio,
    };

    private static readonly IReadOnlyList<PoolJson> Pools =
    [
        new() { Id = "commissioning-engineers", Name = "Commissioning engineers", Capacity = 4 },
        new() { Id = "piling-rig", Name = "Marine piling rigs", Capacity = 2 },
        new() { Id = "dredging-plant", Name = "Cutter dredger", Capacity = 1 },
        new() { Id = "dive-teams", Name = "Dive teams", Capacity = 2 },
        new() { Id = "heavy-lift-crane", Name = "Floating heavy-lift crane", Capacity = 1 },
    ];

    private static readonly IReadOnlyList<DriverJson> Drivers =
    [
        Driver("ground", "Ground is worse than investigated", 0.5, "triangular 0.95 1.1 1.5", "triangular 0.98 1.08 1.35"),
        Driver("weather", "Wind, waves and wet ground", null, "pert 0.9 1 1.35", null),
        Driver("permitting", "Objections and slow authorities", 0.4, "lognormal 1.25 0.2", null),
        Driver("market", "Few bidders and long deliveries", 0.6, "1 1.2", "triangular 0.97 1.05 1.25"),
        Driver("materials", "Prices and deliveries of steel and cement", null, "pert 0.97 1 1.15", "normal 1.04 0.07"),
        Driver("labour", "Skilled labour is short", 0.5, "percentiles 0:1 50:1.06 90:1.18 100:1.3", "pert 1 1.05 1.15"),
        Driver("utilities", "Unrecorded cables and mains", 0.35, "triangular 1.05 1.2 1.6", "triangular 1.02 1.1 1.3"),
        Driver("design", "Designs mature late", 0.45, "pert 1 1.12 1.4", "1 1.12"),
    ];

    private static DriverJson Driver(string id, string name, double? probability, string durations, string? costs) => new()
    {
        Id = id,
        Name = name,
        Probability = probability,
        DurationFactor = Estimate.Read(durations),
        CostFactor = costs is null ? null : Estimate.Read(costs),
    };

    private static RankPairJson Pair(string first, string second, double rank) => new() { Between = [first, second], Rank = rank };

    private static IReadOnlyList<CalendarJson> Calendars(int first, int last)
    {
        string[] weekdays = ["mon", "tue", "wed", "thu", "fri"];
        var years = Enumerable.Range(first, last - first + 1).ToList();
        return
        [
            new() { Id = FiveDay, WorkingWeekdays = weekdays, NonWorkingDates = [.. years.SelectMany(Holidays).Select(Written)] },
            // Storm season: no piling, dredging or lifting at sea; in return Saturdays are worked.
            new() { Id = "marine", WorkingWeekdays = [.. weekdays, "sat"], NonWorkingDates = Closed(years, (12, 15), (2, 15)) },
            // Clay cannot be placed wet or frozen.
            new() { Id = "earthworks", WorkingWeekdays = [.. weekdays, "sat"], NonWorkingDates = Closed(years, (11, 15), (3, 1)) },
        ];
    }

    private static IEnumerable<DateOnly> Holidays(int year) =>
        [new(year, 1, 1), EasterMonday(year), new(year, 5, 1), new(year, 12, 25), new(year, 12, 26)];

    /// <summary>Holidays, and every day from a day of the year to one in the next.</summary>
    private static List<string> Closed(List<int> years, (int Month, int Day) from, (int Month, int Day) to)
    {
        var dates = new SortedSet<DateOnly>(years.SelectMany(Holidays));
        foreach (var year in years)
        {
            var end = new DateOnly(year + 1, to.Month, to.Day);
            for (var date = new DateOnly(year, from.Month, from.Day); date <= end; date = date.AddDays(1))
                dates.Add(date);
        }
        return [.. dates.Select(Written)];
    }

    /// <summary>The day after Easter Sunday by the anonymous Gregorian computus (Nature, 20 April 1876).</summary>
    private static DateOnly EasterMonday(int year)
    {
        var (golden, century, inCentury) = (year % 19, year / 100, year % 100);
        var epact = ((19 * golden) + century - (century / 4) - ((century - ((century + 8) / 25) + 1) / 3) + 15) % 30;
        var weekday = (32 + (2 * (century % 4)) + (2 * (inCentury / 4)) - epact - (inCentury % 4)) % 7;
        var correction = (golden + (11 * epact) + (22 * weekday)) / 451;
        var days = epact + weekday - (7 * correction) + 114;
        return new DateOnly(year, days / 31, (days % 31) + 1).AddDays(1);
    }

    public static string Written(DateOnly date) => date.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture);
}
