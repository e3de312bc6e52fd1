namespace Portfolio.Engine.Pools;

/// <summary>Binary heap of locals by instant, equal instants by local. Flat, of fixed capacity.</summary>
internal sealed class InstantHeap(int capacity)
{
    private readonly long[] _keys = new long[capacity]; // instant in the upper half, local in the lower

    public int Count { get; private set; }

    /// <summary>The earliest instant; only when not empty.</summary>
    public int Instant => (int)(_keys[0] >> 32);

    public void Clear() => Count = 0;

    public void Push(int instant, int local)
    {
        var key = ((long)instant << 32) | (uint)local;
        var i = Count++;
        while (i > 0 && _keys[(i - 1) / 2] > key)
        {
            _keys[i] = _keys[(i - 1) / 2];
            i = (i - 1) / 2;
        }
        _keys[i] = key;
    }

    /// <summary>Takes the local of the earliest instant.</summary>
    public int Pop()
    {
        var top = _keys[0];
        var key = _keys[--Count];
        var i = 0;
        while (2 * i + 1 < Count)
        {
            var child = 2 * i + 1;
            if (child + 1 < Count && _keys[child + 1] < _keys[child])
                child++;
            if (_keys[child] >= key)
                break;
            _keys[i] = _keys[child];
            i = child;
        }
        _keys[i] = key;
        return (int)(uint)top;
    }
}
