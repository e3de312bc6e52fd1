using Portfolio.Model.Documents;

namespace Portfolio.Model.Rules;

/// <summary>A project with what its rules need beside it. Places are built only for faults, so that sound projects cost no text.</summary>
/// <param name="Sent">Places of the activities that were sent; null: all of them.</param>
internal sealed record PlacedProject(
    Project Project, ProjectOutline Outline, PortfolioContext Context, string? Path, IReadOnlySet<int>? Sent = null)
{
    public Place Here => new(Path, Project.Id);

    public Place Activity(int index) => Here.Under("activities", index).About($"{Project.Id}/", Project.Activities[index].Id, index);

    /// <summary>What messages call the activity.</summary>
    public string Name(int index) => Project.Activities[index].Id is { Length: > 0 } id ? id : $"Activity {index + 1}";

    public bool Has(string activity) => Outline.Find(activity) >= 0;
}
