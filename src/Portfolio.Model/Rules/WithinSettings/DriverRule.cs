using Portfolio.Model.Documents;
using Portfolio.Model.Faults;
using Portfolio.Model.Rules.OfDistributions;

namespace Portfolio.Model.Rules.WithinSettings;

/// <summary>Risk drivers: common causes with their probability and factors.</summary>
internal static class DriverRule
{
    public static IEnumerable<Fault> Check(Settings settings, Place at, ModelLimits limits)
    {
        var drivers = settings.Drivers;
        Place Of(int i) => at.Under("drivers", i).About("driver/", drivers[i].Id, i);

        foreach (var fault in Ids.Check(drivers, d => d.Id, "driver", Of)) yield return fault;
        for (var i = 0; i < drivers.Count; i++)
        {
            var driver = drivers[i];
            if (TextRule.Name(driver.Name, "name", () => Of(i).Under("name")) is { } name) yield return name;
            if (ValueRule.Probability(driver.Probability, "the driver", () => Of(i).Under("probability")) is { } chance)
                yield return chance;
            if (driver.DurationFactor is null && driver.CostFactor is null)
                yield return Of(i).Fault(RuleCodes.DriverNoFactor,
                    "The driver has neither a duration factor nor a cost factor, so it would do nothing.");
            foreach (var flaw in DistributionRule.Flaws(driver.DurationFactor, Quantity.Factor, limits))
                yield return flaw.At(Of(i).Under("durationFactor"));
            foreach (var flaw in DistributionRule.Flaws(driver.CostFactor, Quantity.Factor, limits))
                yield return flaw.At(Of(i).Under("costFactor"));
        }
    }
}
