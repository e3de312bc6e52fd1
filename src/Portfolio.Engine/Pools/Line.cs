using Portfolio.Engine.Inputs;
using Portfolio.Engine.Networks;

namespace Portfolio.Engine.Pools;

/// <summary>
/// The order of rule <c>inOrder</c>: the sequence in which <c>passing</c> starts the base values (contract section 4, item 7).
/// </summary>
internal static class Line
{
    /// <summary>All unfinished activities, by index, given the pool network of <see cref="Stages.Whole"/>.</summary>
    public static int[] OfBase(Network network, PoolNetwork whole, Stages everything, BaseInputs inputs)
    {
        var rows = new ScheduleRows(RowLayout.Full(network.Count), 1);
        var pass = new ForwardPass(network, rows, inputs);
        foreach (var activity in everything.First)
        {
            if (everything.IsDispatched(activity))
            {
                inputs.Durations(activity, rows.Work(activity, 1));
                pass.EarliestStarts(activity, rows.Start(activity, 1), everything);
            }
            else
            {
                pass.Place(activity);
            }
        }
        var sequence = new List<int>(whole.Count);
        new PassingDispatcher(whole, pass, rows) { Sequence = sequence }.Run(1);
        return [.. sequence.Select(l => whole.Activity[l])];
    }

    /// <summary>
    /// The order kept from another plan. Work that it does not name comes after the last of its predecessors, and last when it has none;
    /// where new links contradict the order, predecessors go first.
    /// </summary>
    public static int[] Kept(Network network, IReadOnlyList<ActivityId> order)
    {
        var place = new Dictionary<ActivityId, int>();
        for (var i = 0; i < order.Count; i++)
            place[order[i]] = i;
        var rank = new int[network.Count];
        foreach (var activity in network.Order)
        {
            if (place.TryGetValue(IdOf(network, activity), out rank[activity]))
                continue;
            rank[activity] = network.LinksOf(activity).IsEmpty ? int.MaxValue : -1;
            foreach (ref readonly var link in network.LinksOf(activity))
                rank[activity] = Math.Max(rank[activity], rank[link.Predecessor]);
        }
        return [.. Topology.Order(network, rank).Where(a => !network.Finished(a))];
    }

    public static ActivityId IdOf(Network network, int activity) =>
        new(network.Projects[network.ProjectOf[activity]].Id, network.Activities[activity].Id);
}

/// <summary>An activity by the ids of its project and its own.</summary>
public readonly record struct ActivityId(string Project, string Activity);
