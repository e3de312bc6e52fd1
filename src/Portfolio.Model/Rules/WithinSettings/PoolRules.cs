using Portfolio.Model.Documents;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules.WithinSettings;

/// <summary>Shared pools and how their capacity changes.</summary>
internal static class PoolRules
{
    public static IEnumerable<Fault> Check(Settings settings, Place at, ModelLimits limits)
    {
        var pools = settings.Pools;
        Place Of(int i) => at.Under("pools", i).About("pool/", pools[i].Id, i);

        foreach (var fault in Ids.Check(pools, p => p.Id, "pool", Of)) yield return fault;
        for (var i = 0; i < pools.Count; i++)
        {
            if (TextRule.Name(pools[i].Name, "name", () => Of(i).Under("name")) is { } name) yield return name;
            if (Capacity(pools[i].Capacity, () => Of(i).Under("capacity")) is { } capacity) yield return capacity;
            foreach (var fault in Changes(pools[i], Of(i), limits)) yield return fault;
        }
    }

    private static IEnumerable<Fault> Changes(Pool pool, Place at, ModelLimits limits)
    {
        var changes = pool.CapacityChanges;
        if (changes.Count > limits.CapacityChanges)
            yield return at.Under("capacityChanges").Fault(
                RuleCodes.LimitExceeded, $"There are {changes.Count} capacity changes; at most {limits.CapacityChanges} are allowed.");
        for (var i = 0; i < changes.Count; i++)
        {
            var place = at.Under("capacityChanges", i);
            if (ValueRule.Date(changes[i].From, () => place.Under("from")) is { } date) yield return date;
            else if (i > 0 && changes[i].From != DateOnly.MinValue && changes[i].From <= changes[i - 1].From)
                yield return place.Under("from").Fault(
                    RuleCodes.CapacityOrder, "Capacity changes must be listed by date, one a day; "
                    + $"{changes[i].From:yyyy-MM-dd} follows {changes[i - 1].From:yyyy-MM-dd}.");
            if (Capacity(changes[i].Capacity, () => place.Under("capacity")) is { } capacity) yield return capacity;
        }
    }

    private static Fault? Capacity(double capacity, Func<Place> at) =>
        ValueRule.Within(capacity, 0, Bounds.Units, "capacity", RuleCodes.CapacityRange, at);
}
