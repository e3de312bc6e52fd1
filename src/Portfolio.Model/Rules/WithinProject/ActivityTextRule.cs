using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules.WithinProject;

/// <summary>Names and tags of activities.</summary>
internal static class ActivityTextRule
{
    public static IEnumerable<Fault> Check(PlacedProject placed)
    {
        var activities = placed.Project.Activities;
        for (var i = 0; i < activities.Count; i++)
        {
            var index = i;
            if (activities[i].Name is { } text && TextRule.Name(text, "name", () => placed.Activity(index).Under("name")) is { } name)
                yield return name;
            if (activities[i].Tags.Count == 0) continue;
            foreach (var fault in TextRule.Tags(activities[i].Tags, () => placed.Activity(index))) yield return fault;
        }
    }
}
