using System.Text;
using System.Text.Json.Nodes;

namespace Portfolio.Server.Tests.Outside;

/// <summary>
/// Small random documents that use every rule of the model at once: links of all types with lags and leads, within and across projects,
/// double links, several calendars and status dates, progress out of sequence, capacity steps, branches, events, drivers, dependence.
/// </summary>
internal static class RandomDocument
{
    /// <summary>The earliest status date; the first actual start lies 91 days before it in every document.</summary>
    public static readonly DateOnly FirstStatus = new(2026, 11, 2);

    private static readonly (string Code, int Digits)[] Currencies = [("EUR", 2), ("EUR", 2), ("EUR", 2), ("JPY", 0), ("KWD", 3)];

    /// <summary>The document as text.</summary>
    /// <param name="seed">Equal seeds give equal documents.</param>
    /// <param name="poolRule">One of the two rules, or null for a document without pools.</param>
    public static byte[] Json(int seed, string? poolRule) => Encoding.UTF8.GetBytes(Of(seed, poolRule).ToJsonString());

    /// <inheritdoc cref="Json"/>
    public static JsonObject Of(int seed, string? poolRule)
    {
        var dice = new Dice(seed);
        var currency = dice.Pick(Currencies);
        var projects = Enumerable.Range(0, dice.Whole(3, 5)).Select(p => Outline(dice, p, currency.Digits)).ToList();
        if (dice.Chance(0.4))
            projects.Insert(dice.Whole(0, projects.Count), Empty(currency.Digits));
        var working = projects.Where(p => p.Activities.Count > 0).ToList();
        var settings = RandomSettings.Of(dice, poolRule, currency.Code, working);
        var calendars = settings["calendars"]!.AsArray().Select(c => (string)c!["id"]!).Append("every-day").ToList();
        var prioritised = dice.Chance(0.6); // where not, latest finishes decide at the pools
        var made = projects.Select(p => Project(dice, p, calendars, prioritised)).ToList();
        RandomActivities.Fill(dice, working, calendars, poolRule is not null);
        return new JsonObject { ["settings"] = settings, ["projects"] = Dice.List(made) };
    }

    private static RandomProject Outline(Dice dice, int number, int digits)
    {
        var progress = number == 0 || dice.Chance(0.7);
        var activities = Enumerable.Range(0, dice.Whole(6, 11)).Select(a => Outline(dice, $"A{a}", progress)).ToArray();
        dice.Shuffle(activities);
        return new RandomProject
        {
            Id = $"project-{number}",
            Programme = number == 3 ? null : dice.Pick("north", "south"),
            Status = FirstStatus.AddDays(dice.Pick(0, 0, 3, 11, 26)),
            Digits = digits,
            Activities = number == 0 ? [First(), .. activities] : activities,
        };
    }

    private static RandomProject Empty(int digits) =>
        new() { Id = "nothing-yet", Programme = "south", Status = FirstStatus, Digits = digits, Activities = [] };

    private static RandomActivity First() => new() { Id = "first", Place = 0, Milestone = false, Progress = Progress.Finished };

    // Work at low places has mostly been done, but not always in the sequence of the links.
    private static RandomActivity Outline(Dice dice, string id, bool progress)
    {
        var place = dice.Days(0.125, 100) + dice.Days(0, 0.5) / 1000;
        var milestone = dice.Chance(0.18);
        var (finished, underWay) = place switch { < 25 => (0.5, 0.25), < 45 => (0.15, 0.35), _ => (0, 0.05) };
        var state = !progress ? Progress.Ahead
            : dice.Chance(finished) ? Progress.Finished
            : !milestone && dice.Chance(underWay) ? Progress.UnderWay
            : Progress.Ahead;
        return new RandomActivity { Id = id, Place = place, Milestone = milestone, Progress = state };
    }

    private static JsonObject Project(Dice dice, RandomProject project, IReadOnlyList<string> calendars, bool prioritised)
    {
        var stated = new JsonObject { ["id"] = project.Id, ["statusDate"] = Dice.Date(project.Status) };
        stated["tags"] = new JsonObject { ["region"] = dice.Pick("a", "b") };
        if (project.Programme is { } programme)
            stated["programme"] = programme;
        if (prioritised && dice.Chance(0.8))
            stated["priority"] = dice.Whole(1, 3);
        if (dice.Chance(0.6))
            stated["calendar"] = dice.Pick(calendars);
        if (dice.Chance(0.7))
            stated["correlation"] = dice.Pick(0, 0.25, 0.5);
        if (dice.Chance(0.4))
            stated["drivers"] = Dice.Texts([$"driver-{dice.Whole(0, RandomSettings.Drivers - 1)}"]);
        if (dice.Chance(0.7))
        {
            var (perDay, actual) = (dice.Money(50, 900, project.Digits), dice.Money(0, 9000, project.Digits));
            stated["overhead"] = new JsonObject { ["perDay"] = perDay, ["actual"] = actual };
        }
        if (dice.Chance(0.5))
        {
            var finish = Dice.Date(project.Status.AddDays(dice.Whole(50, 300)));
            stated["commitments"] = new JsonObject { ["finish"] = finish, ["budget"] = dice.Money(1e4, 1e6, project.Digits) };
        }
        stated["activities"] = Dice.List(project.Activities.Select(a => a.Json));
        stated["riskEvents"] = RandomRisks.OfProject(dice, project);
        if (RandomBranches.Of(dice, project) is { Count: > 0 } branches)
            stated["chanceBranches"] = branches;
        return stated;
    }
}
