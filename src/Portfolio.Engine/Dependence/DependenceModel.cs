using System.Buffers;
using Portfolio.Engine.Draws;
using Portfolio.Model.Documents;

namespace Portfolio.Engine.Dependence;

/// <summary>
/// The joint draw of all drivers' scores and projects' factors: standard normals with the correlations of contract section 4, item 1.
/// A node's score is Σ loading·common factor + Σ L·ε over the nodes of its group. Immutable, safe to share between threads.
/// </summary>
internal sealed class DependenceModel
{
    private readonly ulong[] factorKeys;
    private readonly Group[] groups;
    private readonly int drivers, largest;

    private DependenceModel(ulong[] factorKeys, Group[] groups, int drivers)
    {
        (this.factorKeys, this.groups, this.drivers) = (factorKeys, groups, drivers);
        largest = groups.Select(group => group.Keys.Length).DefaultIfEmpty(0).Max();
    }

    /// <summary>Every pair of nodes whose rank correlation the repair changed; empty without repair.</summary>
    public IReadOnlyList<RankChange> Repaired { get; private init; } = [];

    /// <summary>
    /// Ids of the projects that dependence is stated for but cannot reach, because their own correlation is 0; document order.
    /// </summary>
    public IReadOnlyList<string> WithoutEffect { get; private init; } = [];

    /// <summary>The model of a valid document.</summary>
    /// <exception cref="InvalidOperationException">The correlations contradict each other; <see cref="DependenceCheck"/> says
    /// how.</exception>
    public static DependenceModel Build(Settings settings, IReadOnlyList<Project> projects)
    {
        var nodes = Nodes.Of(settings, projects);
        var residuals = Residual.Groups(nodes);
        var paired = residuals.Where(r => r.Members.Length > 1).Sum(r => r.Members.Length);
        var changes = new List<RankChange>();
        var rows = Rows(nodes, settings.Drivers, projects);
        var groups = new Group[residuals.Count];
        for (var g = 0; g < groups.Length; g++)
        {
            var residual = residuals[g];
            var correlations = Possible(residual, paired, settings.Dependence.Repair);
            if (!ReferenceEquals(correlations, residual.Correlations))
                changes.AddRange(RankChange.Between(nodes, residual, correlations));
            groups[g] = Group.Of(nodes, residual, correlations, rows);
        }

        return new DependenceModel(Array.ConvertAll(nodes.Factors, DrawKey.Hash), groups, settings.Drivers.Count)
        {
            Repaired = changes,
            WithoutEffect = Unreached(nodes, residuals, projects),
        };
    }

    /// <summary>
    /// Scores of <paramref name="count"/> iterations: row k of <paramref name="factors"/> (at k·count) is the factor of the k-th project of
    /// the document,
    /// row k of <paramref name="scores"/> the score of its k-th driver.
    /// </summary>
    public void Scores(ulong seed, long firstIteration, int count, Span<double> factors, Span<double> scores)
    {
        var rented = ArrayPool<double>.Shared.Rent((factorKeys.Length + largest) * count);
        var common = rented.AsSpan(0, factorKeys.Length * count);
        var own = rented.AsSpan(common.Length, largest * count);
        for (var f = 0; f < factorKeys.Length; f++)
            NormalScore.Fill(seed, factorKeys[f], firstIteration, common.Slice(f * count, count));
        foreach (var group in groups)
        {
            for (var i = 0; i < group.Keys.Length; i++)
                NormalScore.Fill(seed, group.Keys[i], firstIteration, own.Slice(i * count, count));
            for (var i = 0; i < group.Keys.Length; i++)
            {
                var row = group.Rows[i];
                var target = row < drivers ? scores.Slice(row * count, count) : factors.Slice((row - drivers) * count, count);
                group.Write(i, common, own, target);
            }
        }

        ArrayPool<double>.Shared.Return(rented);
    }

    private static double[,] Possible(Residual residual, int paired, MatrixRepair repair)
    {
        if (residual.Impossible.Count > 0)
            throw new InvalidOperationException("The loadings of a driver leave no room for its stated ranks.");
        if (residual.Members.Length == 1 || MatrixCheck.Contradiction(residual.Correlations, paired) is not { } found)
            return residual.Correlations;
        return repair == MatrixRepair.Nearest
            ? NearestCorrelation.Of(residual.Correlations)
            : throw new InvalidOperationException($"The stated ranks contradict each other: eigenvalue {found.Value}.");
    }

    /// <summary>Output row of each node: drivers, then projects, in document order.</summary>
    private static int[] Rows(Nodes nodes, IReadOnlyList<Driver> drivers, IReadOnlyList<Project> projects)
    {
        var row = new Dictionary<string, int>(StringComparer.Ordinal);
        foreach (var driver in drivers)
            row.Add(DrawKey.Driver(driver.Id), row.Count);
        foreach (var project in projects)
            row.Add(DrawKey.Project(project.Id), row.Count);
        return Array.ConvertAll(nodes.Keys, key => row[key]);
    }

    private static string[] Unreached(Nodes nodes, IReadOnlyList<Residual> residuals, IReadOnlyList<Project> projects)
    {
        var tied = new HashSet<string>(StringComparer.Ordinal);
        foreach (var residual in residuals)
            tied.UnionWith(residual.Members
                .Where(node => residual.Members.Length > 1 || nodes.Implied(node, node) > 0)
                .Select(node => nodes.Keys[node]));
        return [.. projects.Where(p => p.Correlation is null or 0 && tied.Contains(DrawKey.Project(p.Id))).Select(p => p.Id)];
    }
}
