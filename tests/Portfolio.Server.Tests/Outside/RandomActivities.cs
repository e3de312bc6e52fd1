using System.Text.Json.Nodes;

namespace Portfolio.Server.Tests.Outside;

/// <summary>Fills in the activities of a random document: estimates, progress, links, demands.</summary>
internal static class RandomActivities
{
    private static readonly double[] Units = [0.25, 0.5, 1, 1, 1.5, RandomSettings.LargestDemand];

    public static void Fill(Dice dice, IReadOnlyList<RandomProject> projects, IReadOnlyList<string> calendars, bool pools)
    {
        foreach (var project in projects)
        {
            foreach (var activity in project.Activities)
            {
                var json = activity.Json;
                json["id"] = activity.Id;
                State(dice, project, activity);
                if (activity.Milestone)
                    json["milestone"] = true;
                else
                    Work(dice, project, activity, pools);
                Links(dice, projects, project, activity);
                if (dice.Chance(0.25))
                    json["calendar"] = dice.Pick(calendars);
                if (dice.Chance(0.2))
                    json["earliestStart"] = Dice.Date(project.Status.AddDays(dice.Whole(-20, 50)));
            }
        }
    }

    private static void State(Dice dice, RandomProject project, RandomActivity activity)
    {
        if (!activity.Started)
            return;
        var first = activity.Place == 0;
        var start = first ? RandomDocument.FirstStatus.AddDays(-91) : project.Status.AddDays(-dice.Whole(1, 50));
        var days = project.Status.DayNumber - start.DayNumber - 1; // all actual dates lie before the status date
        if (!activity.Milestone)
            activity.Json["actualStart"] = Dice.Date(start);
        if (activity.Progress == Progress.Finished)
            activity.Json["actualFinish"] = Dice.Date(start.AddDays(dice.Whole(0, days)));
        else
            activity.Json["remaining"] = dice.Chance(0.1) ? 0 : RandomDistribution.Days(dice, dice.Days(0.5, 8));
    }

    private static void Work(Dice dice, RandomProject project, RandomActivity activity, bool pools)
    {
        var json = activity.Json;
        if (activity.Progress == Progress.Ahead || dice.Chance(0.5))
        {
            var some = activity.Progress == Progress.UnderWay || !dice.Chance(0.1);
            json["duration"] = some ? RandomDistribution.Days(dice, dice.Days(0.5, 15)) : 0;
        }
        if (!json.ContainsKey("duration") && activity.Progress == Progress.UnderWay)
            json["duration"] = dice.Days(1, 9);
        if (dice.Chance(0.7))
            json["cost"] = Cost(dice, project.Digits, activity.Started);
        if (dice.Chance(0.3))
            json["drivers"] = Dice.Texts(dice.Some(["driver-0", "driver-1", "driver-2"], dice.Whole(1, 2)));
        if (pools && dice.Chance(0.5))
        {
            json["demands"] = Dice.List(dice.Some([.. Enumerable.Range(0, RandomSettings.Pools)], dice.Pick(1, 1, 2))
                .Select(pool => new JsonObject { ["pool"] = $"pool-{pool}", ["units"] = dice.Pick(Units) }));
        }
    }

    private static JsonObject Cost(Dice dice, int digits, bool started)
    {
        var cost = new JsonObject();
        if (dice.Chance(0.7))
            cost["fixed"] = RandomDistribution.Money(dice, 20_000, digits);
        if (dice.Chance(0.6))
            cost["perDay"] = RandomDistribution.Money(dice, 700, digits);
        if (started || dice.Chance(0.2))
            cost["actual"] = dice.Money(0, 15_000, digits);
        return cost;
    }

    private static void Links(Dice dice, IReadOnlyList<RandomProject> projects, RandomProject project, RandomActivity activity)
    {
        var links = new List<JsonNode>();
        var before = project.Activities.Where(a => a.Place < activity.Place).OrderByDescending(a => a.Place).Take(6).ToList();
        foreach (var predecessor in dice.Some(before, Math.Min(before.Count, dice.Pick(0, 1, 1, 2, 2, 3))))
            Add(dice, links, predecessor.Id);
        var elsewhere = projects.Where(p => p != project)
            .SelectMany(p => p.Activities.Where(a => a.Place < activity.Place).Select(a => $"{p.Id}/{a.Id}")).ToList();
        if (elsewhere.Count > 0 && dice.Chance(0.2))
            Add(dice, links, dice.Pick(elsewhere));
        if (links.Count > 0)
            activity.Json["predecessors"] = Dice.List(links);
    }

    private static void Add(Dice dice, List<JsonNode> links, string predecessor)
    {
        if (dice.Chance(0.3))
        {
            links.Add(predecessor);
            return;
        }
        var types = dice.Some(["FS", "SS", "FF", "SF"], dice.Chance(0.2) ? 2 : 1);
        foreach (var type in types)
        {
            var link = new JsonObject { ["activity"] = predecessor, ["type"] = type };
            if (dice.Chance(0.6))
                link["lag"] = dice.Days(-4, 6);
            links.Add(link);
        }
    }
}
