using System.Text.Json;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Results;
using Portfolio.Server.Problems;
using Portfolio.Store.Access;
using Portfolio.Store.Results;
using Portfolio.Store.Runs;
using Portfolio.Store.Samples;

namespace Portfolio.Server.Results;

/// <summary>
/// The single iterations of a scope, read back: those of a programme and of the portfolio are formed project by project.
/// Refuses with 410 when they are not kept any more.
/// </summary>
internal sealed class ScopeIterations(SampleStore samples, ResultStore results)
{
    /// <summary>Minutes, one for each iteration.</summary>
    public async Task<int[]> FinishesAsync(Caller caller, StoredRun run, Scope scope, CancellationToken cancellation)
    {
        if (scope.Kind == ScopeKind.Milestone)
            return await MinutesAsync(caller, run, SeriesNames.Milestone(scope.Project!, scope.Activity!), cancellation);
        int[]? latest = null;
        foreach (var project in await MembersAsync(caller, run, scope, cancellation))
        {
            var finishes = await MinutesAsync(caller, run, SeriesNames.Finish(project), cancellation);
            if (latest is null) latest = finishes;
            else for (var i = 0; i < latest.Length; i++) latest[i] = Math.Max(latest[i], finishes[i]);
        }
        return latest ?? throw Expired();
    }

    /// <summary>Whole minor units, one for each iteration.</summary>
    public async Task<double[]> CostsAsync(Caller caller, StoredRun run, Scope scope, CancellationToken cancellation)
    {
        double[]? sum = null;
        foreach (var project in await MembersAsync(caller, run, scope, cancellation))
        {
            var costs = await samples.ReadMoneyAsync(caller, run.Portfolio, run.Id, SeriesNames.Cost(project), cancellation) ?? throw Expired();
            if (sum is null) sum = costs;
            else for (var i = 0; i < sum.Length; i++) sum[i] += costs[i];
        }
        return sum ?? throw Expired();
    }

    private async Task<int[]> MinutesAsync(Caller caller, StoredRun run, string series, CancellationToken cancellation) =>
        await samples.ReadMinutesAsync(caller, run.Portfolio, run.Id, series, cancellation) ?? throw Expired();

    private async Task<IEnumerable<string>> MembersAsync(Caller caller, StoredRun run, Scope scope, CancellationToken cancellation)
    {
        if (scope.Kind == ScopeKind.Project) return [scope.Project!];
        var row = await results.FindAsync(caller, run.Portfolio, run.Id, scope.ToString(), cancellation);
        return row is null ? [] : JsonSerializer.Deserialize(row.Json, ResultsContext.Plain.ResultJson)!.Projects ?? [];
    }

    private static RequestRefused Expired() => new(new Problem(
        410, "iterations-expired", "The iterations are gone", "This figure needs the run's single iterations, which are no longer kept. The levels 0.5, 1 to 99, 99.5 and the configured ones are kept for ever."));
}
