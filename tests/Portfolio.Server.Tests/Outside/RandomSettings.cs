using System.Text.Json.Nodes;

namespace Portfolio.Server.Tests.Outside;

/// <summary>
/// Settings of a random document: calendars, pools whose capacity rises and falls, drivers, dependence and the portfolio's own events.
/// </summary>
internal static class RandomSettings
{
    public const int Pools = 3;
    public const int Drivers = 3;

    /// <summary>No demand is larger than this, and every pool has so much in the end.</summary>
    public const double LargestDemand = 2;

    private const int KnownCalendars = 10; // few in all documents, so that the other simulator builds each once

    private static readonly string[] Weekdays = ["mon", "tue", "wed", "thu", "fri", "sat", "sun"];

    public static JsonObject Of(Dice dice, string? poolRule, string currency, IReadOnlyList<RandomProject> projects)
    {
        var calendars = Calendars(dice);
        var settings = new JsonObject
        {
            ["name"] = "Random portfolio",
            ["currency"] = currency,
            ["calendars"] = Dice.List(calendars.Select(Calendar)),
            ["drivers"] = Dice.List(Enumerable.Range(0, Drivers).Select(d => Driver(dice, d))),
            ["dependence"] = Dependence(dice, projects),
            ["riskEvents"] = RandomRisks.OfPortfolio(dice, projects),
        };
        if (dice.Chance(0.5))
            settings["defaultCalendar"] = $"calendar-{calendars[0]}";
        if (poolRule is null)
            return settings;
        settings["pools"] = Dice.List(Enumerable.Range(0, Pools).Select(p => Pool(dice, p)));
        if (poolRule != "passing" || dice.Chance(0.5))
            settings["poolRule"] = poolRule;
        return settings;
    }

    /// <summary>Which of the known calendars a document has.</summary>
    private static IReadOnlyList<int> Calendars(Dice dice) => dice.Some([.. Enumerable.Range(0, KnownCalendars)], 3);

    private static JsonObject Calendar(int number)
    {
        var dice = new Dice(1000 + number);
        var first = RandomDocument.FirstStatus.AddDays(-60);
        return new JsonObject
        {
            ["id"] = $"calendar-{number}",
            ["workingWeekdays"] = Dice.Texts(number < 3 ? Weekdays[..5] : dice.Some(Weekdays, dice.Whole(2, 6))),
            ["nonWorkingDates"] = Dice.Texts(Dates(dice, first, 30)),
            ["extraWorkingDates"] = Dice.Texts(Dates(dice, first, 12)),
        };
    }

    private static IEnumerable<string> Dates(Dice dice, DateOnly first, int count) =>
        Enumerable.Range(0, count).Select(_ => dice.Whole(0, 400)).Distinct().Order().Select(day => Dice.Date(first.AddDays(day)));

    private static JsonObject Pool(Dice dice, int pool)
    {
        var last = dice.Pick(LargestDemand, 2.5, 3);
        var stated = new JsonObject { ["id"] = $"pool-{pool}", ["capacity"] = pool == 0 ? last : dice.Pick(0, 0.5, 1, 2, 3) };
        if (pool == 0)
            return stated;
        var day = RandomDocument.FirstStatus;
        var changes = Enumerable.Range(0, dice.Whole(0, 3)).Select(_ => Change(dice.Pick(0, 0.75, 1, 2.25, 4))).ToList();
        changes.Add(Change(last));
        stated["capacityChanges"] = Dice.List(changes);
        return stated;

        JsonObject Change(double capacity)
        {
            day = day.AddDays(dice.Whole(5, 25));
            return new JsonObject { ["from"] = Dice.Date(day), ["capacity"] = capacity };
        }
    }

    private static JsonObject Driver(Dice dice, int driver)
    {
        var stated = new JsonObject { ["id"] = $"driver-{driver}", ["durationFactor"] = RandomDistribution.Factor(dice) };
        if (driver > 0)
            stated["probability"] = driver == 1 ? 0.5 : 0.3;
        if (driver < 2)
            stated["costFactor"] = RandomDistribution.Factor(dice);
        return stated;
    }

    private static JsonObject Dependence(Dice dice, IReadOnlyList<RandomProject> projects)
    {
        var pairs = new List<JsonObject>
        {
            Pair("driver/driver-0", "driver/driver-1", 0.4),
            Pair($"project/{projects[1].Id}", "driver/driver-1", -0.3),
            Pair($"project/{projects[0].Id}", $"project/{projects[1].Id}", 0.35),
            Pair("driver/driver-2", "portfolio", 0.25),
        };
        if (projects[0].Programme is { } programme)
            pairs.Add(Pair($"programme/{programme}", "driver/driver-0", 0.3));
        var stated = new JsonObject { ["betweenProjects"] = dice.Pick(0, 0.1, 0.2), ["pairs"] = Dice.List(pairs) };
        if (dice.Chance(0.7))
            stated["withinProgramme"] = 0.3;
        return stated;
    }

    private static JsonObject Pair(string first, string second, double rank) =>
        new() { ["between"] = Dice.Texts([first, second]), ["rank"] = rank };
}
