using Portfolio.Store.Access;

namespace Portfolio.Store.Runs;

/// <summary>
/// A claimed run. Every write of a worker carries the fence: once another worker has claimed the run, none of them takes effect.
/// </summary>
/// <param name="Run">The run as it was claimed.</param>
/// <param name="Fence">Rises with every claim of this run.</param>
/// <param name="Caller">Who claimed it.</param>
public sealed record RunLease(StoredRun Run, long Fence, Caller Caller);

/// <summary>What a worker that asks for more time is told.</summary>
public enum LeaseState
{
    Held,
    /// <summary>Held, but somebody asked the run to stop: end it with <see cref="RunEndings.CancelAsync"/>.</summary>
    CancelRequested,
    /// <summary>Another worker has the run, or it has ended: stop, write nothing.</summary>
    Lost,
}
