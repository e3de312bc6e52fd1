using System.Text.Json.Nodes;

namespace Portfolio.Server.Tests.Outside;

/// <summary>Chance branches of a random project: of two or three branches, some empty, some begun, some with milestones.</summary>
internal static class RandomBranches
{
    private static readonly double[][] Probabilities = [[0.5, 0.5], [0.25, 0.75], [0.25, 0.375, 0.375], [0.7, 0.2, 0.1], [0, 1]];

    public static JsonArray Of(Dice dice, RandomProject project)
    {
        // The first stays outside, so that something of the project always happens.
        var free = project.Activities.Skip(1).ToList();
        return Dice.List(Enumerable.Range(0, dice.Pick(0, 1, 1, 2)).Select(f => Fork(dice, f, free)));
    }

    private static JsonObject Fork(Dice dice, int number, List<RandomActivity> free)
    {
        var probabilities = dice.Pick(Probabilities);
        var begun = -1;
        var branches = new List<JsonObject>();
        for (var b = 0; b < probabilities.Length; b++)
        {
            // Work has started on one branch at most.
            var possible = free.Where(a => !a.Started || begun < 0).ToList();
            var chosen = dice.Some(possible, Math.Min(dice.Whole(0, 2), possible.Count));
            if (chosen.Any(a => a.Started))
                begun = b;
            free.RemoveAll(chosen.Contains);
            branches.Add(new JsonObject
            {
                ["id"] = $"branch-{b}", ["probability"] = probabilities[b], ["activities"] = Dice.Texts(chosen.Select(a => a.Id)),
            });
        }
        return new JsonObject { ["id"] = $"fork-{number}", ["branches"] = Dice.List(branches) };
    }
}
