using System.Text.Json;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Results;
using Portfolio.Store.Access;
using Portfolio.Store.Results;

namespace Portfolio.Server.Results;

/// <summary>Which projects a scope joined when the run was worked: programmes change from revision to revision.</summary>
internal sealed class ScopeMembers(ResultStore results)
{
    /// <summary>Ids in document order; none when the run has no such scope, or not for this caller.</summary>
    public async Task<IReadOnlyList<string>> OfAsync(
        Caller caller, string portfolio, string run, Scope scope, CancellationToken cancellation)
    {
        if (scope.Kind == ScopeKind.Project) return [scope.Project!];
        var row = await results.FindAsync(caller, portfolio, run, scope.ToString(), cancellation);
        return row is null ? [] : JsonSerializer.Deserialize(row.Json, ResultsContext.Plain.ResultJson)!.Projects ?? [];
    }
}
