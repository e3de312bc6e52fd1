using Portfolio.Engine.Results;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Results;
using Portfolio.Store.Access;
using Portfolio.Store.Results;

namespace Portfolio.Server.Results;

/// <summary>
/// The contingency of a run: as it was shared out when the run ended, at other levels again from single iterations. For callers who read
/// the whole portfolio.
/// </summary>
internal sealed class ContingencyReading(ResultStore results, ScopeIterations iterations, PortfolioFacts facts)
{
    public async Task<ContingencyJson> ReadAsync(SeenRun run, Level level, CancellationToken cancellation)
    {
        var contingency = await FindAsync(run.Caller, run.Portfolio, run.Id, level, cancellation)
            ?? await AgainAsync(run, level, cancellation);
        var digits = (await facts.OfAsync(run.Portfolio, run.Run.Revision, cancellation)).Digits;
        var warnings = KeptWarnings.Read(run).Of(Scope.Portfolio).Where(warning => warning.Code != CautionCodes.LevelsUnderAdd);
        var own = Cautions.Of(contingency).Except(Cautions.Always).Select(warning => new WarningJson(warning.Code, warning.Message));
        return ContingencyJson.From(run.Run, contingency, digits, [.. warnings, .. own]);
    }

    /// <summary>The contingency at a level that is kept; null at others.</summary>
    public async Task<Contingency?> FindAsync(Caller caller, string portfolio, string run, Level level, CancellationToken cancellation)
    {
        var row = await results.FindAllocationAsync(caller, portfolio, run, (double)level.Percent, cancellation);
        return row is null ? null : ContingencyBytes.FromBytes(row.Bytes);
    }

    private async Task<Contingency> AgainAsync(SeenRun run, Level level, CancellationToken cancellation)
    {
        var ranks = new RankTable([level]);
        var total = await iterations.CostsAsync(run, Scope.Portfolio, cancellation);
        var allocation = new CostAllocation(total, ranks.Levels);
        var projects = new List<(string Id, Grid Cost)>();
        foreach (var row in await results.ListGridsAsync(run.Caller, run.Portfolio, run.Id, cancellation))
        {
            if (row.Metric != Metrics.Cost || Scope.Parse(row.Scope) is not { Kind: ScopeKind.Project, Project: { } id }) continue;
            var costs = await iterations.CostsAsync(run, Scope.OfProject(id), cancellation);
            var basis = GridBytes.FromBytes(row.Bytes).Base!.Value.Value;
            allocation.Add(costs, basis);
            projects.Add((id, Grids.OfCost(costs, ranks, basis, commitment: null)));
        }
        var whole = Grids.OfCost(total, ranks, projects.Sum(project => project.Cost.Base!.Value.Value), commitment: null);
        var parts = projects.Zip(allocation.Close(), (project, shares) => new ProjectCost(project.Id, project.Cost, shares));
        return Contingency.At(level, whole, [.. parts])!;
    }
}
