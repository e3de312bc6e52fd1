using Portfolio.Model.Distributions;
using Portfolio.Model.Documents;

namespace Portfolio.Server.Documents;

/// <summary>
/// One of a list that states distributions, and what it is called in faults. Texts are put together only when they are asked for.
/// </summary>
/// <param name="Owner">Pointer of the list's owner.</param>
/// <param name="Family">What stands before the id in its name: <c>weir-lock/</c>.</param>
internal readonly record struct StatedPlace(string Owner, string List, int Index, string Family, string Id)
{
    public string Subject => Family + Id;

    public string Path => $"{Owner}/{List}/{Index}";
}

/// <summary>A distribution of the document with what its place asks of it.</summary>
internal readonly record struct StatedDistribution(Distribution Distribution, bool MayBeNegative, StatedPlace Place, string Member)
{
    public string Path => $"{Place.Path}/{Member}";
}

/// <summary>Goes through every distribution of settings or of a project.</summary>
internal static class StatedDistributions
{
    public static void InSettings(Settings settings, Action<StatedDistribution> visit)
    {
        for (var i = 0; i < settings.Drivers.Count; i++)
        {
            var driver = settings.Drivers[i];
            var place = new StatedPlace("/settings", "drivers", i, "driver/", driver.Id);
            One(driver.DurationFactor, false, place, "durationFactor", visit);
            One(driver.CostFactor, false, place, "costFactor", visit);
        }
        Events(settings.RiskEvents, "event/", "/settings/riskEvents", visit);
    }

    public static void InProject(Project project, string path, Action<StatedDistribution> visit)
    {
        var family = $"{project.Id}/";
        for (var i = 0; i < project.Activities.Count; i++)
        {
            var activity = project.Activities[i];
            var place = new StatedPlace(path, "activities", i, family, activity.Id);
            One(activity.Duration, false, place, "duration", visit);
            One(activity.Remaining, false, place, "remaining", visit);
            One(activity.Cost?.Fixed, false, place, "cost/fixed", visit);
            One(activity.Cost?.PerDay, false, place, "cost/perDay", visit);
        }
        Events(project.RiskEvents, $"{family}event/", $"{path}/riskEvents", visit);
    }

    private static void Events(IReadOnlyList<RiskEvent> events, string family, string path, Action<StatedDistribution> visit)
    {
        for (var i = 0; i < events.Count; i++)
        {
            var (risk, at) = (events[i], $"{path}/{i}");
            Impacts(risk.Impacts, family, risk.Id, at, visit);
            for (var k = 0; k < risk.Responses.Count; k++)
                Impacts(risk.Responses[k].Impacts, family, risk.Id, $"{at}/responses/{k}", visit);
        }
    }

    private static void Impacts(IReadOnlyList<Impact> impacts, string family, string id, string owner, Action<StatedDistribution> visit)
    {
        for (var i = 0; i < impacts.Count; i++)
        {
            var place = new StatedPlace(owner, "impacts", i, family, id);
            One(impacts[i].Delay, false, place, "delay", visit);
            One(impacts[i].Cost, true, place, "cost", visit);
        }
    }

    private static void One(Distribution? stated, bool mayBeNegative, StatedPlace place, string member, Action<StatedDistribution> visit)
    {
        if (stated is not null)
            visit(new StatedDistribution(stated, mayBeNegative, place, member));
    }
}
