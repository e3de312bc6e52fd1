using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Document;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Feeds;

/// <summary>What scopes are called in the document of a run; ids where nothing is named.</summary>
internal sealed class ScopeNames
{
    private readonly string whole;
    private readonly Dictionary<string, ProjectJson> projects;

    private ScopeNames(string whole, Dictionary<string, ProjectJson> projects) => (this.whole, this.projects) = (whole, projects);

    public static ScopeNames Of(StoredDocument document)
    {
        var settings = DocumentReader.OfStored.ReadSettings(document.Parts[0].Bytes);
        var projects = document.Parts.Skip(1).Select(part => DocumentReader.OfStored.ReadProject(part.Bytes));
        return new(
            settings.Name ?? document.Revision.Portfolio, projects.ToDictionary(project => project.Id!, StringComparer.Ordinal));
    }

    public string Whole => whole;

    public string Of(Scope scope) => scope.Kind switch
    {
        ScopeKind.Programme => $"Programme {scope.Programme}",
        ScopeKind.Project => Project(scope.Project!),
        ScopeKind.Milestone => $"{Project(scope.Project!)}: {Milestone(scope)}",
        _ => whole,
    };

    private string Project(string id) => projects.GetValueOrDefault(id)?.Name ?? id;

    private string Milestone(Scope scope) =>
        projects.GetValueOrDefault(scope.Project!)?.Activities?.FirstOrDefault(activity => activity.Id == scope.Activity)?.Name
        ?? scope.Activity!;
}
