using System.Collections.Concurrent;
using Portfolio.Store.Idempotency;

namespace Portfolio.Server.Idempotency;

/// <summary>
/// The named writes that this process is at work on, so that a second one waits instead of doing the work in vain. Only politeness: which
/// of them counts is decided by the store.
/// </summary>
internal sealed class WritesAtWork(TimeProvider clock)
{
    private readonly ConcurrentDictionary<WriteKey, TaskCompletionSource> ends = new();

    /// <summary>True when nobody else is at work on it; then <see cref="Leave"/> must follow.</summary>
    public bool TryEnter(WriteKey write) =>
        ends.TryAdd(write, new TaskCompletionSource(TaskCreationOptions.RunContinuationsAsynchronously));

    public void Leave(WriteKey write)
    {
        if (ends.TryRemove(write, out var end))
            end.SetResult();
    }

    /// <summary>Waits for the one at work; false when it takes longer.</summary>
    public async Task<bool> EndsAsync(WriteKey write, TimeSpan patience, CancellationToken cancellation)
    {
        if (!ends.TryGetValue(write, out var end))
            return true;
        if (patience <= TimeSpan.Zero)
            return false;
        try
        {
            await end.Task.WaitAsync(patience, clock, cancellation);
            return true;
        }
        catch (TimeoutException)
        {
            return false;
        }
    }
}
