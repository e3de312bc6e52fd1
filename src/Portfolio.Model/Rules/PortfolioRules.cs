using Portfolio.Model.Documents;
using Portfolio.Model.Faults;
using Portfolio.Model.Rules.AcrossParts;

namespace Portfolio.Model.Rules;

/// <summary>Outline of a project and where it stands in what was sent; a null path says that it was not sent but is stored.</summary>
/// <param name="Sent">Places of the activities that were sent where the others are stored; null: all.</param>
public sealed record PlacedOutline(ProjectOutline Outline, string? Path, IReadOnlySet<int>? Sent = null);

/// <summary>
/// Rules across parts: whether what one part names exists in another, and circles through several projects. Outlines are enough, so that
/// a write of one project is checked without reading the others again. Faults that lie in stored parts carry the path "".
/// </summary>
public static class PortfolioRules
{
    /// <summary>The fault of a portfolio's own id; none when it is sound. The id stands in the address, so the path is "".</summary>
    public static IEnumerable<Fault> CheckId(string portfolio) =>
        TextRule.Id(portfolio, () => new Place("", "portfolio")) is { } fault ? [fault] : [];

    /// <param name="settings">Sent or stored.</param>
    /// <param name="settingsPath">Pointer of the settings in what was sent; null: they are stored.</param>
    /// <param name="projects">All projects, in document order.</param>
    /// <param name="limits">Null: <see cref="ModelLimits.Default"/>.</param>
    /// <param name="projectsPath">Pointer of the list of projects in what was sent; null: the list was not sent.</param>
    /// <returns>All faults, in no particular order.</returns>
    public static IEnumerable<Fault> Check(
        Settings settings, string? settingsPath, IReadOnlyList<PlacedOutline> projects, ModelLimits? limits = null,
        string? projectsPath = null)
    {
        var whole = new OutlineIndex(projects);
        var settingsAt = new Place(settingsPath, SettingsRules.Subject);
        return
        [
            .. ProjectListRule.Check(projects, new Place(projectsPath, "projects"), limits ?? ModelLimits.Default),
            .. SettingsReferenceRule.Check(settings, settingsAt, whole),
            .. ForeignLinkRule.Check(whole),
            .. ForeignCycleRule.Check(whole),
        ];
    }
}
