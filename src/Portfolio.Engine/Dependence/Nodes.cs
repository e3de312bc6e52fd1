using Portfolio.Engine.Draws;
using Portfolio.Model.Documents;

namespace Portfolio.Engine.Dependence;

/// <summary>
/// Everything that dependence can tie, by its key: drivers, then projects, each by id (<see cref="Keys"/>), and the common factors: the
/// portfolio,
/// then the programmes by id (<see cref="Factors"/>). <see cref="Loadings"/>[node][factor] is what the node carries of each factor.
/// Pairs that name something unknown are passed over: the rules of the model report them.
/// </summary>
internal sealed class Nodes
{
    public required string[] Keys { get; init; }

    public required string[] Factors { get; init; }

    public required double[][] Loadings { get; init; }

    /// <summary>Pairs of two nodes, first &lt; second in the order of <see cref="Keys"/>, with the normal-score correlation.</summary>
    public required IReadOnlyList<NodePair> Pairs { get; init; }

    /// <summary>Correlation that the common factors alone give two nodes.</summary>
    public double Implied(int i, int j)
    {
        var sum = 0.0;
        for (var f = 0; f < Factors.Length; f++)
            sum += Loadings[i][f] * Loadings[j][f];
        return sum;
    }

    public static Nodes Of(Settings settings, IReadOnlyList<Project> projects)
    {
        string[] drivers = [.. settings.Drivers.Select(d => DrawKey.Driver(d.Id)).Distinct().Order(StringComparer.Ordinal)];
        string[] keys = [.. drivers, .. projects.Select(p => DrawKey.Project(p.Id)).Distinct().Order(StringComparer.Ordinal)];
        string[] factors =
        [
            DrawKey.Portfolio,
            .. projects.Where(p => p.Programme is not null).Select(p => DrawKey.Programme(p.Programme!))
                .Distinct().Order(StringComparer.Ordinal),
        ];
        var (node, factor) = (Index(keys), Index(factors));
        var loadings = Array.ConvertAll(keys, _ => new double[factors.Length]);
        LoadProjects(settings.Dependence, projects, node, factor, loadings);
        var pairs = new List<NodePair>();
        foreach (var pair in settings.Dependence.Pairs)
        {
            var (first, second) = factor.ContainsKey(pair.First) ? (pair.Second, pair.First) : (pair.First, pair.Second);
            if (!node.TryGetValue(first, out var i))
                continue;
            if (factor.TryGetValue(second, out var f) && i < drivers.Length)
                loadings[i][f] = RankCorrelation.ToNormal(pair.Rank);
            else if (node.TryGetValue(second, out var j) && i != j)
                pairs.Add(new NodePair(Math.Min(i, j), Math.Max(i, j), RankCorrelation.ToNormal(pair.Rank)));
        }

        return new Nodes { Keys = keys, Factors = factors, Loadings = loadings, Pairs = pairs };
    }

    private static void LoadProjects(
        Model.Documents.Dependence dependence, IReadOnlyList<Project> projects, Dictionary<string, int> node,
        Dictionary<string, int> factor, double[][] loadings)
    {
        var between = RankCorrelation.ToNormal(dependence.BetweenProjects);
        var within = RankCorrelation.ToNormal(dependence.WithinProgramme ?? dependence.BetweenProjects);
        foreach (var project in projects)
        {
            var loading = loadings[node[DrawKey.Project(project.Id)]];
            loading[0] = Math.Sqrt(between);
            if (project.Programme is { } programme)
                loading[factor[DrawKey.Programme(programme)]] = Math.Sqrt(Math.Max(within - between, 0));
        }
    }

    private static Dictionary<string, int> Index(string[] keys) =>
        keys.Select((key, i) => (key, i)).ToDictionary(x => x.key, x => x.i, StringComparer.Ordinal);
}

/// <summary>Two nodes tied by a stated correlation of their normal scores.</summary>
internal readonly record struct NodePair(int First, int Second, double Correlation);
