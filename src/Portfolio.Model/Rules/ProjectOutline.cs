using Portfolio.Model.Documents;

namespace Portfolio.Model.Rules;

/// <summary>A link as other parts see it. Activities are places in the project's list.</summary>
/// <param name="Successor">The activity that waits.</param>
/// <param name="Entry">Place in its <c>predecessors</c>.</param>
/// <param name="Predecessor">Place of the predecessor when it is in the same project, otherwise −1.</param>
/// <param name="Project">Project of a predecessor elsewhere, otherwise null.</param>
/// <param name="Activity">Id of a predecessor elsewhere, otherwise null.</param>
public readonly record struct OutlineLink(int Successor, int Entry, int Predecessor, string? Project, string? Activity);

/// <summary>
/// What other parts need to know of a project: its activities' ids, its links and what it asks of the settings. Small and immutable, so
/// that it can be kept by content hash and a write of one project need not read the others again. Links to unknown activities of the
/// project itself are left out.
/// </summary>
public sealed class ProjectOutline
{
    private Dictionary<string, int>? places;

    /// <param name="links">In the order of their successors and entries.</param>
    public ProjectOutline(
        string id, string? name, string? programme, IReadOnlyList<string> activityIds, IReadOnlyList<OutlineLink> links, ProjectNeeds needs)
    {
        (Id, Name, Programme, ActivityIds, Links, Needs) = (id, name, programme, activityIds, links, needs);
        ForeignLinks = [.. links.Where(l => l.Project is not null)];
    }

    private ProjectOutline(Project project)
    {
        Id = project.Id;
        Name = project.Name;
        Programme = project.Programme;
        ActivityIds = [.. project.Activities.Select(a => a.Id)];
        Links = [.. LinksOf(project.Activities)];
        ForeignLinks = [.. Links.Where(l => l.Project is not null)];
        Needs = ProjectNeeds.Of(project);
    }

    public string Id { get; }

    public string? Name { get; }

    public string? Programme { get; }

    /// <summary>In document order.</summary>
    public IReadOnlyList<string> ActivityIds { get; }

    public IReadOnlyList<OutlineLink> Links { get; }

    /// <summary>Those of the links that reach into another project.</summary>
    public IReadOnlyList<OutlineLink> ForeignLinks { get; }

    public ProjectNeeds Needs { get; }

    /// <summary>True when a link reaches into another project.</summary>
    public bool ReachesOut => ForeignLinks.Count > 0;

    /// <summary>Has a finish: a project without activities has none, and counts nowhere.</summary>
    public bool HasFinish => ActivityIds.Count > 0;

    public static ProjectOutline Of(Project project) => new(project);

    /// <summary>Place of the activity in the project's list (of the first with this id), or −1.</summary>
    public int Find(string activity) => (places ??= Index(ActivityIds)).GetValueOrDefault(activity, -1);

    /// <summary>Splits <c>project/activity</c>; without a slash, or before one the project itself, the activity is its own and the
    /// project null.</summary>
    public static (string? Project, string Activity) Split(string reference, string own)
    {
        var slash = reference.IndexOf('/');
        if (slash < 0) return (null, reference);
        var project = reference[..slash];
        return (project == own ? null : project, reference[(slash + 1)..]);
    }

    // Made when it is first asked for, for most outlines never are; two threads at once make the same.
    private static Dictionary<string, int> Index(IReadOnlyList<string> ids)
    {
        var places = new Dictionary<string, int>(ids.Count, StringComparer.Ordinal);
        for (var i = 0; i < ids.Count; i++)
            if (ids[i] is { Length: > 0 } id)
                places.TryAdd(id, i);
        return places;
    }

    private IEnumerable<OutlineLink> LinksOf(IReadOnlyList<Activity> activities)
    {
        for (var i = 0; i < activities.Count; i++)
        {
            var links = activities[i].Predecessors;
            for (var k = 0; k < links.Count; k++)
            {
                if (links[k].Activity is not { Length: > 0 } reference) continue;
                var (project, activity) = Split(reference, Id);
                if (project is not null) yield return new(i, k, -1, project, activity);
                else if (Find(activity) is >= 0 and var found && found != i) yield return new(i, k, found, null, null);
            }
        }
    }
}
