using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules.AcrossParts;

/// <summary>How many projects there are, and that no id occurs twice.</summary>
internal static class ProjectListRule
{
    public static IEnumerable<Fault> Check(IReadOnlyList<PlacedOutline> projects, Place at, ModelLimits limits)
    {
        if (projects.Count > limits.Projects)
            yield return at.Fault(RuleCodes.LimitExceeded, $"There are {projects.Count} projects; at most {limits.Projects} are allowed.");
        var first = new Dictionary<string, int>(StringComparer.Ordinal);
        for (var i = 0; i < projects.Count; i++)
        {
            if (projects[i].Outline.Id is not { Length: > 0 } id || first.TryAdd(id, i)) continue;
            yield return new Place(projects[i].Path, id).Under("id").Fault(
                RuleCodes.IdDuplicate, $"The id {id} is used twice: project {first[id] + 1} in the list has it already.");
        }
    }
}
