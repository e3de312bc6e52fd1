using Portfolio.Model.Documents;
using Portfolio.Model.Faults;
using Portfolio.Model.Rules;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Json;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Documents;

/// <summary>
/// What can be said of one drafted project against the settings, without a look at other projects: the same however often the write is
/// decided again because others came first.
/// </summary>
internal sealed class ProjectJudgement
{
    private readonly ProjectJson content;
    private ProposedPart? part;

    /// <param name="path">Stands before the pointers of all faults.</param>
    /// <param name="sent">Places of the activities that were sent; null: all.</param>
    /// <exception cref="JsonRefused">A null where none can stand.</exception>
    public ProjectJudgement(ProjectJson content, PortfolioContext context, string path, IReadOnlySet<int>? sent)
    {
        (this.content, Context, Path, Sent) = (content, context, path, sent);
        var reading = new Reading();
        Model = content.ToModel(reading, path);
        Outline = ProjectOutline.Of(Model);
        Shape = reading.Faults;
        Broken = [.. ProjectRules.Check(Model, Outline, context, path, sent)];
    }

    public PortfolioContext Context { get; }

    public string Path { get; }

    public IReadOnlySet<int>? Sent { get; }

    public Project Model { get; }

    public ProjectOutline Outline { get; }

    /// <summary>What could not be read.</summary>
    public IReadOnlyList<Fault> Shape { get; }

    /// <summary>Rules that are broken.</summary>
    public IReadOnlyList<Fault> Broken { get; }

    /// <summary>As it is to be stored; only of a project without faults.</summary>
    public ProposedPart Part => part ??= new ProposedPart(content.Id!, DocumentReader.Bytes(content), OutlineBytes.Write(Outline));
}
