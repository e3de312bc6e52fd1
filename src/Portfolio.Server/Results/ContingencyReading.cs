using Portfolio.Engine.Results;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Results;
using Portfolio.Store.Access;
using Portfolio.Store.Results;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Results;

/// <summary>The contingency of a run: as it was shared out when the run ended, at other levels again from single iterations. For callers who read the whole portfolio.</summary>
internal sealed class ContingencyReading(ResultStore results, ScopeIterations iterations, PortfolioFacts facts)
{
    public async Task<ContingencyJson> ReadAsync(Caller caller, StoredRun run, Level level, CancellationToken cancellation)
    {
        var contingency = await FindAsync(caller, run, level, cancellation) ?? await AgainAsync(caller, run, level, cancellation);
        var digits = (await facts.OfAsync(run.Portfolio, run.Revision, cancellation)).Digits;
        var warnings = KeptWarnings.Read(run, caller).Of(Scope.Portfolio).Where(warning => warning.Code != Cautions.LevelsUnderAdd);
        var own = Cautions.Of(contingency).Except(Cautions.Always).Select(warning => new WarningJson(warning.Code, warning.Message));
        return ContingencyJson.From(run, contingency, digits, [.. warnings, .. own]);
    }

    /// <summary>The contingency at a level that is kept; null at others.</summary>
    public async Task<Contingency?> FindAsync(Caller caller, StoredRun run, Level level, CancellationToken cancellation) =>
        await FindAsync(caller, run.Portfolio, run.Id, level, cancellation);

    public async Task<Contingency?> FindAsync(Caller caller, string portfolio, string run, Level level, CancellationToken cancellation) =>
        await results.FindAllocationAsync(caller, portfolio, run, (double)level.Percent, cancellation) is { } row ? ContingencyBytes.FromBytes(row.Bytes) : null;

    private async Task<Contingency> AgainAsync(Caller caller, StoredRun run, Level level, CancellationToken cancellation)
    {
        var ranks = new RankTable([level]);
        var total = await iterations.CostsAsync(caller, run, Scope.Portfolio, cancellation);
        var allocation = new CostAllocation(total, ranks.Levels);
        var projects = new List<(string Id, Grid Cost)>();
        foreach (var row in await results.ListGridsAsync(caller, run.Portfolio, run.Id, cancellation))
        {
            if (row.Metric != Metrics.Cost || Scope.Parse(row.Scope) is not { Kind: ScopeKind.Project, Project: { } id }) continue;
            var costs = await iterations.CostsAsync(caller, run, Scope.OfProject(id), cancellation);
            var basis = GridBytes.FromBytes(row.Bytes).Base!.Value.Value;
            allocation.Add(costs, basis);
            projects.Add((id, Grids.OfCost(costs, ranks, basis, null)));
        }
        var whole = Grids.OfCost(total, ranks, projects.Sum(project => project.Cost.Base!.Value.Value), null);
        return Contingency.At(level, whole, [.. projects.Zip(allocation.Close(), (project, shares) => new ProjectCost(project.Id, project.Cost, shares))])!;
    }
}
