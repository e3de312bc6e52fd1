using Portfolio.Store.Runs;

namespace Portfolio.Server.Jobs;

/// <summary>
/// Keeps the lease of a run while it is worked, every third of its length and whenever the signal is given, and ends the work when the run
/// is asked to stop or was lost to another worker.
/// </summary>
internal sealed class LeaseWatch : IAsyncDisposable
{
    private readonly RunClaims claims;
    private readonly RunLease held;
    private readonly TimeSpan length;
    private readonly TimeProvider clock;
    private readonly RunSignal signal;
    private readonly SemaphoreSlim nudge = new(0, 1);
    private readonly CancellationTokenSource work;
    private readonly CancellationTokenSource over = new();
    private readonly Task watching;

    /// <param name="stopping">The process wants to end.</param>
    public LeaseWatch(RunClaims claims, RunLease held, TimeSpan length, TimeProvider clock, RunSignal signal, CancellationToken stopping)
    {
        (this.claims, this.held, this.length, this.clock, this.signal) = (claims, held, length, clock, signal);
        work = CancellationTokenSource.CreateLinkedTokenSource(stopping);
        signal.Given += Nudge;
        watching = Task.Run(WatchAsync, CancellationToken.None);
    }

    /// <summary>Cancelled when the work shall end, for whatever reason.</summary>
    public CancellationToken Work => work.Token;

    /// <summary>What was heard last.</summary>
    public LeaseState State { get; private set; } = LeaseState.Held;

    private async Task WatchAsync()
    {
        try
        {
            while (State == LeaseState.Held)
            {
                await NudgedOrDueAsync();
                State = await claims.RenewAsync(held, length, over.Token);
            }
        }
        catch (OperationCanceledException) when (over.IsCancellationRequested)
        {
            return;
        }
        catch
        {
            // A lease that cannot be renewed will run out: others may take the run.
            State = LeaseState.Lost;
            await work.CancelAsync();
            throw;
        }
        await work.CancelAsync();
    }

    private async Task NudgedOrDueAsync()
    {
        using var waiting = CancellationTokenSource.CreateLinkedTokenSource(over.Token);
        var due = Task.Delay(length / 3, clock, waiting.Token);
        var nudged = nudge.WaitAsync(waiting.Token);
        await Task.WhenAny(due, nudged);
        await waiting.CancelAsync();
        over.Token.ThrowIfCancellationRequested();
    }

    private void Nudge()
    {
        try
        {
            nudge.Release();
        }
        catch (SemaphoreFullException)
        {
            // It is about to look already.
        }
    }

    public async ValueTask DisposeAsync()
    {
        signal.Given -= Nudge;
        await over.CancelAsync();
        await watching.ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
        work.Dispose();
        over.Dispose();
    }
}
