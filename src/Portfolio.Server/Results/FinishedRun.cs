using System.Text.Json;
using Portfolio.Engine;
using Portfolio.Engine.Results;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Results;
using Portfolio.Store.Results;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Results;

/// <summary>
/// From the iterations of a run to all that is kept of it for ever: rows, grids, allocations, digests and cautions. Pure but for the
/// reading of samples. Equal plans and samples give equal figures, whatever the run's id.
/// </summary>
public static class FinishedRun
{
    /// <summary>Builds what <see cref="RunEndings.SucceedAsync"/> stores.</summary>
    /// <param name="plan">The compiled revision that the run has worked; with at least one activity.</param>
    /// <param name="samples">Every iteration of it, read series by series.</param>
    /// <exception cref="InvalidOperationException">A series is not there.</exception>
    public static RunResult Build(Plan plan, SampleReader samples, RunFacts facts, CancellationToken cancellation)
    {
        var document = plan.Document;
        var kept = RunLevels.Kept(document.Settings);
        var clamped = new ClampedDates();
        var results = RunResults.Of(document, clamped.Watching(samples.With(plan, facts.Iterations)), kept, cancellation);
        var rows = results.Rows.OrderBy(row => row.Scope.Kind).ToArray(); // a stable sort: each kind keeps its order
        var contingencies = kept.Select(level => Contingency.At(level, rows[0].Cost!, results.Projects)!).ToArray();
        var cautions = plan.Warnings.Concat(clamped.Cautions(document));
        var warnings = RunWarnings.Of(document, facts.AsOf, cautions, Configured(contingencies, document.Settings));
        return new RunResult
        {
            ResultDigest = results.Digest,
            InputsDigest = InputsDigest.Of(facts, Plan.EngineVersion),
            Warnings = JsonSerializer.Serialize(warnings, ResultsContext.Plain.IReadOnlyListWarningJson),
            Rows = new ResultRows(plan, facts).Of(rows),
            Grids = [.. rows.SelectMany(GridsOf)],
            Allocations = [.. contingencies.Select(AllocationOf)],
        };
    }

    private static IEnumerable<Contingency> Configured(IEnumerable<Contingency> contingencies, Settings settings)
    {
        var levels = RunLevels.Configured(settings);
        return contingencies.Where(contingency => levels.Contains(contingency.Level));
    }

    private static AllocationRow AllocationOf(Contingency contingency) =>
        new((double)contingency.Level.Percent, ContingencyBytes.ToBytes(contingency));

    private static IEnumerable<GridRow> GridsOf(ScopeResult row)
    {
        yield return GridOf(row.Scope, Metrics.Finish, row.Finish);
        if (row.Cost is { } cost) yield return GridOf(row.Scope, Metrics.Cost, cost);
    }

    private static GridRow GridOf(Scope scope, string metric, Grid grid)
    {
        var (mean, sd) = grid.Happening > 0 ? (grid.Mean, grid.Sd) : ((double?)null, (double?)null);
        return new(scope.ToString(), metric, BaseOf(grid), mean, sd, grid.Happens, GridBytes.ToBytes(grid));
    }

    // The base of a finish is a day in the grid; its row holds minutes: the end of that day.
    private static double? BaseOf(Grid grid) => grid.Base is not { } known ? null
        : grid.Metric == Metric.Finish ? Instants.EndOf(Instants.ToDate((int)known.Value)) : known.Value;
}
