using Portfolio.Model.Documents;

namespace Portfolio.Model.Rules;

/// <summary>
/// What a project asks of the settings: the calendars and drivers that it names and how much it draws on pools. Enough to tell whether new
/// settings could break it, so that sound projects are not read again. Each id once.
/// </summary>
/// <param name="Pools">Largest demand on each pool that must still fit; 0 when none must.</param>
public sealed record ProjectNeeds(
    IReadOnlyList<string> Calendars, IReadOnlyList<string> Drivers, IReadOnlyList<KeyValuePair<string, double>> Pools)
{
    public static ProjectNeeds Of(Project project)
    {
        var calendars = new HashSet<string>(StringComparer.Ordinal);
        var drivers = new HashSet<string>(project.Drivers.OfType<string>(), StringComparer.Ordinal);
        var pools = new Dictionary<string, double>(StringComparer.Ordinal);
        if (project.Calendar is not null) calendars.Add(project.Calendar);
        foreach (var activity in project.Activities)
        {
            if (activity.Calendar is not null) calendars.Add(activity.Calendar);
            drivers.UnionWith(activity.Drivers.OfType<string>());
            if (activity.Milestone) continue;
            foreach (var (pool, units) in activity.Demands)
                if (!string.IsNullOrEmpty(pool))
                    pools[pool] = Math.Max(pools.GetValueOrDefault(pool), activity.Finished ? 0 : units);
        }

        return new([.. calendars], [.. drivers], [.. pools]);
    }

    /// <summary>False when a rule of the project against these settings is broken; money aside, whose digits outlines do not know.</summary>
    public bool AreMetBy(PortfolioContext context) =>
        Calendars.All(context.HasCalendar) && Drivers.All(context.HasDriver)
        && Pools.All(need => context.LastCapacity(need.Key) is { } capacity && !(need.Value > capacity));
}
