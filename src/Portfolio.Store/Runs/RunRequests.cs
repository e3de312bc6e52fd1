using Portfolio.Store.Access;

namespace Portfolio.Store.Runs;

/// <summary>Asking for runs, and asking them to stop. Each answer is one transaction with its audit entry and outbox row.</summary>
public sealed class RunRequests(Database database)
{
    /// <summary>Queues a run that somebody asked for. Needs <see cref="Right.Manage"/>.</summary>
    /// <param name="joining">Called last inside the transaction, for rows that stand or fall with the request; null for none.</param>
    public Task<RunRequestResult> CreateAsync(
        Caller caller, NewRun run, Func<StoreTransaction, StoredRun, CancellationToken, Task>? joining, CancellationToken cancellation) =>
        throw new NotSupportedException(database.ToString());

    /// <summary>
    /// Queues the one run of a due date; a second time it returns the first. When the date is closed and held already the run is made all the same, but not recorded.
    /// </summary>
    public Task<RunRequestResult> CreateDueAsync(Caller caller, NewRun run, DateOnly dueDate, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>Asks a run to stop: a queued one is cancelled at once, a running one by its worker.</summary>
    /// <returns>The run after the request; null when the caller may not see it. An ended run comes back unchanged (409).</returns>
    public Task<RunCancelResult> RequestCancelAsync(Caller caller, string portfolio, string run, CancellationToken cancellation) => throw new NotSupportedException();
}

/// <summary>How asking a run to stop ended.</summary>
public enum RunCancelOutcome
{
    Accepted,
    NotFound,
    Forbidden,
    AlreadyEnded,
}

public sealed record RunCancelResult(RunCancelOutcome Outcome, StoredRun? Run);
