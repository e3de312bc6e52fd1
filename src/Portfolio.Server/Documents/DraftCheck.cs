using System.Runtime.CompilerServices;
using Portfolio.Model.Faults;
using Portfolio.Model.Rules;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Json;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Documents;

/// <summary>
/// Judges a write of some parts as <see cref="DocumentCheck"/> judges a whole document: shape, rules and arithmetic of what was drafted,
/// and what it touches in the parts that stay, of which outlines are enough. Meanwhile a draft is a document of its own, with its projects
/// at <c>/projects/0</c>, <c>/projects/1</c> …; in the end each pointer is led back into the JSON that was sent.
/// </summary>
internal sealed class DraftCheck(ModelLimits limits, KnownParts known)
{
    private readonly ConditionalWeakTable<ProjectJson, ProjectJudgement> judged = [];

    /// <summary>The change to store, or null with every fault.</summary>
    /// <exception cref="JsonRefused">A null where none can stand.</exception>
    public async Task<(Change? Change, IReadOnlyList<Fault> Faults)> CheckAsync(Draft draft, DocumentState state)
    {
        try
        {
            var view = await DraftView.OfAsync(draft, state, limits, Judge);
            var found = await view.FaultsAsync();
            IReadOnlyList<Fault> faults = [.. draft.Faults, .. found.Select(fault => fault with { Path = PlaceOf(fault.Path, draft) })];
            return faults.Count > 0
                ? (null, draft.Sent.IsEmpty ? faults : DocumentOrder.Sort(faults, draft.Sent.Span))
                : (ChangeOf(draft, view), []);
        }
        catch (JsonRefused refused)
        {
            throw new JsonRefused(refused.Fault with { Path = PlaceOf(refused.Fault.Path, draft) });
        }
    }

    private ProjectJudgement Judge(PartDraft<ProjectJson> project, PortfolioContext context, string path)
    {
        var content = project.Content;
        if (judged.TryGetValue(content, out var before) && before.Context == context && before.Path == path)
            return before;
        var judgement = new ProjectJudgement(content, context, path, project.SentActivities);
        judged.AddOrUpdate(content, judgement);
        return judgement;
    }

    private Change ChangeOf(Draft draft, DraftView view)
    {
        foreach (var project in view.Drafted)
            known.Keep(project.Part.Hash, project.Outline);
        var projects = view.Drafted.Select(project => project.Part);
        return new Change(draft.Settings is { } settings
            ? [new ProposedPart(PartNames.Settings, DocumentReader.Bytes(settings.Content)), .. projects]
            : [.. projects])
        {
            Removed = draft.Removed,
        };
    }

    private static string PlaceOf(string path, Draft draft)
    {
        if (draft.Settings is { } settings && Below(path, DraftView.SettingsPath) is { } inSettings)
            return settings.Place(inSettings);
        for (var k = 0; k < draft.Projects.Count; k++)
            if (Below(path, DraftView.ProjectPath(k)) is { } inProject)
                return draft.Projects[k].Place(inProject);
        return "";
    }

    private static string? Below(string path, string owner) =>
        path.StartsWith(owner, StringComparison.Ordinal) && (path.Length == owner.Length || path[owner.Length] == '/')
            ? path[owner.Length..]
            : null;
}
