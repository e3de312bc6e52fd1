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
        var outlines = new PlacedOutline[projects.Count];
        var within = new List<Fault>[projects.Count];
        // Rules within a project look at no other: the projects are checked on whatever processors are free.
        Parallel.For(0, projects.Count, i =>
        {
            outlines[i] = new PlacedOutline(ProjectOutline.Of(projects[i]), $"/projects/{i}");
            within[i] = [.. ProjectRules.Check(projects[i], outlines[i].Outline, context, outlines[i].Path)];
        });
        List<Fault> found = [.. SettingsRules.Check(settings, "/settings", limits), .. within.SelectMany(faults => faults)];
        found.AddRange(PortfolioRules.Check(settings, "/settings", outlines, limits, "/projects"));
        faults = found;
        return found.Count == 0 ? new ValidPortfolio(document) : null;
    }
}
