using Portfolio.Model.Documents;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules.WithinSettings;

/// <summary>What was promised for the portfolio and its programmes; whether a programme exists is a rule across parts.</summary>
internal static class SettingsCommitmentRule
{
    public static IEnumerable<Fault> Check(Settings settings, Place at)
    {
        var digits = PortfolioContext.DigitsOf(settings.Currency);
        var commitments = at.Under("commitments");
        foreach (var fault in CommitmentRule.Check(settings.Commitments, digits, commitments)) yield return fault;
        foreach (var (programme, promised) in settings.ProgrammeCommitments)
        {
            var place = commitments.Under("programmes").UnderKey(programme).About("programme/" + programme);
            if (TextRule.Id(programme, () => place) is { } id) yield return id;
            foreach (var fault in CommitmentRule.Check(promised, digits, place)) yield return fault;
        }
    }
}
