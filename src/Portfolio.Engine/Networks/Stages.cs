namespace Portfolio.Engine.Networks;

/// <summary>
/// Splits a network at the pools. What no pool can move and what only follows (<see cref="After"/>) is worked row
/// by row over all iterations of a chunk; only what lies between (<see cref="Dispatched"/>) needs the dispatcher, one iteration at a time.
/// </summary>
internal sealed class Stages
{
    private readonly byte[] _stage; // 0 before, 1 dispatched, 2 after

    private Stages(byte[] stage, Network network)
    {
        _stage = stage;
        First = [.. network.Order.Where(a => stage[a] != 2)];
        Dispatched = [.. network.Order.Where(a => stage[a] == 1)];
        After = [.. network.Order.Where(a => stage[a] == 2)];
    }

    /// <summary>What is placed before the dispatcher works and what is made ready for it, predecessors first.</summary>
    public int[] First { get; }

    public int[] Dispatched { get; }

    public int[] After { get; }

    public bool IsBefore(int activity) => _stage[activity] == 0;

    public bool IsDispatched(int activity) => _stage[activity] == 1;

    public static Stages Of(Network network)
    {
        var draws = new bool[network.Count];
        for (var a = 0; a < network.Count; a++)
            draws[a] = !network.Finished(a) && network.Activities[a].Demands.Count > 0;
        var afterPool = Reach(network, draws, forward: true);
        var beforePool = Reach(network, draws, forward: false);
        var stage = new byte[network.Count];
        for (var a = 0; a < network.Count; a++)
            stage[a] = (byte)(!afterPool[a] ? 0 : beforePool[a] ? 1 : 2);
        return new Stages(stage, network);
    }

    /// <summary>Everything that is not finished goes to the dispatcher; for the sequence in which the base values start.</summary>
    public static Stages Whole(Network network) =>
        new([.. Enumerable.Range(0, network.Count).Select(a => (byte)(network.Finished(a) ? 0 : 1))], network);

    // Activities that draw on a pool, and what follows them (forward) or comes before them; finished work passes nothing on.
    private static bool[] Reach(Network network, bool[] draws, bool forward)
    {
        var reached = (bool[])draws.Clone();
        for (var i = 0; i < network.Count; i++)
        {
            var activity = network.Order[forward ? i : network.Count - 1 - i];
            if (network.Finished(activity))
                continue;
            if (forward)
            {
                foreach (ref readonly var link in network.LinksOf(activity))
                    reached[activity] |= reached[link.Predecessor];
            }
            else
            {
                foreach (var successor in network.SuccessorsOf(activity))
                    reached[activity] |= reached[successor] && !network.Finished(successor);
            }
        }
        return reached;
    }
}
