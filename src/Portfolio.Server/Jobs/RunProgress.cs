using System.Collections.Concurrent;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Jobs;

/// <summary>How far the runs of this process have come, between the blocks that storage knows of. Thread safe.</summary>
public sealed class RunProgress
{
    private readonly ConcurrentDictionary<string, int> worked = new(StringComparer.Ordinal);

    /// <param name="iterations">Worked so far, stored or not.</param>
    internal void Report(string run, int iterations) => worked.AddOrUpdate(run, iterations, (_, before) => Math.Max(before, iterations));

    internal void Forget(string run) => worked.TryRemove(run, out _);

    /// <summary>Share of the iterations that are worked, 0…1; 1 only when the run has succeeded.</summary>
    public double Of(StoredRun run)
    {
        if (run.State == RunState.Succeeded)
            return 1;
        var iterations = Math.Max(run.IterationsDone, worked.GetValueOrDefault(run.Id));
        // Between the last iteration and the result lies work of its own.
        return Math.Min(0.99, (double)iterations / run.Iterations);
    }
}
