using Portfolio.Model.Faults;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Json;
using Portfolio.Server.Documents;
using Portfolio.Server.Http;
using Portfolio.Server.Problems;

namespace Portfolio.Server.Updates;

/// <summary>Lays updates over the projects that they name; only these are read.</summary>
/// <param name="submits">Whether the caller may report on a project at all.</param>
/// <param name="manages">Whether it may change everything of it.</param>
internal sealed class UpdatesEdit(UpdateSet set, Preconditions conditions, Func<string, bool> submits, Func<string, bool> manages)
{
    public async Task<Draft> DrawAsync(DocumentState state)
    {
        if (conditions.OfChanging(EntityTags.OfDocument(state.Head.Parts)) is { } refused)
            return refused;
        if (Unreached() is { Count: > 0 } unreached)
            return Problem.Forbidden(unreached, set.Places.Of(unreached));
        List<Fault> faults = [.. set.Faults], beyond = [];
        var drafts = new List<(int Place, PartDraft<ProjectJson> Draft)>();
        var places = state.Projects.Select((part, place) => (part.Project, place))
            .ToDictionary(part => part.Project, part => part.place, StringComparer.Ordinal);
        foreach (var update in set.Projects)
        {
            if (!places.TryGetValue(update.Id, out var place))
            {
                faults.Add(new(update.IdPath, update.Id, RuleCodes.ProjectUnknown, $"There is no project {update.Id}."));
                continue;
            }
            var merge = new ProjectMerge(update, (await state.BytesAsync(update.Id))!, faults);
            if (!manages(update.Id))
                beyond.AddRange(merge.BeyondSubmit());
            drafts.Add((place, merge.After));
        }
        return beyond.Count > 0 ? Problem.Forbidden(beyond, set.Places.Of(InOrder(beyond))) : new Draft
        {
            Projects = [.. drafts.OrderBy(draft => draft.Place).Select(draft => draft.Draft)],
            Faults = faults,
            Sent = set.Json,
            OfWhole = true,
            Refused = found => Problem.Refused(set.Places.Of(found)),
        };
    }

    private IReadOnlyList<Fault> InOrder(IReadOnlyList<Fault> faults) =>
        set.Json.IsEmpty ? faults : DocumentOrder.Sort(faults, set.Json.Span);

    private List<Fault> Unreached() =>
    [
        .. set.Projects.Where(update => !submits(update.Id)).Select(update => new Fault(
            update.IdPath, update.Id, FaultCodes.RightMissing, $"The key has no right to submit to {update.Id}.")),
    ];
}
