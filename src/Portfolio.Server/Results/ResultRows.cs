using System.Text.Json;
using Portfolio.Engine;
using Portfolio.Engine.Results;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Results;
using Portfolio.Store.Results;

namespace Portfolio.Server.Results;

/// <summary>Writes the rows of a run as they will be served, at the configured levels.</summary>
internal sealed class ResultRows(Plan plan, RunFacts facts)
{
    private readonly IReadOnlyList<Level> levels = RunLevels.Configured(plan.Document.Settings);
    private readonly int digits = Money.MinorDigits(plan.Document.Settings.Currency);
    private readonly HashSet<Scope> inBranches =
    [
        .. plan.Milestones.Where(milestone => milestone.InBranch)
            .Select(milestone => Scope.OfMilestone(plan.Document.Projects[milestone.Project].Id, milestone.Activity.Id)),
    ];

    public IReadOnlyList<ResultRow> Of(IEnumerable<ScopeResult> rows) => [.. rows.Select(Json).Select(Row)];

    private static ResultRow Row(ResultJson json) =>
        new(json.Scope, JsonSerializer.SerializeToUtf8Bytes(json, ResultsContext.Plain.ResultJson));

    private ResultJson Json(ScopeResult row)
    {
        var finish = FinishSummary.Of(row.Finish, levels);
        return new()
        {
            Scope = row.Scope.ToString(),
            Run = facts.Run,
            AsOf = facts.AsOf,
            Revision = facts.Revision,
            Projects = Members(row.Scope),
            Happens = inBranches.Contains(row.Scope) ? finish.Happens : null,
            Finish = FinishJson.From(finish),
            Cost = row.Cost is { } cost ? CostJson.From(CostSummary.Of(cost, levels, digits)) : null,
            Joint = row.Joint is { } joint ? new(joint.Finish, MinorUnits.ToMoney(joint.Budget, digits), joint.Probability) : null,
        };
    }

    private IReadOnlyList<string>? Members(Scope scope) => scope.Kind is not (ScopeKind.Portfolio or ScopeKind.Programme) ? null :
    [
        .. plan.Document.Projects
            .Where(project => project.Activities.Count > 0 && (scope.Kind == ScopeKind.Portfolio || project.Programme == scope.Programme))
            .Select(project => project.Id),
    ];
}
