namespace Portfolio.Engine.Pools;

/// <summary>
/// The work that waits for its pools: by pool the places in the order, and how many wait of each priority. Behind work that waits, work of a
/// project with a worse priority is hindered; started work that is held back is hindered by started work only, for it stands before all other.
/// </summary>
internal sealed class WaitingWork
{
    private readonly PoolNetwork _pools;
    private readonly RankSet[] _byPool;
    private readonly int[] _priorities;    // distinct, rising
    private readonly int[] _class;         // [local] place of its priority among them
    private readonly int[][] _all, _started; // [pool][class] how many wait
    private readonly int[] _best;          // [pool] lowest class that any waiting work has

    public WaitingWork(PoolNetwork pools)
    {
        _pools = pools;
        _byPool = [.. pools.Pools.Select(_ => new RankSet(pools.Demanding))];
        var priorities = pools.Activity.Select(a => pools.Network.Projects[pools.Network.ProjectOf[a]].Priority).ToArray();
        _priorities = [.. priorities.Distinct().Order()];
        _class = [.. priorities.Select(p => Array.BinarySearch(_priorities, p))];
        _all = [.. pools.Pools.Select(_ => new int[_priorities.Length])];
        _started = [.. pools.Pools.Select(_ => new int[_priorities.Length])];
        _best = new int[pools.Pools.Length];
        Clear();
    }

    public int Count { get; private set; }

    public void Clear()
    {
        Count = 0;
        for (var pool = 0; pool < _byPool.Length; pool++)
        {
            _byPool[pool].Clear();
            Array.Clear(_all[pool]);
            Array.Clear(_started[pool]);
            _best[pool] = _priorities.Length;
        }
    }

    public void Add(int local)
    {
        Count++;
        var priority = _class[local];
        foreach (ref readonly var demand in _pools.DemandsOf(local))
        {
            _byPool[demand.Pool].Add(_pools.Facts[local].Rank);
            _all[demand.Pool][priority]++;
            if (_pools.Started(local))
                _started[demand.Pool][priority]++;
            _best[demand.Pool] = Math.Min(_best[demand.Pool], priority);
        }
    }

    public void Remove(int local)
    {
        Count--;
        var priority = _class[local];
        foreach (ref readonly var demand in _pools.DemandsOf(local))
        {
            var all = _all[demand.Pool];
            _byPool[demand.Pool].Remove(_pools.Facts[local].Rank);
            if (_pools.Started(local))
                _started[demand.Pool][priority]--;
            if (--all[priority] > 0 || _best[demand.Pool] != priority)
                continue;
            while (priority < all.Length && all[priority] == 0)
                priority++;
            (_best[demand.Pool], priority) = (priority, _class[local]);
        }
    }

    /// <summary>The first in the order, at or after a place, that waits for a pool; <see cref="int.MaxValue"/> when none does.</summary>
    public int Next(int pool, int fromRank) => _byPool[pool].Next(fromRank);

    /// <summary>True when work of a project with a better priority waits for the pool before this work.</summary>
    public bool Hinders(int pool, int local)
    {
        if (!_pools.Started(local))
            return _best[pool] < _class[local];
        for (var priority = 0; priority < _class[local]; priority++)
        {
            if (_started[pool][priority] > 0)
                return true;
        }
        return false;
    }
}
