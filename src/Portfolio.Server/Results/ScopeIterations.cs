using Portfolio.Model.Documents;
using Portfolio.Server.Problems;
using Portfolio.Store.Samples;

namespace Portfolio.Server.Results;

/// <summary>
/// The single iterations of a scope, read back: those of a programme and of the portfolio are formed project by project.
/// Refuses with 410 when they are not kept any more.
/// </summary>
internal sealed class ScopeIterations(SampleStore samples, ScopeMembers members)
{
    /// <summary>Minutes, one for each iteration.</summary>
    public async Task<int[]> FinishesAsync(SeenRun run, Scope scope, CancellationToken cancellation)
    {
        if (scope.Kind == ScopeKind.Milestone)
            return await MinutesAsync(run, SeriesNames.Milestone(scope.Project!, scope.Activity!), cancellation);
        int[]? latest = null;
        foreach (var project in await MembersAsync(run, scope, cancellation))
        {
            var finishes = await MinutesAsync(run, SeriesNames.Finish(project), cancellation);
            if (latest is null) latest = finishes;
            else for (var i = 0; i < latest.Length; i++) latest[i] = Math.Max(latest[i], finishes[i]);
        }
        return latest ?? throw Expired();
    }

    /// <summary>Whole minor units, one for each iteration.</summary>
    public async Task<double[]> CostsAsync(SeenRun run, Scope scope, CancellationToken cancellation)
    {
        double[]? sum = null;
        foreach (var project in await MembersAsync(run, scope, cancellation))
        {
            var costs = await MoneyAsync(run, SeriesNames.Cost(project), cancellation);
            if (sum is null) sum = costs;
            else for (var i = 0; i < sum.Length; i++) sum[i] += costs[i];
        }
        return sum ?? throw Expired();
    }

    private async Task<int[]> MinutesAsync(SeenRun run, string series, CancellationToken cancellation) =>
        await samples.ReadMinutesAsync(run.Caller, run.Portfolio, run.Id, series, cancellation) ?? throw Expired();

    private async Task<double[]> MoneyAsync(SeenRun run, string series, CancellationToken cancellation) =>
        await samples.ReadMoneyAsync(run.Caller, run.Portfolio, run.Id, series, cancellation) ?? throw Expired();

    private Task<IReadOnlyList<string>> MembersAsync(SeenRun run, Scope scope, CancellationToken cancellation) =>
        members.OfAsync(run.Caller, run.Portfolio, run.Id, scope, cancellation);

    private static RequestRefused Expired() => new(new Problem(
        410, "iterations-expired", "The iterations are gone",
        "This figure needs the run's single iterations, which are no longer kept. " +
        "The levels 0.5, 1 to 99, 99.5 and the configured ones are kept for ever."));
}
