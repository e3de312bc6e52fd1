using Portfolio.Engine.Draws;
using Portfolio.Engine.Networks;
using Portfolio.Model.Documents;

namespace Portfolio.Engine.Inputs;

/// <summary>The chance branches of all projects, in document order; contract section 4, item 5.</summary>
internal sealed class ForkSet
{
    /// <summary>[fork] the draws' key.</summary>
    public required ulong[] Key { get; init; }

    /// <summary>[fork][branch] cumulative probability, the last exactly 1.</summary>
    public required double[][] Cumulative { get; init; }

    /// <summary>[fork] the branch in the base: the one begun, else the likeliest, ties the first.</summary>
    public required int[] Base { get; init; }

    /// <summary>[fork] true when it is always the base branch, because work on it has started or the input is held.</summary>
    public required bool[] Certain { get; init; }

    public int Count => Key.Length;

    public static ForkSet Build(Network network, Func<string, bool>? held)
    {
        var forks = network.Projects.SelectMany(p => p.ChanceBranches.Select(f => (Project: p, Fork: f))).ToArray();
        var begun = forks.Select(x => Begun(x.Project, x.Fork)).ToArray();
        return new ForkSet
        {
            Key = [.. forks.Select(x => DrawKey.Hash(KeyOf(x.Project, x.Fork)))],
            Cumulative = [.. forks.Select(x => Cumulate(x.Fork))],
            Base = [.. forks.Select((x, i) => begun[i] >= 0 ? begun[i] : Likeliest(x.Fork))],
            Certain = [.. forks.Select((x, i) => begun[i] >= 0 || held?.Invoke(KeyOf(x.Project, x.Fork)) == true)],
        };
    }

    /// <summary>The first branch whose cumulative probability reaches u.</summary>
    public int Pick(int fork, double u)
    {
        var cumulative = Cumulative[fork];
        var branch = 0;
        while (cumulative[branch] < u)
            branch++;
        return branch;
    }

    private static string KeyOf(Project project, ChanceBranches fork) => $"project/{project.Id}/branches/{fork.Id}";

    private static double[] Cumulate(ChanceBranches fork)
    {
        var cumulative = new double[fork.Branches.Count];
        var sum = 0.0;
        for (var b = 0; b < cumulative.Length; b++)
            cumulative[b] = sum += fork.Branches[b].Probability;
        cumulative[^1] = 1;
        return cumulative;
    }

    private static int Begun(Project project, ChanceBranches fork)
    {
        var started = project.Activities.Where(a => a.Started).Select(a => a.Id).ToHashSet(StringComparer.Ordinal);
        for (var b = 0; b < fork.Branches.Count; b++)
        {
            if (fork.Branches[b].Activities.Any(started.Contains))
                return b;
        }
        return -1;
    }

    private static int Likeliest(ChanceBranches fork)
    {
        var best = 0;
        for (var b = 1; b < fork.Branches.Count; b++)
        {
            if (fork.Branches[b].Probability > fork.Branches[best].Probability)
                best = b;
        }
        return best;
    }
}
