using Portfolio.Engine.Calendars;
using Portfolio.Engine.Networks;

namespace Portfolio.Engine.Pools;

/// <summary>
/// The part of a network that pools can move, in local indices, predecessors first. Work with demands has a rank, its place in the order in
/// which pools serve it (contract section 4, item 7). Immutable.
/// </summary>
internal sealed class PoolNetwork
{
    private const double Rounding = 1e-9; // of sums of fractional units

    public required Network Network { get; init; }

    public required SharedPool[] Pools { get; init; }

    /// <summary>[local] activity.</summary>
    public required int[] Activity { get; init; }

    /// <summary>[local] place in the order, or −1 without demands.</summary>
    public required int[] Rank { get; init; }

    /// <summary>[rank] local.</summary>
    public required int[] ByRank { get; init; }

    public required WorkTime[] Calendar { get; init; }

    /// <summary>[local] demands <c>DemandStart[l] …</c> of <see cref="Demands"/>.</summary>
    public required int[] DemandStart { get; init; }

    public required PoolDemand[] Demands { get; init; }

    /// <summary>[pool] fewest units that any work asks for.</summary>
    public required double[] Smallest { get; init; }

    /// <summary>[local] links from other locals; those from work before the pools are in the earliest start already.</summary>
    public required int[] LinkStart { get; init; }

    public required NetworkLink[] Links { get; init; }

    public required int[] SuccessorStart { get; init; }

    /// <summary>Local successors, one entry per link.</summary>
    public required int[] Successors { get; init; }

    /// <summary>Locals without links from other locals, in document order.</summary>
    public required int[] Roots { get; init; }

    /// <summary>[local] the project's priority; 1 is served first.</summary>
    public required int[] Priority { get; init; }

    /// <summary>[local] base length, minutes.</summary>
    public required int[] BaseMinutes { get; init; }

    /// <summary>
    /// [local] for work under way the first working instant from the status date on; nothing holds it back when it can resume then.
    /// </summary>
    public required int[] Resumes { get; init; }

    /// <summary>Instants at which the capacity of a pool changes, rising.</summary>
    public required (int Instant, int Pool)[] CapacityChanges { get; init; }

    public int Count => Activity.Length;

    /// <summary>How many have demands.</summary>
    public int Demanding => ByRank.Length;

    public bool Started(int local) => Resumes[local] != int.MinValue;

    public ReadOnlySpan<PoolDemand> DemandsOf(int local) => Demands.AsSpan(DemandStart[local]..DemandStart[local + 1]);

    public ReadOnlySpan<NetworkLink> LinksOf(int local) => Links.AsSpan(LinkStart[local]..LinkStart[local + 1]);

    public ReadOnlySpan<int> SuccessorsOf(int local) => Successors.AsSpan(SuccessorStart[local]..SuccessorStart[local + 1]);

    /// <summary>True when the pool's smallest demand fits beside the units in use, this instant at least.</summary>
    public bool HasRoom(int pool, int now, double used) => used + Smallest[pool] <= Pools[pool].Lowest(now, now) + Rounding;

    /// <summary>True when the units fit beside those in use from t to the end of the base length.</summary>
    public bool Fits(int local, int t, double[] used)
    {
        var end = int.MinValue;
        foreach (ref readonly var demand in DemandsOf(local))
        {
            var pool = Pools[demand.Pool];
            if (end == int.MinValue && pool.Changes)
                end = Calendar[local].Add(t, BaseMinutes[local]);
            if (used[demand.Pool] + demand.Units > pool.Lowest(t, end) + Rounding)
                return false;
        }
        return true;
    }
}

/// <summary>Units of a pool, by its index.</summary>
internal readonly record struct PoolDemand(int Pool, double Units);
