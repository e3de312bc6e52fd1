using Portfolio.Model.Documents;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules;

/// <summary>A document that breaks no rule of the model; the only kind the engine accepts. Immutable, safe to share between
/// threads.</summary>
public sealed class ValidPortfolio
{
    private ValidPortfolio(PortfolioDocument document) => Document = document;

    public PortfolioDocument Document { get; }

    /// <summary>False when no project has an activity: then there is no finish, and nothing to run (contract section 5).</summary>
    public bool HasFinish => Document.Projects.Any(p => p.Activities.Count > 0);

    /// <summary>Checks every rule within and across parts; null with all faults, in no particular order, when any is broken.</summary>
    public static ValidPortfolio? Check(PortfolioDocument document, out IReadOnlyList<Fault> faults) =>
        Check(document, ModelLimits.Default, out faults);

    /// <inheritdoc cref="Check(PortfolioDocument, out IReadOnlyList{Fault})"/>
    public static ValidPortfolio? Check(PortfolioDocument document, ModelLimits limits, out IReadOnlyList<Fault> faults)
    {
        var (settings, projects) = document;
        var context = PortfolioContext.Of(settings, limits);
        var outlines = projects.Select((p, i) => new PlacedOutline(ProjectOutline.Of(p), $"/projects/{i}")).ToList();
        List<Fault> found = [.. SettingsRules.Check(settings, "/settings", limits)];
        foreach (var (project, (outline, path)) in projects.Zip(outlines)) found.AddRange(ProjectRules.Check(project, outline, context, path));
        found.AddRange(PortfolioRules.Check(settings, "/settings", outlines, limits, "/projects"));
        faults = found;
        return found.Count == 0 ? new ValidPortfolio(document) : null;
    }
}
