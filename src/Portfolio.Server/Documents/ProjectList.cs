using Portfolio.Model.Rules;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Json;
using Portfolio.Server.Contracts.Portfolios;
using Portfolio.Server.Http;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Documents;

/// <summary>The projects of a document as a list, from their outlines: contents are read only where an outline is missing.</summary>
internal sealed class ProjectList(DocumentStore documents, KnownParts known)
{
    /// <summary>Up to <paramref name="limit"/> from behind a position; null when there is no such revision.</summary>
    public async Task<IReadOnlyList<(long Position, ProjectEntryJson Entry)>?> ReadAsync(
        Caller caller, string portfolio, long? revision, long after, int limit, CancellationToken cancellation)
    {
        if (await documents.ListProjectsAsync(caller, portfolio, revision, after, limit, cancellation) is not { } listed)
            return null;
        var entries = new List<(long Position, ProjectEntryJson Entry)>(listed.Count);
        foreach (var project in listed)
        {
            var outline = await OutlineAsync(project, cancellation);
            entries.Add((project.Position, ProjectEntryJson.From(outline, EntityTags.OfPart(project.Hash).ToString())));
        }
        return entries;
    }

    private async Task<ProjectOutline> OutlineAsync(ListedProject project, CancellationToken cancellation)
    {
        if (known.Outline(project.Hash) is { } lately)
            return lately;
        var outline = project.Outline is { } kept ? OutlineBytes.Read(kept) : null;
        if (outline is null)
        {
            var content = (await documents.ReadContentsAsync([project.Hash], cancellation))[project.Hash];
            outline = ProjectOutline.Of(DocumentReader.OfStored.ReadProject(content).ToModel(new Reading(), ""));
        }
        known.Keep(project.Hash, outline);
        return outline;
    }
}
