using Portfolio.Engine.Calendars;
using Portfolio.Engine.Inputs;
using Portfolio.Engine.Networks;
using Portfolio.Model.Documents;

namespace Portfolio.Engine.Pools;

/// <summary>Lays the dispatched part of a network out as a <see cref="PoolNetwork"/>.</summary>
internal static class PoolNetworkBuilder
{
    public static PoolNetwork Build(Network network, Stages stages, Settings settings, EstimateSet estimates, int[] latestFinish)
    {
        var pools = settings.Pools.Select(p => new SharedPool(p, network.Scale)).ToArray();
        var activity = stages.Dispatched;
        int[] byRank = [.. Enumerable.Range(0, activity.Length).Where(l => network.Activities[activity[l]].Demands.Count > 0)
            .OrderBy(l => network.UnderWay(activity[l]) ? 0 : 1)
            .ThenBy(l => network.Projects[network.ProjectOf[activity[l]]].Priority)
            .ThenBy(l => latestFinish[activity[l]])
            .ThenBy(l => activity[l])];
        var rank = new int[activity.Length];
        Array.Fill(rank, -1);
        for (var r = 0; r < byRank.Length; r++)
            rank[byRank[r]] = r;
        var demands = DemandsOf(network, settings, activity, out var demandStart);
        var links = LinksOf(network, stages, activity, out var linkStart);
        var (successorStart, successors) = SuccessorsOf(linkStart, links);
        WorkTime[] calendars = [.. activity.Select(a => network.Calendar[a]).Distinct()];
        LocalFacts Facts(int l, int a) => new(
            linkStart[l], successorStart[l], demandStart[l], Array.IndexOf(calendars, network.Calendar[a]), rank[l],
            estimates.BaseMinutes[a],
            network.UnderWay(a) ? network.Calendar[a].Begin(network.Status[a]) : int.MinValue, network.Fork[a] >= 0);
        return new PoolNetwork
        {
            Network = network,
            Pools = pools,
            Activity = activity,
            ByRank = byRank,
            Facts = [.. activity.Select((a, l) => Facts(l, a)), new(links.Length, successors.Length, demands.Length, 0, -1, 0, int.MinValue, false)],
            Calendars = calendars,
            Demands = demands,
            Smallest = [.. pools.Select((_, p) => demands.Where(d => d.Pool == p).Select(d => d.Units).DefaultIfEmpty(0).Min())],
            Links = links,
            Successors = successors,
            Roots = [.. Enumerable.Range(0, activity.Length).Where(l => linkStart[l] == linkStart[l + 1]).OrderBy(l => activity[l])],
            CapacityChanges = [.. pools.SelectMany((p, i) => p.From.Skip(1).Select(from => (from, i))).Order()],
        };
    }

    private static PoolDemand[] DemandsOf(Network network, Settings settings, int[] activity, out int[] start)
    {
        var index = settings.Pools.Select((p, i) => (p.Id, i)).ToDictionary(x => x.Id, x => x.i, StringComparer.Ordinal);
        start = new int[activity.Length + 1];
        var demands = new List<PoolDemand>();
        for (var l = 0; l < activity.Length; l++)
        {
            demands.AddRange(network.Activities[activity[l]].Demands.Select(d => new PoolDemand(index[d.Pool], d.Units)));
            start[l + 1] = demands.Count;
        }
        return [.. demands];
    }

    private static NetworkLink[] LinksOf(Network network, Stages stages, int[] activity, out int[] start)
    {
        var local = new int[network.Count];
        for (var l = 0; l < activity.Length; l++)
            local[activity[l]] = l;
        start = new int[activity.Length + 1];
        var links = new List<NetworkLink>();
        for (var l = 0; l < activity.Length; l++)
        {
            foreach (ref readonly var link in network.LinksOf(activity[l]))
            {
                if (stages.IsDispatched(link.Predecessor))
                    links.Add(link with { Predecessor = local[link.Predecessor] });
            }
            start[l + 1] = links.Count;
        }
        return [.. links];
    }

    private static (int[] Start, int[] Successors) SuccessorsOf(int[] linkStart, NetworkLink[] links)
    {
        var n = linkStart.Length - 1;
        var byPredecessor = Enumerable.Range(0, n)
            .SelectMany(l => links[linkStart[l]..linkStart[l + 1]].Select(x => (x.Predecessor, Local: l)))
            .OrderBy(x => x.Predecessor).ToArray();
        var start = new int[n + 1];
        foreach (var (predecessor, _) in byPredecessor)
            start[predecessor + 1]++;
        for (var l = 0; l < n; l++)
            start[l + 1] += start[l];
        return (start, [.. byPredecessor.Select(x => x.Local)]);
    }
}
