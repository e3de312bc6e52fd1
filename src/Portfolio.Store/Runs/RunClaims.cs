using Portfolio.Store.Access;

namespace Portfolio.Store.Runs;

/// <summary>Who works on a run, and for how long.</summary>
public sealed class RunClaims(Database database)
{
    /// <summary>
    /// Takes the next run: one whose lease ran out first, else the oldest of the portfolio that was served longest ago. Null when there is none.
    /// Blocks that another engine version has written are dropped, so that no run mixes two.
    /// </summary>
    /// <param name="owner">Names the worker, for people.</param>
    public Task<RunLease?> ClaimAsync(Caller caller, string owner, string engineVersion, TimeSpan lease, CancellationToken cancellation) =>
        throw new NotSupportedException(database.ToString());

    /// <summary>Asks for more time from now on.</summary>
    public Task<LeaseState> RenewAsync(RunLease held, TimeSpan lease, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>Puts the run back into the queue, keeping its blocks; for a worker that stops in good order. False when the lease was lost.</summary>
    public Task<bool> ReleaseAsync(RunLease held, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>Ends all leases, so that runs go on at once. For the start of a process that has the storage to itself.</summary>
    /// <returns>How many there were.</returns>
    public Task<int> ExpireAllAsync(Caller caller, CancellationToken cancellation) => throw new NotSupportedException();
}
