using System.Text.Json;
using Portfolio.Server.Contracts.Json;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Documents;

/// <summary>What a revision changed of the parts that the caller may read, place by place.</summary>
internal sealed class RevisionChanges(DocumentStore documents)
{
    /// <summary>Which parts; null when there is no such revision.</summary>
    public async Task<IReadOnlyList<PartChange>?> PartsAsync(
        Caller caller, string portfolio, long number, CancellationToken cancellation) =>
        await documents.FindRevisionAsync(caller, portfolio, number, cancellation) is null
            ? null
            : await documents.ListChangesAsync(caller, portfolio, number, cancellation);

    /// <summary>Places from behind <paramref name="skip"/> others, at most <paramref name="take"/>.</summary>
    public async Task<IReadOnlyList<JsonChange>> ReadAsync(
        Caller caller, string portfolio, long number, IReadOnlyList<PartChange> parts, int skip, int take, CancellationToken cancellation)
    {
        List<JsonChange> found = [.. await OrderAsync(caller, portfolio, number, cancellation)];
        foreach (var part in parts.Where(part => part.Before != part.After))
        {
            // Pages are cut from a list that is the same each time, for a revision never changes.
            if (found.Count >= skip + take)
                break;
            found.AddRange(await OfPartAsync(part, cancellation));
        }
        return [.. found.Skip(skip).Take(take)];
    }

    private async Task<IEnumerable<JsonChange>> OfPartAsync(PartChange part, CancellationToken cancellation)
    {
        string[] hashes = [.. new[] { part.Before, part.After }.OfType<string>()];
        var contents = await documents.ReadContentsAsync(hashes, cancellation);
        var path = part.Project == PartNames.Settings ? "/settings" : $"/projects/{part.Project}";
        return JsonChanges.Between(path, Element(part.Before, contents), Element(part.After, contents));
    }

    private static JsonElement? Element(string? hash, IReadOnlyDictionary<string, byte[]> contents) =>
        hash is null ? null : JsonElement.Parse(contents[hash]);

    private async Task<IEnumerable<JsonChange>> OrderAsync(Caller caller, string portfolio, long number, CancellationToken cancellation)
    {
        var before = await documents.ReadHeadsAsync(caller, portfolio, number - 1, cancellation) ?? [];
        var after = await documents.ReadHeadsAsync(caller, portfolio, number, cancellation) ?? [];
        return JsonChanges.Order("/projects", Projects(before), Projects(after));
    }

    private static string[] Projects(IReadOnlyList<PartHead> heads) =>
        [.. heads.Select(head => head.Project).Where(project => project != PartNames.Settings)];
}
