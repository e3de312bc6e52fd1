using Portfolio.Store.Access;

namespace Portfolio.Store.Runs;

/// <summary>Reading runs and the points of the series.</summary>
public sealed class RunStore(Database database)
{
    /// <summary>One run; null when the caller may not see it.</summary>
    public Task<StoredRun?> FindAsync(Caller caller, string portfolio, string run, CancellationToken cancellation) => throw new NotSupportedException(database.ToString());

    /// <summary>Runs, newest first, with sequence numbers below <paramref name="before"/> (null: from the newest).</summary>
    public Task<IReadOnlyList<StoredRun>> ListAsync(Caller caller, string portfolio, long? before, int limit, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>The point with the greatest date.</summary>
    public Task<StoredRun?> FindLatestAsync(Caller caller, string portfolio, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>The point of a date, or of the nearest earlier one.</summary>
    public Task<StoredRun?> FindPointAsync(Caller caller, string portfolio, DateOnly asOf, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>Points in date order between two dates (both included; null: open).</summary>
    public Task<IReadOnlyList<StoredRun>> ListPointsAsync(Caller caller, string portfolio, DateOnly? from, DateOnly? to, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>Scheduled runs, latest due date first.</summary>
    public Task<IReadOnlyList<StoredRun>> ListDueAsync(Caller caller, string portfolio, int limit, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>How many runs wait, over all portfolios that the caller reads.</summary>
    public Task<int> CountQueuedAsync(Caller caller, CancellationToken cancellation) => throw new NotSupportedException();
}
