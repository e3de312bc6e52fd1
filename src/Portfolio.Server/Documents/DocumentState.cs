using Microsoft.Net.Http.Headers;
using Portfolio.Model.Rules;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Json;
using Portfolio.Server.Http;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Documents;

/// <summary>
/// The document as it stands before a write, read no further than the write needs. Valid only while the decision is being made.
/// </summary>
internal sealed class DocumentState(Head head, KnownParts known)
{
    public Head Head => head;

    /// <summary>The stored projects, in document order.</summary>
    public IEnumerable<PartHead> Projects => head.Parts.Where(part => part.Project != PartNames.Settings);

    /// <summary>Null when there is no such part.</summary>
    public PartHead? Find(string part) => head.Parts.FirstOrDefault(found => found.Project == part);

    /// <summary>Entity tag of the settings or a project; null when there is no such part.</summary>
    public EntityTagHeaderValue? Tag(string part) => Find(part) is { } found ? EntityTags.OfPart(found.Hash) : null;

    /// <summary>Canonical bytes of the settings or a project; null when there is no such part.</summary>
    public Task<byte[]?> BytesAsync(string part) => head.ReadAsync(part);

    /// <summary>A stored project as it was sent; null when there is none.</summary>
    public async Task<ProjectJson?> ProjectAsync(string project) =>
        await head.ReadAsync(project) is { } bytes ? DocumentReader.OfStored.ReadProject(bytes) : null;

    public async Task<KnownSettings> SettingsAsync()
    {
        var hash = Find(PartNames.Settings)!.Hash;
        return known.Settings(hash) ?? known.Keep(hash, (await head.ReadAsync(PartNames.Settings))!);
    }

    /// <summary>Outlines of these stored projects, in their order.</summary>
    public async Task<IReadOnlyList<ProjectOutline>> OutlinesAsync(IReadOnlyList<PartHead> projects)
    {
        var outlines = new ProjectOutline?[projects.Count];
        for (var i = 0; i < outlines.Length; i++)
            outlines[i] = known.Outline(projects[i].Hash);
        string[] unknown = [.. projects.Where((_, i) => outlines[i] is null).Select(part => part.Hash).Distinct(StringComparer.Ordinal)];
        var stored = unknown.Length > 0 ? await head.ReadOutlinesAsync(unknown) : null;
        for (var i = 0; i < outlines.Length; i++)
            outlines[i] ??= await LearnAsync(projects[i], stored!);
        return outlines!;
    }

    /// <summary>From what was kept with the content, or else from the content itself.</summary>
    private async Task<ProjectOutline> LearnAsync(PartHead part, IReadOnlyDictionary<string, byte[]> stored)
    {
        var outline = stored.TryGetValue(part.Hash, out var bytes) ? OutlineBytes.Read(bytes) : null;
        outline ??= ProjectOutline.Of((await ProjectAsync(part.Project))!.ToModel(new Reading(), ""));
        known.Keep(part.Hash, outline);
        return outline;
    }
}
