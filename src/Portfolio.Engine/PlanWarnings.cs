using System.Globalization;
using Portfolio.Engine.Networks;
using Portfolio.Engine.Pools;
using Portfolio.Engine.Results;
using Portfolio.Model.Distributions;
using Portfolio.Model.Documents;

namespace Portfolio.Engine;

/// <summary>Cautions that follow from the model itself, whatever is drawn.</summary>
internal static class PlanWarnings
{
    public static IReadOnlyList<Warning> Of(Plan plan) => [.. Dependence(plan), .. ReverseActivities(plan.Network)];

    private static IEnumerable<Warning> Dependence(Plan plan)
    {
        if (!plan.Document.Settings.Dependence.Stated && plan.Document.Projects.Count > 1)
        {
            yield return new Warning(
                CautionCodes.NotStated,
                "Nothing was stated about how projects move together: apart from shared drivers, pools and links they are "
                + "taken as independent (rank correlation 0), which makes the spread of the portfolio too narrow if they are not.",
                []);
        }
        if (plan.Dependence.WithoutEffect.Count > 0)
        {
            yield return new Warning(
                CautionCodes.NoEffect,
                "The stated dependence cannot reach the estimates of these projects, because their own correlation is 0.",
                [.. plan.Dependence.WithoutEffect.Select(id => $"project/{id}")]);
        }
        if (plan.Dependence.Repaired.Count > 0)
        {
            yield return new Warning(
                CautionCodes.Repaired,
                "The stated ranks contradict each other and were replaced by the nearest that can exist together (from stated to used).",
                [.. plan.Dependence.Repaired.Select(c => string.Create(
                    CultureInfo.InvariantCulture, $"{c.First} with {c.Second}: {c.Stated:0.####} to {c.Used:0.####}"))]);
        }
    }

    // With an FF or SF predecessor a shorter activity starts later (Wiest 1981); what its start or its place at a pool drives may follow.
    private static IEnumerable<Warning> ReverseActivities(Network network)
    {
        var named = Enumerable.Range(0, network.Count)
            .Where(a => !network.Finished(a) && Uncertain(network.Activities[a]) && FinishBound(network, a) && StartDrives(network, a))
            .Select(a => Line.IdOf(network, a))
            .Select(id => $"{id.Project}/{id.Activity}").ToArray();
        if (named.Length > 0)
        {
            yield return new Warning(
                CautionCodes.Reverse,
                "These activities have a finish-to-finish or start-to-finish predecessor and something that follows their start or "
                + "their place at a pool: when they get shorter they start later, and dates behind them may become later too.",
                named);
        }
    }

    private static bool Uncertain(Activity activity) =>
        !activity.Milestone && (activity.UnderWay ? activity.Remaining : activity.Duration) is not Constant { Value: 0 };

    private static bool FinishBound(Network network, int activity)
    {
        foreach (ref readonly var link in network.LinksOf(activity))
        {
            if (!link.ToStart)
                return true;
        }
        return false;
    }

    private static bool StartDrives(Network network, int activity)
    {
        if (network.Activities[activity].Demands.Count > 0)
            return true;
        foreach (var successor in network.SuccessorsOf(activity))
        {
            foreach (ref readonly var link in network.LinksOf(successor))
            {
                if (link.Predecessor == activity && !link.FromFinish)
                    return true;
            }
        }
        return false;
    }
}
