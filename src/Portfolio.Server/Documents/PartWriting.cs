using System.Text.Json;
using Microsoft.Net.Http.Headers;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Json;
using Portfolio.Server.Problems;
using Portfolio.Store;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Documents;

/// <summary>How a write of parts ended.</summary>
/// <param name="Creates">True when the thing at the address is new.</param>
/// <param name="Tag">Entity tag of the thing at the address as it now stands; null when there is none.</param>
internal sealed record PartsWritten(WriteResult Result, bool Creates = false, string? Tag = null);

/// <summary>
/// The one way of writing parts of a document: a draft is drawn up from what stands there, checked with what it touches, and stored if
/// sound. Most of it happens before the transaction that writes; only when another write came between is it done again inside.
/// </summary>
internal sealed class PartWriting(DocumentStore documents, DraftCheck check, KnownParts known)
{
    /// <param name="draw">Draws up the write on the document as it stands; perhaps twice, so it must change nothing itself.</param>
    /// <param name="joining">Called last inside the transaction, for rows that stand or fall with the write; null for none.</param>
    public async Task<PartsWritten> WriteAsync(
        Caller caller, DocumentWrite write, Func<DocumentState, Task<Draft>> draw,
        Func<StoreTransaction, PartsWritten, CancellationToken, Task>? joining, CancellationToken cancellation)
    {
        var last = new PartsWritten(new WriteResult(WriteOutcome.NotFound));
        var result = await documents.WriteDecidedAheadAsync(
            caller,
            write with
            {
                MayCreate = false,
                Joining = joining is null ? null : (open, done, ct) => joining(open, last with { Result = done }, ct),
            },
            async (head, _) =>
            {
                var (proposal, draft) = await DecideAsync(new DocumentState(head!, known), draw);
                last = last with { Creates = draft?.Creates == true, Tag = proposal is Change change ? TagOf(draft!, change, head!) : null };
                return proposal;
            },
            cancellation);
        return last with { Result = result };
    }

    /// <summary>
    /// What the write would come to and change, place by place; nothing is kept. The tag is that of the document as it stands.
    /// </summary>
    public async Task<(WriteResult Result, string? Tag, IReadOnlyList<JsonChange> Changes)> TryAsync(
        Caller caller, DocumentWrite write, Func<DocumentState, Task<Draft>> draw, CancellationToken cancellation)
    {
        var (tag, changes) = ((string?)null, (IReadOnlyList<JsonChange>)[]);
        var result = await documents.TryAsync(
            caller, write with { MayCreate = false },
            async (head, _) =>
            {
                var (proposal, _) = await DecideAsync(new DocumentState(head!, known), draw);
                tag = Http.EntityTags.OfDocument(head!.Parts).ToString();
                changes = proposal is Change change ? await ChangesAsync(change, head) : [];
                return proposal;
            },
            cancellation);
        return (result, tag, changes);
    }

    private static async Task<IReadOnlyList<JsonChange>> ChangesAsync(Change change, Head head)
    {
        var changes = new List<JsonChange>();
        foreach (var part in change.Parts)
        {
            var before = await head.ReadAsync(part.Project) is { } bytes ? JsonElement.Parse(bytes) : (JsonElement?)null;
            changes.AddRange(JsonChanges.Between($"/projects/{part.Project}", before, JsonElement.Parse(part.Bytes)));
        }
        return changes;
    }

    private async Task<(Proposal Proposal, Draft? Draft)> DecideAsync(DocumentState state, Func<DocumentState, Task<Draft>> draw)
    {
        try
        {
            var draft = await draw(state);
            if (draft.Refusal is { } refusal)
                return (Refuse(refusal), null);
            var (change, faults) = await check.CheckAsync(draft, state);
            return change is null ? (Refuse(draft.Refused?.Invoke(faults) ?? Problem.Refused(faults)), null) : (change, draft);
        }
        catch (JsonRefused refused)
        {
            return (Refuse(Problem.Malformed(refused)), null);
        }
    }

    private static Refusal Refuse(Problem problem) => new(problem);

    private static string? TagOf(Draft draft, Change change, Head head) =>
        draft.Removes ? null
        : draft.OfWhole ? OfWhole(change, head).ToString()
        : draft.Activity is { } activity ? TagOf(ContentHash.Of(DocumentReader.Bytes(activity)))
        : change.Parts is [var part] ? TagOf(part.Hash)
        : null;

    // Parts that are changed keep their place.
    private static EntityTagHeaderValue OfWhole(Change change, Head head)
    {
        var changed = change.Parts.ToDictionary(part => part.Project, part => part.Hash, StringComparer.Ordinal);
        return Http.EntityTags.OfDocument(head.Parts.Select(part => part with { Hash = changed.GetValueOrDefault(part.Project, part.Hash) }));
    }

    private static string TagOf(string hash) => Http.EntityTags.OfPart(hash).ToString();
}
