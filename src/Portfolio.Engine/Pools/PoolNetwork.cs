using System.Runtime.CompilerServices;
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

    /// <summary>[local] what the dispatchers look up of an activity, together so that it comes in one line of the cache; one entry more.</summary>
    public required LocalFacts[] Facts { get; init; }

    /// <summary>[rank] local.</summary>
    public required int[] ByRank { get; init; }

    /// <summary>The calendars of the locals, each once.</summary>
    public required WorkTime[] Calendars { get; init; }

    public required PoolDemand[] Demands { get; init; }

    /// <summary>[pool] fewest units that any work asks for.</summary>
    public required double[] Smallest { get; init; }

    /// <summary>Links from other locals; those from work before the pools are in the earliest start already.</summary>
    public required NetworkLink[] Links { get; init; }

    /// <summary>Local successors, one entry per link.</summary>
    public required int[] Successors { get; init; }

    /// <summary>Locals without links from other locals, in document order.</summary>
    public required int[] Roots { get; init; }

    /// <summary>Instants at which the capacity of a pool changes, rising.</summary>
    public required (int Instant, int Pool)[] CapacityChanges { get; init; }

    public int Count => Activity.Length;

    /// <summary>How many have demands.</summary>
    public int Demanding => ByRank.Length;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public WorkTime Calendar(int local) => Calendars[Facts[local].Calendar];

    public bool Started(int local) => Facts[local].Resumes != int.MinValue;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public ReadOnlySpan<PoolDemand> DemandsOf(int local)
    {
        var first = Facts[local].FirstDemand;
        return new(Demands, first, Facts[local + 1].FirstDemand - first);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public ReadOnlySpan<NetworkLink> LinksOf(int local)
    {
        var first = Facts[local].FirstLink;
        return new(Links, first, Facts[local + 1].FirstLink - first);
    }

    /// <summary>True when the pool's smallest demand fits beside the units in use, this instant at least.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public bool HasRoom(int pool, int now, double used) => used + Smallest[pool] <= Pools[pool].Lowest(now, now) + Rounding;

    /// <summary>True when the units fit beside those in use from t to the end of the base length.</summary>
    public bool Fits(int local, int t, double[] used)
    {
        var end = int.MinValue;
        foreach (ref readonly var demand in DemandsOf(local))
        {
            var pool = Pools[demand.Pool];
            if (end == int.MinValue && pool.Changes)
                end = Calendar(local).Add(t, Facts[local].BaseMinutes);
            if (used[demand.Pool] + demand.Units > pool.Lowest(t, end) + Rounding)
                return false;
        }
        return true;
    }
}

/// <summary>
/// An activity that pools can move: its first link, successor and demand (the next entry's are where its own end), its calendar, its place in
/// the order or −1 without demands, its base length in minutes, whether it stands in a chance branch, and for work under way the first working instant from the status date on (nothing holds it back when it can resume then).
/// </summary>
internal readonly record struct LocalFacts(
    int FirstLink, int FirstSuccessor, int FirstDemand, int Calendar, int Rank, int BaseMinutes, int Resumes, bool Branched);

/// <summary>Units of a pool, by its index.</summary>
internal readonly record struct PoolDemand(int Pool, double Units);
