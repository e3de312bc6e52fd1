namespace Portfolio.Model.Rules.AcrossParts;

/// <summary>All projects of a portfolio by id (the first of each), and their programmes.</summary>
internal sealed class OutlineIndex
{
    private readonly Dictionary<string, int> places = new(StringComparer.Ordinal);
    private readonly HashSet<string> programmes;

    public OutlineIndex(IReadOnlyList<PlacedOutline> projects)
    {
        Projects = projects;
        for (var i = 0; i < projects.Count; i++)
            if (projects[i].Outline.Id is { Length: > 0 } id)
                places.TryAdd(id, i);
        programmes = projects.Select(p => p.Outline.Programme).OfType<string>().ToHashSet(StringComparer.Ordinal);
    }

    public IReadOnlyList<PlacedOutline> Projects { get; }

    /// <summary>Place of the project, or −1.</summary>
    public int Find(string project) => places.GetValueOrDefault(project, -1);

    public bool HasProgramme(string programme) => programmes.Contains(programme);

    /// <summary>Why <paramref name="activity"/> of <paramref name="project"/> does not exist, as a code and the end of a sentence; null
    /// when it does.</summary>
    public (string Code, string Reason)? Missing(string project, string activity) =>
        Find(project) is not (>= 0 and var place) ? (Faults.RuleCodes.ProjectUnknown, $"there is no project {TextRule.Shown(project)}")
        : Projects[place].Outline.Find(activity) < 0
            ? (Faults.RuleCodes.ActivityUnknown, $"the project {project} has no activity {TextRule.Shown(activity)}")
        : null;

    public Place ActivityAt(int project, int activity)
    {
        var (outline, path, _) = Projects[project];
        return new Place(path, "").Under("activities", activity).About($"{outline.Id}/", outline.ActivityIds[activity], activity);
    }
}
