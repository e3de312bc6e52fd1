using Portfolio.Model.Documents;
using Portfolio.Model.Faults;
using Portfolio.Model.Rules.OfDistributions;

namespace Portfolio.Model.Rules.WithinProject;

/// <summary>Distributions of duration, remaining work and cost, and what has been spent. Those of a milestone are faults already.</summary>
internal static class EstimateRule
{
    public static IEnumerable<Fault> Check(PlacedProject placed)
    {
        var (activities, limits) = (placed.Project.Activities, placed.Context.Limits);
        for (var i = 0; i < activities.Count; i++)
        {
            var activity = activities[i];
            if (activity.Milestone) continue;
            foreach (var flaw in DistributionRule.Flaws(activity.Duration, Quantity.Duration, limits))
                yield return flaw.At(placed.Activity(i).Under("duration"));
            if (activity.Cost is not null)
                foreach (var fault in Costs(activity.Cost, placed, i))
                    yield return fault;
            foreach (var flaw in DistributionRule.Flaws(activity.Remaining, Quantity.Remaining, limits))
                yield return flaw.At(placed.Activity(i).Under("remaining"));
        }
    }

    private static IEnumerable<Fault> Costs(ActivityCost cost, PlacedProject placed, int i)
    {
        var limits = placed.Context.Limits;
        Place At(string member) => placed.Activity(i).Under("cost").Under(member);

        foreach (var flaw in DistributionRule.Flaws(cost.Fixed, Quantity.ActivityCost, limits)) yield return flaw.At(At("fixed"));
        foreach (var flaw in DistributionRule.Flaws(cost.PerDay, Quantity.ActivityCost, limits)) yield return flaw.At(At("perDay"));
        if (cost.Actual != 0 && ValueRule.Money(cost.Actual, placed.Context.MinorDigits, () => At("actual")) is { } actual)
            yield return actual;
    }
}
