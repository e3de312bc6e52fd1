using Portfolio.Model.Documents;
using Portfolio.Model.Faults;
using Portfolio.Model.Rules.WithinSettings;

namespace Portfolio.Model.Rules;

/// <summary>Everything the settings can break on their own, without looking at any project.</summary>
public static class SettingsRules
{
    public const string Subject = "settings";

    /// <param name="settings">As read; what could not be read is passed over.</param>
    /// <param name="path">Pointer of the settings in what was sent: <c>/settings</c> in a document, "" when sent alone.</param>
    /// <param name="limits">Null: <see cref="ModelLimits.Default"/>.</param>
    /// <returns>All faults, in no particular order.</returns>
    public static IEnumerable<Fault> Check(Settings settings, string? path, ModelLimits? limits = null)
    {
        var size = limits ?? ModelLimits.Default;
        var at = new Place(path, Subject);
        return
        [
            .. BasicsRule.Check(settings, at, size),
            .. SettingsCommitmentRule.Check(settings, at),
            .. CalendarRule.Check(settings, at, size),
            .. PoolRules.Check(settings, at, size),
            .. DriverRule.Check(settings, at, size),
            .. DependenceRule.Check(settings, at, size),
            .. RiskEventRule.Check(settings.RiskEvents, EventOwner.OfSettings(settings, at, size)),
        ];
    }
}
