using Portfolio.Model.Distributions;
using Portfolio.Model.Documents;

namespace Portfolio.Server.Documents;

/// <summary>A distribution of the document with what its place asks of it. Its pointer is built only when it is asked for.</summary>
internal readonly struct StatedDistribution(Distribution distribution, bool mayBeNegative, string subject, string owner, string member)
{
    public Distribution Distribution { get; } = distribution;

    public bool MayBeNegative { get; } = mayBeNegative;

    public string Subject { get; } = subject;

    public string Path => $"{owner}/{member}";
}

/// <summary>Goes through every distribution of a document.</summary>
internal static class StatedDistributions
{
    public static void Visit(PortfolioDocument document, Action<StatedDistribution> visit)
    {
        var settings = document.Settings;
        for (var i = 0; i < settings.Drivers.Count; i++)
        {
            var (driver, path) = (settings.Drivers[i], $"/settings/drivers/{i}");
            One(driver.DurationFactor, false, $"driver/{driver.Id}", path, "durationFactor", visit);
            One(driver.CostFactor, false, $"driver/{driver.Id}", path, "costFactor", visit);
        }
        Events(settings.RiskEvents, "", "/settings/riskEvents", visit);
        for (var i = 0; i < document.Projects.Count; i++)
        {
            var (project, path) = (document.Projects[i], $"/projects/{i}");
            Activities(project, path, visit);
            Events(project.RiskEvents, $"{project.Id}/", $"{path}/riskEvents", visit);
        }
    }

    private static void Activities(Project project, string path, Action<StatedDistribution> visit)
    {
        for (var i = 0; i < project.Activities.Count; i++)
        {
            var activity = project.Activities[i];
            var (subject, at) = ($"{project.Id}/{activity.Id}", $"{path}/activities/{i}");
            One(activity.Duration, false, subject, at, "duration", visit);
            One(activity.Remaining, false, subject, at, "remaining", visit);
            One(activity.Cost?.Fixed, false, subject, at, "cost/fixed", visit);
            One(activity.Cost?.PerDay, false, subject, at, "cost/perDay", visit);
        }
    }

    private static void Events(IReadOnlyList<RiskEvent> events, string owner, string path, Action<StatedDistribution> visit)
    {
        for (var i = 0; i < events.Count; i++)
        {
            var (risk, subject) = (events[i], $"{owner}event/{events[i].Id}");
            Impacts(risk.Impacts, subject, $"{path}/{i}", visit);
            for (var k = 0; k < risk.Responses.Count; k++)
                Impacts(risk.Responses[k].Impacts, subject, $"{path}/{i}/responses/{k}", visit);
        }
    }

    private static void Impacts(IReadOnlyList<Impact> impacts, string subject, string path, Action<StatedDistribution> visit)
    {
        for (var i = 0; i < impacts.Count; i++)
        {
            One(impacts[i].Delay, false, subject, $"{path}/impacts/{i}", "delay", visit);
            One(impacts[i].Cost, true, subject, $"{path}/impacts/{i}", "cost", visit);
        }
    }

    private static void One(
        Distribution? stated, bool mayBeNegative, string subject, string owner, string member, Action<StatedDistribution> visit)
    {
        if (stated is not null)
            visit(new StatedDistribution(stated, mayBeNegative, subject, owner, member));
    }
}
