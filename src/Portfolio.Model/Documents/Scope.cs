namespace Portfolio.Model.Documents;

/// <summary>What a result is about.</summary>
public enum ScopeKind
{
    Portfolio,
    Programme,
    Project,
    Milestone,
}

/// <summary>
/// What a result is about, with the ids that name it. Written <c>portfolio</c>, <c>programme/p</c>, <c>project/p</c>, <c>milestone/p/a</c>.
/// </summary>
public sealed record Scope(ScopeKind Kind, string? Programme = null, string? Project = null, string? Activity = null)
{
    public static readonly Scope Portfolio = new(ScopeKind.Portfolio);

    public static Scope OfProgramme(string programme) => new(ScopeKind.Programme, Programme: programme);

    public static Scope OfProject(string project) => new(ScopeKind.Project, Project: project);

    public static Scope OfMilestone(string project, string activity) => new(ScopeKind.Milestone, Project: project, Activity: activity);

    /// <summary>True for what joins several projects: a programme, the portfolio.</summary>
    public bool IsTotal => Kind is ScopeKind.Portfolio or ScopeKind.Programme;

    public override string ToString() => Kind switch
    {
        ScopeKind.Programme => $"programme/{Programme}",
        ScopeKind.Project => $"project/{Project}",
        ScopeKind.Milestone => $"milestone/{Project}/{Activity}",
        _ => "portfolio",
    };

    /// <summary>Reads the written form; null when it is not one.</summary>
    public static Scope? Parse(string? text) => text?.Split('/') switch
    {
        ["portfolio"] => Portfolio,
        ["programme", { Length: > 0 } programme] => OfProgramme(programme),
        ["project", { Length: > 0 } project] => OfProject(project),
        ["milestone", { Length: > 0 } project, { Length: > 0 } activity] => OfMilestone(project, activity),
        _ => null,
    };
}
