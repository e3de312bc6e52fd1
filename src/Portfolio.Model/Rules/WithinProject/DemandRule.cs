using Portfolio.Model.Documents;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules.WithinProject;

/// <summary>Demands on shared pools. Those of finished work are kept and ignored, so they need not fit.</summary>
internal static class DemandRule
{
    public static IEnumerable<Fault> Check(PlacedProject placed)
    {
        var activities = placed.Project.Activities;
        var seen = new HashSet<string>(StringComparer.Ordinal);
        for (var i = 0; i < activities.Count; i++)
        {
            var activity = activities[i];
            if (activity.Milestone) continue;
            seen.Clear();
            for (var k = 0; k < activity.Demands.Count; k++)
                foreach (var fault in One(activity, k, seen, placed, i))
                    yield return fault;
        }
    }

    private static IEnumerable<Fault> One(Activity activity, int k, HashSet<string> seen, PlacedProject placed, int i)
    {
        var (pool, units) = activity.Demands[k];
        Place At(string member) => placed.Activity(i).Under("demands", k).Under(member);

        var sound = units is > 0 and <= Bounds.Units;
        if (!sound && !double.IsNaN(units))
            yield return ValueRule.Finite(units, () => At("units"))
                ?? At("units").Fault(RuleCodes.UnitsRange,
                    $"{placed.Name(i)} draws {units} units; it must be more than 0 and at most {Bounds.Units:0}.");
        if (string.IsNullOrEmpty(pool)) yield break;
        if (placed.Context.LastCapacity(pool) is not { } capacity)
            yield return At("pool").Fault(RuleCodes.PoolUnknown, $"There is no pool {TextRule.Shown(pool)}.");
        else if (!seen.Add(pool))
            yield return At("pool").Fault(RuleCodes.DemandRepeated, $"{placed.Name(i)} draws on the pool {pool} twice; add the units up.");
        else if (sound && units > capacity && !activity.Finished)
            yield return At("units").Fault(
                RuleCodes.DemandNeverFits, $"{placed.Name(i)} needs {units} of the pool {pool}, which in the end has {capacity}: "
                + "it could never start.");
    }
}
