using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules.WithinProject;

/// <summary>Calendars and drivers that the project and its activities name.</summary>
internal static class ReferenceRule
{
    public static IEnumerable<Fault> Check(PlacedProject placed)
    {
        var project = placed.Project;
        if (Calendar(project.Calendar, placed, () => placed.Here) is { } own) yield return own;
        var seen = new HashSet<string>(StringComparer.Ordinal);
        foreach (var fault in Drivers(project.Drivers, seen, placed, () => placed.Here)) yield return fault;
        for (var i = 0; i < project.Activities.Count; i++)
        {
            var (activity, index) = (project.Activities[i], i);
            if (activity.Calendar is not null && Calendar(activity.Calendar, placed, () => placed.Activity(index)) is { } calendar)
                yield return calendar;
            if (activity.Drivers.Count == 0) continue;
            foreach (var fault in Drivers(activity.Drivers, seen, placed, () => placed.Activity(index))) yield return fault;
        }
    }

    private static Fault? Calendar(string? id, PlacedProject placed, Func<Place> at) =>
        id is null || placed.Context.HasCalendar(id)
            ? null
            : at().Under("calendar").Fault(RuleCodes.CalendarUnknown, $"There is no calendar {TextRule.Shown(id)}.");

    private static IEnumerable<Fault> Drivers(IReadOnlyList<string> drivers, HashSet<string> seen, PlacedProject placed, Func<Place> at)
    {
        seen.Clear();
        for (var k = 0; k < drivers.Count; k++)
        {
            if (drivers[k] is not { } id) continue;
            if (!placed.Context.HasDriver(id))
                yield return at().Under("drivers", k).Fault(RuleCodes.DriverUnknown, $"There is no driver {TextRule.Shown(id)}.");
            else if (!seen.Add(id))
                yield return at().Under("drivers", k).Fault(RuleCodes.DriverRepeated,
                    $"The driver {id} is listed twice; a driver acts once.");
        }
    }
}
