namespace Portfolio.Engine.Inputs;

/// <summary>
/// The inputs of a chunk of consecutive iterations: durations, costs and which branch happens. One instance belongs to one thread.
/// Rows are spans with one entry per iteration of the chunk.
/// </summary>
internal abstract class ChunkInputs
{
    /// <summary>Iterations in the chunk.</summary>
    public abstract int Count { get; }

    /// <summary>Branch that happens, by iteration, of a fork.</summary>
    public abstract ReadOnlySpan<int> Picks(int fork);

    /// <summary>Minutes of work of an unfinished activity with drivers and delays; 0 where it does not happen.</summary>
    public abstract void Durations(int activity, Span<int> minutes);

    /// <summary>Adds the cost to go of an unfinished activity, given its minutes of work.</summary>
    public abstract void AddCosts(int activity, ReadOnlySpan<int> minutes, Span<double> cost);

    /// <summary>Adds what a project pays for events and responses.</summary>
    public abstract void AddEventCosts(int project, Span<double> cost);
}
