using System.Text.Json.Nodes;
using Portfolio.Model.Faults;

namespace Portfolio.Server.Updates;

/// <summary>The members sent for one thing, and where they were sent.</summary>
/// <param name="Path">Pointer of the thing in what was sent.</param>
/// <param name="IdPath">Pointer of its name.</param>
internal sealed record SentThing(string Path, string IdPath, JsonObject Members);

/// <param name="MayCreate">When it is not there yet, it is added.</param>
internal sealed record ActivityUpdate(string Id, SentThing Sent, bool MayCreate);

/// <summary>What was sent for one project.</summary>
internal sealed class ProjectUpdate(string id, string idPath)
{
    private readonly Dictionary<string, ActivityUpdate> activities = new(StringComparer.Ordinal);

    public string Id => id;

    /// <summary>Where it is named first.</summary>
    public string IdPath => idPath;

    /// <summary>Null: only activities were sent.</summary>
    public SentThing? Own { get; private set; }

    /// <summary>In the order in which they were sent.</summary>
    public IEnumerable<ActivityUpdate> Activities => activities.Values;

    /// <summary>False when there were some already.</summary>
    public bool TrySet(SentThing own)
    {
        if (Own is not null)
            return false;
        Own = own;
        return true;
    }

    public bool TryAdd(ActivityUpdate activity) => activities.TryAdd(activity.Id, activity);
}

/// <summary>Updates as they were sent, each thing named once.</summary>
internal sealed class UpdateSet
{
    private readonly OrderedDictionary<string, ProjectUpdate> projects = new(StringComparer.Ordinal);

    public IEnumerable<ProjectUpdate> Projects => projects.Values;

    /// <summary>What is wrong with them whatever is stored.</summary>
    public List<Fault> Faults { get; } = [];

    /// <summary>The JSON that was sent; empty when it was a table.</summary>
    public ReadOnlyMemory<byte> Json { get; init; }

    /// <summary>From the faults to the answer that names them.</summary>
    public IFaultPlaces Places { get; init; } = SentAsJson.Instance;

    /// <summary>The project, named here or before.</summary>
    public ProjectUpdate Of(string project, string idPath)
    {
        if (!projects.TryGetValue(project, out var update))
            projects.Add(project, update = new ProjectUpdate(project, idPath));
        return update;
    }

    public void Add(ProjectUpdate project, SentThing own)
    {
        if (!project.TrySet(own))
            Refuse(own.IdPath, project.Id, $"The project {project.Id} is named a second time; send one entry for it.");
    }

    public void Add(ProjectUpdate project, ActivityUpdate activity)
    {
        if (!project.TryAdd(activity))
            Refuse(activity.Sent.IdPath, $"{project.Id}/{activity.Id}", $"The activity {activity.Id} is named a second time.");
    }

    private void Refuse(string path, string subject, string message) =>
        Faults.Add(new Fault(path, subject, RuleCodes.IdDuplicate, message));
}
