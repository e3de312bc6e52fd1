using Portfolio.Model.Documents;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules;

/// <summary>A promised finish and a budget, of the portfolio, a programme or a project.</summary>
internal static class CommitmentRule
{
    public static IEnumerable<Fault> Check(Commitments? commitments, int digits, Place at)
    {
        if (commitments is null) yield break;
        if (ValueRule.Date(commitments.Finish, () => at.Under("finish")) is { } finish) yield return finish;
        if (ValueRule.Money(commitments.Budget, digits, () => at.Under("budget")) is { } budget) yield return budget;
    }
}
