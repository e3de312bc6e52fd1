using Portfolio.Engine.Calendars;
using Portfolio.Model.Documents;

namespace Portfolio.Engine.Networks;

/// <summary>Lays a document out as a <see cref="Network"/>.</summary>
internal static class NetworkBuilder
{
    // Leads and latest finishes may lie long before the first date of a document; eleven years are kept before it.
    private const int DaysBefore = 4004;

    public static Network Build(PortfolioDocument document)
    {
        var projects = document.Projects;
        var activities = projects.SelectMany(p => p.Activities).ToArray();
        var n = activities.Length;
        var projectStart = new int[projects.Count + 1];
        var projectOf = new int[n];
        var index = new Dictionary<(string, string), int>(n);
        for (int p = 0, a = 0; p < projects.Count; p++)
        {
            projectStart[p] = a;
            foreach (var activity in projects[p].Activities)
            {
                projectOf[a] = p;
                index[(projects[p].Id, activity.Id)] = a++;
            }
            projectStart[p + 1] = a;
        }
        var links = Links(projects, activities, projectOf, index, out var linkStart);
        var used = InUse(document);
        var calendars = Calendars(document, used);
        var (fork, branch) = Forks(projects, index, n);
        var (successorStart, successors) = Successors(n, links, linkStart);
        var scale = Scale(used, calendars);
        WorkTime CalendarOf(string? id) => scale.Working ? scale : calendars[id ?? document.Settings.DefaultCalendar];
        return new Network
        {
            Projects = projects,
            Activities = activities,
            ProjectStart = projectStart,
            ProjectOf = projectOf,
            Scale = scale,
            StartMatters = StartMatters(links, [.. projectOf.Select(p => !scale.Working && projects[p].Overhead is not null)]),
            Calendar = [.. activities.Select((x, a) => CalendarOf(x.Calendar ?? projects[projectOf[a]].Calendar))],
            ProjectCalendar = [.. projects.Select(p => CalendarOf(p.Calendar))],
            Status = [.. projectOf.Select(p => scale.BeginningOf(projects[p].StatusDate))],
            EarliestStart =
                [.. activities.Select(x => x is { EarliestStart: { } d, Started: false } ? scale.BeginningOf(d) : Network.None)],
            ActualStart = [.. activities.Select(a => ActualStart(a, scale))],
            ActualFinish = [.. activities.Select(x => x.ActualFinish is { } d ? scale.EndOf(d) : Network.None)],
            LinkStart = linkStart,
            Links = links,
            Fork = fork,
            Branch = branch,
            SuccessorStart = successorStart,
            Successors = successors,
            Order = Topology.Order(linkStart, successorStart, successors),
        };
    }

    // A finished milestone has one instant, the end of its day; other finished work runs from the beginning of its first day.
    private static int ActualStart(Activity activity, WorkTime scale) => activity switch
    {
        { Milestone: true, ActualFinish: { } day } => scale.EndOf(day),
        { ActualStart: { } day } => scale.BeginningOf(day),
        { ActualFinish: { } day } => scale.BeginningOf(day),
        _ => Network.None,
    };

    private static NetworkLink[] Links(
        IReadOnlyList<Project> projects, Activity[] activities, int[] projectOf,
        Dictionary<(string, string), int> index, out int[] linkStart)
    {
        linkStart = new int[activities.Length + 1];
        var links = new List<NetworkLink>(activities.Length * 2);
        for (var a = 0; a < activities.Length; a++)
        {
            foreach (var link in activities[a].Predecessors)
            {
                var predecessor = index[Split(link.Activity, projects[projectOf[a]].Id)];
                links.Add(new NetworkLink(predecessor, link.Type, Minutes.Of(link.Lag)));
            }
            linkStart[a + 1] = links.Count;
        }
        return [.. links];
    }

    /// <summary>The project and activity that a reference names: <c>A05</c> in its own project, <c>project/A05</c> in another.</summary>
    public static (string Project, string Activity) Split(string reference, string ownProject)
    {
        var slash = reference.IndexOf('/', StringComparison.Ordinal);
        return slash < 0 ? (ownProject, reference) : (reference[..slash], reference[(slash + 1)..]);
    }

    // The calendars in use. Minutes mean the same on each of them, so any can be the scale of a network with several.
    private static Dictionary<string, WorkTime> Calendars(PortfolioDocument document, string[] used)
    {
        var first = document.Projects.Select(p => p.StatusDate)
            .Concat(document.Projects.SelectMany(p => p.Activities)
                .SelectMany(a => new[] { a.ActualStart, a.ActualFinish }).OfType<DateOnly>())
            .DefaultIfEmpty(new DateOnly(1970, 1, 1)).Min();
        var kept = used.Append(document.Settings.DefaultCalendar)
            .Concat(document.Projects.Select(p => p.Calendar).OfType<string>()).ToHashSet(StringComparer.Ordinal);
        return document.Settings.Calendars.Prepend(WorkCalendar.EveryDay).Where(c => kept.Contains(c.Id))
            .ToDictionary(c => c.Id, c => new WorkTime(c, first.AddDays(-DaysBefore)), StringComparer.Ordinal);
    }

    // Calendars on which activities and the overhead of their projects run, each once.
    private static string[] InUse(PortfolioDocument document)
    {
        var used = new HashSet<string>(StringComparer.Ordinal);
        foreach (var project in document.Projects.Where(p => p.Activities.Count > 0))
        {
            used.Add(project.Calendar ?? document.Settings.DefaultCalendar);
            foreach (var activity in project.Activities)
                used.Add(activity.Calendar ?? project.Calendar ?? document.Settings.DefaultCalendar);
        }
        return [.. used];
    }

    // One calendar for all: working time. Otherwise minutes, which every calendar understands.
    private static WorkTime Scale(string[] used, Dictionary<string, WorkTime> calendars) =>
        used is [var only] && calendars[only].InWorkingTime() is { } working ? working : calendars.Values.First();

    private static bool[] StartMatters(NetworkLink[] links, bool[] matters)
    {
        foreach (var link in links)
            matters[link.Predecessor] |= !link.FromFinish;
        return matters;
    }

    private static (int[] Fork, int[] Branch) Forks(IReadOnlyList<Project> projects, Dictionary<(string, string), int> index, int n)
    {
        var fork = new int[n];
        var branch = new int[n];
        Array.Fill(fork, -1);
        var f = 0;
        foreach (var project in projects)
        {
            foreach (var chance in project.ChanceBranches)
            {
                for (var b = 0; b < chance.Branches.Count; b++)
                {
                    foreach (var activity in chance.Branches[b].Activities)
                        (fork[index[(project.Id, activity)]], branch[index[(project.Id, activity)]]) = (f, b);
                }
                f++;
            }
        }
        return (fork, branch);
    }

    private static (int[] Start, int[] Successors) Successors(int n, NetworkLink[] links, int[] linkStart)
    {
        var start = new int[n + 1];
        foreach (var link in links)
            start[link.Predecessor + 1]++;
        for (var a = 0; a < n; a++)
            start[a + 1] += start[a];
        var next = start.AsSpan(0, n).ToArray();
        var successors = new int[links.Length];
        for (var a = 0; a < n; a++)
        {
            for (var l = linkStart[a]; l < linkStart[a + 1]; l++)
                successors[next[links[l].Predecessor]++] = a;
        }
        return (start, successors);
    }
}
