using Portfolio.Model.Documents;
using Portfolio.Model.Faults;
using Portfolio.Model.Rules;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Json;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Documents;

/// <summary>The document as it would stand after a draft: drafted parts as read, of the others outlines.</summary>
internal sealed class DraftView
{
    public const string SettingsPath = "/settings";

    private readonly Draft draft;
    private readonly DocumentState state;
    private readonly ModelLimits limits;
    private readonly Reading reading = new();
    private readonly KnownSettings before;
    private readonly Settings settings;
    private readonly PortfolioContext context;
    private readonly IReadOnlyList<(PartHead Head, ProjectOutline Outline)> kept;

    private DraftView(
        Draft draft, DocumentState state, ModelLimits limits, KnownSettings before,
        IReadOnlyList<(PartHead Head, ProjectOutline Outline)> kept,
        Func<PartDraft<ProjectJson>, PortfolioContext, string, ProjectJudgement> judge)
    {
        (this.draft, this.state, this.before, this.kept) = (draft, state, before, kept);
        // A portfolio that was let grow beyond a limit since lowered can still be written.
        this.limits = limits with { Projects = Math.Max(limits.Projects, state.Projects.Count()) };
        settings = draft.Settings?.Content.ToModel(reading, SettingsPath) ?? before.Settings;
        context = draft.Settings is null ? before.Context : PortfolioContext.Of(settings, limits);
        Drafted = SideBySide.Each(draft.Projects, (project, k) => judge(project, context, ProjectPath(k)));
    }

    /// <summary>The drafted projects, in the draft's order.</summary>
    public IReadOnlyList<ProjectJudgement> Drafted { get; }

    public static string ProjectPath(int index) => FormattableString.Invariant($"/projects/{index}");

    public static async Task<DraftView> OfAsync(
        Draft draft, DocumentState state, ModelLimits limits,
        Func<PartDraft<ProjectJson>, PortfolioContext, string, ProjectJudgement> judge)
    {
        var gone = draft.Removed.Concat(draft.Projects.Select(project => project.Content.Id!)).ToHashSet(StringComparer.Ordinal);
        PartHead[] kept = [.. state.Projects.Where(project => !gone.Contains(project.Project))];
        var outlines = await state.OutlinesAsync(kept);
        return new DraftView(draft, state, limits, await state.SettingsAsync(), [.. kept.Zip(outlines)], judge);
    }

    /// <summary>Every fault, its path in the draft as a document.</summary>
    public async Task<IReadOnlyList<Fault>> FaultsAsync()
    {
        List<Fault> shape = [.. reading.Faults, .. Drafted.SelectMany(project => project.Shape)];
        List<Fault> rules = [.. Drafted.SelectMany(project => project.Broken)];
        if (draft.Settings is not null)
            rules.AddRange([.. SettingsRules.Check(settings, SettingsPath, limits), .. await BrokenByContextAsync()]);
        var outlines = Outlines();
        rules.AddRange(PortfolioRules.Check(settings, draft.Settings is null ? null : SettingsPath, outlines, limits));
        var found = DocumentCheck.WithoutRepetition(shape, rules);
        var spoilt = ArithmeticChecks.Spoilt(found);
        if (draft.Settings is not null)
            found.AddRange(ArithmeticChecks.OfSettings(settings, spoilt));
        found.AddRange(Drafted.SelectMany(project => ArithmeticChecks.OfProject(project.Model, project.Path, spoilt)));
        if (await TouchesDependenceAsync())
            found.AddRange(DependenceOf(outlines, found));
        return found;
    }

    /// <summary>All projects in their new order; drafted ones where they stood before, new ones last.</summary>
    private List<PlacedOutline> Outlines()
    {
        var drafted = Drafted.ToDictionary(project => project.Outline.Id, StringComparer.Ordinal);
        var others = kept.ToDictionary(project => project.Head.Project, project => project.Outline, StringComparer.Ordinal);
        var placed = new List<PlacedOutline>();
        foreach (var project in state.Projects)
            if (drafted.Remove(project.Project, out var judged))
                placed.Add(new PlacedOutline(judged.Outline, judged.Path, judged.Sent));
            else if (others.TryGetValue(project.Project, out var outline))
                placed.Add(new PlacedOutline(outline, null));
        placed.AddRange(Drafted.Where(project => drafted.ContainsKey(project.Outline.Id))
            .Select(project => new PlacedOutline(project.Outline, project.Path, project.Sent)));
        return placed;
    }

    /// <summary>Faults of stored projects that name what new settings no longer have; only those projects are read.</summary>
    private async Task<IReadOnlyList<Fault>> BrokenByContextAsync()
    {
        var faults = new List<Fault>();
        foreach (var (head, outline) in kept)
        {
            if (context.MinorDigits >= before.Context.MinorDigits && outline.Needs.AreMetBy(context))
                continue;
            var model = (await state.ProjectAsync(head.Project))!.ToModel(new Reading(), "");
            faults.AddRange(ProjectRules.Check(model, outline, context, path: null));
        }
        return faults;
    }

    /// <summary>Correlations see drivers, projects' ids and their programmes, and nothing else.</summary>
    private async Task<bool> TouchesDependenceAsync()
    {
        if (draft.Settings is not null || draft.Removed.Count > 0)
            return true;
        PartHead[] replaced = [.. Drafted.Select(project => state.Find(project.Outline.Id)).OfType<PartHead>()];
        var programmes = (await state.OutlinesAsync(replaced)).ToDictionary(
            outline => outline.Id, outline => outline.Programme, StringComparer.Ordinal);
        return Drafted.Any(project =>
            !programmes.TryGetValue(project.Outline.Id, out var programme) || programme != project.Outline.Programme);
    }

    private IEnumerable<Fault> DependenceOf(IReadOnlyList<PlacedOutline> outlines, IReadOnlyList<Fault> found)
    {
        var projects = outlines.Select(placed => new Project
        {
            Id = placed.Outline.Id, Programme = placed.Outline.Programme, StatusDate = Bounds.FirstDate,
        });
        return ArithmeticChecks.OfDependence(settings, [.. projects], found);
    }
}
