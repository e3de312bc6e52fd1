using Portfolio.Engine.Inputs;

namespace Portfolio.Engine.Runs;

/// <summary>One run of a plan: chunks of iterations are taken by threads as they come free; each writes its own slots of its block.</summary>
internal sealed class PlanRun
{
    private const int LargestChunk = 1024, SmallestChunk = 64;
    private const int ChunksPerThread = 2;    // at least, so that threads end together
    private const int RowBytes = 160 << 20;   // most that the schedule rows of a thread take; only with pools do they come near

    private readonly Plan _plan;
    private readonly ulong _seed;
    private readonly long _first;
    private readonly int _count;
    private readonly RunOptions _options;
    private readonly Action<BlockSamples> _sink;
    private readonly int _chunk;
    private readonly BlockSamples?[] _blocks;
    private readonly int[] _left; // [block] iterations still to do
    private int _next; // next chunk to take
    private int _done;

    public PlanRun(Plan plan, ulong seed, long first, int count, RunOptions options, Action<BlockSamples> sink)
    {
        ArgumentOutOfRangeException.ThrowIfNegative(first);
        ArgumentOutOfRangeException.ThrowIfLessThan(count, 1);
        if (first % BlockSamples.Size != 0)
            throw new ArgumentOutOfRangeException(nameof(first), "A run begins at a block.");
        (_plan, _seed, _first, _count, _options, _sink) = (plan, seed, first, count, options, sink);
        _chunk = ChunkSize(plan.Layout.Rows, count, options.Threads);
        var blocks = (count + BlockSamples.Size - 1) / BlockSamples.Size;
        _blocks = new BlockSamples?[blocks];
        _left = [.. Enumerable.Range(0, blocks).Select(InBlock)];
    }

    public void Work(CancellationToken cancellation) =>
        EngineThreads.Work(Math.Max(1, Math.Min(_options.Threads, (_count + _chunk - 1) / _chunk)), stop => WorkChunks(stop), cancellation);

    // A power of two that divides a block: long enough that what is made once per row and chunk, such as a table, is made seldom.
    private static int ChunkSize(int rows, int count, int threads)
    {
        var size = LargestChunk;
        while (size > SmallestChunk && ((long)size * rows * sizeof(int) > RowBytes || (long)size * threads * ChunksPerThread > count))
            size /= 2;
        return size;
    }

    private void WorkChunks(CancellationToken stop)
    {
        var inputs = new DrawnInputs(_plan.Network, _plan.Estimates, _plan.Events, _plan.Forks, _plan.Dependence, _plan.Drivers, _chunk);
        var outcomes = new Outcomes(_plan, inputs, _chunk);
        while (!stop.IsCancellationRequested)
        {
            var from = (long)(Interlocked.Increment(ref _next) - 1) * _chunk;
            if (from >= _count)
                return;
            var count = (int)Math.Min(_chunk, _count - from);
            inputs.Begin(_seed, _first + from, count);
            Store(outcomes, (int)from, count);
        }
    }

    private void Store(Outcomes outcomes, int from, int count)
    {
        var block = from / BlockSamples.Size;
        var offset = from - block * BlockSamples.Size;
        var samples = Block(block);
        outcomes.Work(samples, offset);
        if (Interlocked.Add(ref _left[block], -count) == 0)
        {
            _blocks[block] = null;
            _sink(samples);
        }
        _options.Progress?.Invoke(Interlocked.Add(ref _done, count));
    }

    private BlockSamples Block(int block)
    {
        lock (_blocks)
        {
            var number = checked((int)(_first / BlockSamples.Size)) + block;
            return _blocks[block] ??= new BlockSamples(number, InBlock(block), _plan.Network.Projects.Count, _plan.Milestones.Count);
        }
    }

    private int InBlock(int block) => Math.Min(BlockSamples.Size, _count - block * BlockSamples.Size);
}
