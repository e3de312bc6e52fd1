using System.Globalization;
using Portfolio.Model.Documents;
using Portfolio.Model.Faults;

namespace Portfolio.Engine.Dependence;

/// <summary>Whether the stated correlations can exist together; contract section 4, item 1.</summary>
public static class DependenceCheck
{
    private const int PairsNamed = 10;

    /// <summary>
    /// One fault for every connected group of nodes whose correlations contradict each other, none where <c>repair</c> is <c>nearest</c>
    /// and can
    /// help. Pairs that name unknown nodes are passed over; ranks must already be known to lie within their ranges.
    /// </summary>
    /// <param name="settings">What was sent.</param>
    /// <param name="projects">The projects it will stand beside; only ids and programmes are read.</param>
    /// <param name="path">Pointer to <c>dependence</c> in what was sent.</param>
    public static IReadOnlyList<Fault> Check(Settings settings, IReadOnlyList<Project> projects, string path = "/settings/dependence")
    {
        if (settings.Dependence.Pairs.Count == 0)
            return [];
        var nodes = Nodes.Of(settings, projects);
        var groups = Residual.Groups(nodes).Where(group => group.Members.Length > 1 || group.Impossible.Count > 0).ToList();
        var count = groups.Sum(group => group.Members.Length);
        var faults = new List<Fault>();
        foreach (var group in groups)
        {
            if (group.Impossible.Count > 0)
                faults.Add(Fault(path, Loaded(nodes, group)));
            else if (settings.Dependence.Repair == MatrixRepair.Refuse && MatrixCheck.Contradiction(group.Correlations, count) is { } found)
                faults.Add(Fault(path, Contradicting(nodes, group, found.Value, found.Vector)));
        }

        return faults;
    }

    private static Fault Fault(string path, string message) => new(path, "settings", FaultCodes.DependenceNotPositive, message);

    private static string Loaded(Nodes nodes, Residual group) =>
        $"The ranks of {string.Join(", ", group.Impossible.Distinct().Select(node => nodes.Keys[node]))} with the portfolio and its "
        + "programmes leave no room for the other stated ranks.";

    private static string Contradicting(Nodes nodes, Residual group, double value, double[] vector) => string.Create(
        CultureInfo.InvariantCulture,
        $"The stated ranks contradict each other: what the common factors leave has the eigenvalue "
        + $"{value:0.######}. Concerned: {Concerned(nodes, group, vector)}.");

    /// <summary>The pairs that pull the eigenvalue down, the strongest first: vᵢ·vⱼ·cᵢⱼ is their share of vᵀCv.</summary>
    private static string Concerned(Nodes nodes, Residual group, double[] vector)
    {
        var place = group.Members.Select((node, i) => (node, i)).ToDictionary(x => x.node, x => x.i);
        var pulls = nodes.Pairs.Where(pair => place.ContainsKey(pair.First)).Select(pair =>
        {
            var (i, j) = (place[pair.First], place[pair.Second]);
            return (pair, Pull: vector[i] * vector[j] * group.Correlations[i, j]);
        }).OrderBy(x => x.Pull).ToList();
        var named = pulls.Where(x => x.Pull < 0.05 * pulls[0].Pull).Take(PairsNamed);
        return string.Join(", ", named.Select(x => string.Create(
            CultureInfo.InvariantCulture,
            $"{nodes.Keys[x.pair.First]} with {nodes.Keys[x.pair.Second]} ({RankCorrelation.FromNormal(x.pair.Correlation):0.####})")));
    }
}
