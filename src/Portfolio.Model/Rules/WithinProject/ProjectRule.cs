using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules.WithinProject;

/// <summary>The project's own members: name, programme, tags, priority, status date, commitments, correlation, overhead, number of
/// activities.</summary>
internal static class ProjectRule
{
    public static IEnumerable<Fault> Check(PlacedProject placed)
    {
        var (project, at, context) = (placed.Project, placed.Here, placed.Context);
        if (project.Id is { Length: > 0 } && TextRule.Id(project.Id, () => at.Under("id")) is { } id) yield return id;
        if (TextRule.Name(project.Name, "name", () => at.Under("name")) is { } name) yield return name;
        if (TextRule.Id(project.Programme, () => at.Under("programme")) is { } programme) yield return programme;
        foreach (var fault in TextRule.Tags(project.Tags, () => at)) yield return fault;
        if (project.Priority < 1)
            yield return at.Under("priority").Fault(RuleCodes.PriorityRange,
                $"The priority is {project.Priority}; 1 is the first, so it must be 1 or more.");
        if (ValueRule.Date(project.StatusDate, () => at.Under("statusDate")) is { } status) yield return status;
        foreach (var fault in CommitmentRule.Check(project.Commitments, context.MinorDigits, at.Under("commitments"))) yield return fault;
        if (ValueRule.Within(
                project.Correlation ?? 0, 0, Bounds.Correlation, "correlation", RuleCodes.CorrelationRange, () => at.Under("correlation"))
            is { } correlation)
            yield return correlation;
        foreach (var fault in Overhead(placed)) yield return fault;
        if (project.Activities.Count > context.Limits.Activities)
            yield return at.Under("activities").Fault(
                RuleCodes.LimitExceeded, $"The project has {project.Activities.Count} activities; at most "
                + $"{context.Limits.Activities} are allowed.");
    }

    private static IEnumerable<Fault> Overhead(PlacedProject placed)
    {
        if (placed.Project.Overhead is not { } overhead) yield break;
        var at = placed.Here.Under("overhead");
        if (overhead.PerDay < 0)
            yield return at.Under("perDay").Fault(RuleCodes.MoneyNegative,
                $"The overhead is {overhead.PerDay} a day; it must be 0 or more.");
        else if (ValueRule.Within(
            overhead.PerDay, 0, Bounds.Money, "overhead", RuleCodes.MoneyRange, () => at.Under("perDay")) is { } range)
            yield return range;
        if (ValueRule.Money(overhead.Actual, placed.Context.MinorDigits, () => at.Under("actual"), negativeAllowed: true) is { } actual)
            yield return actual;
    }
}
