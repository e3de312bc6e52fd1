using System.Text.Json.Nodes;

namespace Portfolio.Server.Tests.Outside;

/// <summary>
/// Risk events of random documents: delays and costs, opportunities, responses taken and not, also on work that is finished or may not
/// happen.
/// </summary>
internal static class RandomRisks
{
    public static JsonArray OfProject(Dice dice, RandomProject project) =>
        Dice.List(Enumerable.Range(0, dice.Whole(1, 3)).Select(e => Event(dice, e, project.Digits, () => Target(dice, project), payer: null)));

    public static JsonArray OfPortfolio(Dice dice, IReadOnlyList<RandomProject> projects) =>
        Dice.List(Enumerable.Range(0, 2).Select(e => Event(
            dice, e, projects[0].Digits, () => Target(dice, dice.Pick(projects), named: true), () => dice.Pick(projects).Id)));

    // An impact on an activity, or on the project's cost.
    private static JsonObject Target(Dice dice, RandomProject project, bool named = false)
    {
        if (project.Activities.Count > 0 && dice.Chance(0.75))
            return new JsonObject { ["activity"] = (named ? project.Id + "/" : "") + dice.Pick(project.Activities).Id };
        return named ? new JsonObject { ["project"] = project.Id } : [];
    }

    private static JsonObject Event(Dice dice, int number, int digits, Func<JsonObject> target, Func<string>? payer) => new()
    {
        ["id"] = $"event-{number}",
        ["probability"] = dice.Pick(0, 0.2, 0.5, 1),
        ["impacts"] = Impacts(dice, digits, target),
        ["responses"] = Responses(dice, digits, target, payer),
    };

    private static JsonArray Impacts(Dice dice, int digits, Func<JsonObject> target) =>
        Dice.List(Enumerable.Range(0, dice.Whole(1, 2)).Select(_ => Impact(dice, digits, target())));

    private static JsonObject Impact(Dice dice, int digits, JsonObject impact)
    {
        if (impact.ContainsKey("activity"))
            impact["delay"] = RandomDistribution.Days(dice, dice.Days(1, 12));
        if (!impact.ContainsKey("activity") || dice.Chance(0.5))
            impact["cost"] = dice.Chance(0.25) ? dice.Money(-9000, -100, digits) : RandomDistribution.Money(dice, 8000, digits);
        return impact;
    }

    private static JsonArray Responses(Dice dice, int digits, Func<JsonObject> target, Func<string>? payer)
    {
        var taken = dice.Whole(-1, 1); // none, the first, or the second if there is one
        return Dice.List(Enumerable.Range(0, dice.Whole(0, 2)).Select(r => Response(dice, r, r == taken, digits, target, payer)));
    }

    private static JsonObject Response(Dice dice, int number, bool taken, int digits, Func<JsonObject> target, Func<string>? payer)
    {
        var response = new JsonObject { ["id"] = $"response-{number}", ["cost"] = dice.Money(100, 5000, digits) };
        if (dice.Chance(0.6))
            (response["probability"], response["impacts"]) = (dice.Pick(0.1, 0.4), Impacts(dice, digits, target));
        if (taken)
            response["taken"] = true;
        if (payer is not null)
            response["project"] = payer();
        return response;
    }
}
