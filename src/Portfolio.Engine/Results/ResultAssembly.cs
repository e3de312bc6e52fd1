using Portfolio.Model.Documents;

namespace Portfolio.Engine.Results;

/// <summary>
/// Makes the rows of one run: first every project by itself, adding it to its programme and the portfolio on the way; then the shares.
/// </summary>
internal sealed class ResultAssembly(
    PortfolioDocument document, SampleSource samples, IReadOnlyList<Level> levels, CancellationToken cancellation)
{
    private readonly RankTable ranks = new(levels);
    private readonly int digits = Money.MinorDigits(document.Settings.Currency);
    private readonly Group all = new(samples.Iterations);
    private readonly Dictionary<string, Group> groups = new(StringComparer.Ordinal);
    private readonly List<string> programmes = [];

    public RunResults Assemble()
    {
        var rows = new List<ScopeResult>();
        var active = Enumerable.Range(0, document.Projects.Count).Where(p => document.Projects[p].Activities.Count > 0).ToArray();
        foreach (var p in active) rows.AddRange(RowsOf(p));
        rows.InsertRange(0, programmes.Select(id =>
            groups[id].Row(Scope.OfProgramme(id), ranks, document.Settings.ProgrammeCommitments.GetValueOrDefault(id), digits)));
        rows.Insert(0, all.Row(Scope.Portfolio, ranks, document.Settings.Commitments, digits));
        return new(rows, Shares(active, rows), ResultDigest.Of(rows));
    }

    private IEnumerable<ScopeResult> RowsOf(int p)
    {
        cancellation.ThrowIfCancellationRequested();
        var project = document.Projects[p];
        var own = samples.Project(p);
        var promised = project.Commitments;
        var cost = Grids.OfCost(own.Costs.Span, ranks, own.BaseCost, Minor(promised?.Budget, digits));
        all.Add(own, (long)cost.Mean);
        if (project.Programme is { } programme) GroupOf(programme).Add(own, (long)cost.Mean);
        yield return new(
            Scope.OfProject(project.Id), Grids.OfFinish(own.Finishes.Span, ranks, default, own.BaseFinish, promised?.Finish), cost,
            Joint(own.Finishes.Span, own.Costs.Span, promised, digits));
        for (var a = 0; a < project.Activities.Count; a++)
            if (project.Activities[a].Milestone) yield return MilestoneRow(p, a);
    }

    private ScopeResult MilestoneRow(int p, int a)
    {
        cancellation.ThrowIfCancellationRequested();
        var (project, milestone) = (document.Projects[p], document.Projects[p].Activities[a]);
        var own = samples.Milestone(p, a);
        var finish = Grids.OfFinish(
            own.Finishes.Span, ranks, DateRule.OfMilestone(project, milestone), own.BaseFinish, milestone.Commitment);
        return new(Scope.OfMilestone(project.Id, milestone.Id), finish, null, null);
    }

    private List<ProjectCost> Shares(int[] active, List<ScopeResult> rows)
    {
        var allocation = new CostAllocation(all.Samples.Costs, levels);
        foreach (var p in active)
        {
            cancellation.ThrowIfCancellationRequested();
            var own = samples.Project(p);
            allocation.Add(own.Costs.Span, own.BaseCost);
        }
        var costs = rows.Where(row => row.Scope.Kind == ScopeKind.Project).Select(row => (row.Scope.Project!, row.Cost!));
        return [.. costs.Zip(allocation.Close(), (project, shares) => new ProjectCost(project.Item1, project.Item2, shares))];
    }

    private Group GroupOf(string programme)
    {
        if (groups.TryGetValue(programme, out var group)) return group;
        programmes.Add(programme);
        return groups[programme] = new(samples.Iterations);
    }

    private static long? Minor(decimal? amount, int digits) => amount is { } known ? MinorUnits.OfMoney(known, digits) : null;

    private static JointConfidence? Joint(ReadOnlySpan<int> finishes, ReadOnlySpan<double> costs, Commitments? promised, int digits) =>
        promised is { Finish: { } finish, Budget: { } budget }
            ? JointConfidence.Of(finishes, costs, finish, MinorUnits.OfMoney(budget, digits))
            : null;

    /// <summary>Several projects taken together, with their base plans: the latest finish and the sum of costs.</summary>
    private sealed class Group(int iterations)
    {
        private int baseFinish = Instants.Never;
        private long baseCost;

        public ScopeSamples Samples { get; } = new(iterations);

        public void Add(ProjectSamples project, long roundedMean)
        {
            Samples.Add(project.Finishes.Span, project.Costs.Span, roundedMean);
            baseFinish = Math.Max(baseFinish, project.BaseFinish);
            baseCost += project.BaseCost;
        }

        public ScopeResult Row(Scope scope, RankTable ranks, Commitments? promised, int digits) => new(
            scope,
            Grids.OfFinish(Samples.Finishes, ranks, default, baseFinish, promised?.Finish),
            Grids.OfCost(Samples.Costs, ranks, baseCost, Minor(promised?.Budget, digits), Samples.MeanOfParts),
            Joint(Samples.Finishes, Samples.Costs, promised, digits));
    }
}
