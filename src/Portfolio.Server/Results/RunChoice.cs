using Portfolio.Server.Http;
using Portfolio.Server.Problems;
using Portfolio.Store.Access;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Results;

/// <summary>Finds the run that a request means: by its id, or as the point of the series.</summary>
internal sealed class RunChoice(RunStore runs)
{
    public const string Latest = "latest";

    /// <summary>Reads the date that may go with <see cref="Latest"/>.</summary>
    public static DateOnly? AsOf(QueryFaults faults, string run, string? asOf)
    {
        if (asOf is not null && run != Latest)
            faults.Add("asOf", "'asOf' goes with the run 'latest', not with a run's id.");
        return faults.Date("asOf", asOf);
    }

    /// <param name="run">An id, or <see cref="Latest"/>.</param>
    /// <param name="asOf">With <see cref="Latest"/>: the point of this date or of the nearest earlier one.</param>
    /// <exception cref="RequestRefused">There is none for this caller (404).</exception>
    public async Task<StoredRun> FindAsync(Caller caller, string portfolio, string run, DateOnly? asOf, CancellationToken cancellation)
    {
        var found = run != Latest ? await runs.FindAsync(caller, portfolio, run, cancellation)
            : asOf is { } date ? await runs.FindPointAsync(caller, portfolio, date, cancellation)
            : await runs.FindLatestAsync(caller, portfolio, cancellation);
        return found ?? throw new RequestRefused(Problem.NotFound(Missing(run, asOf)));
    }

    /// <summary>The same, of runs that have results.</summary>
    /// <exception cref="RequestRefused">404 when there is none, 409 when it has no results.</exception>
    public async Task<StoredRun> WithResultsAsync(
        Caller caller, string portfolio, string run, DateOnly? asOf, CancellationToken cancellation)
    {
        var found = await FindAsync(caller, portfolio, run, asOf, cancellation);
        if (found.State != RunState.Succeeded)
            throw new RequestRefused(Problem.Conflict("run-without-results", "The run has no results", Why(found)));
        return found;
    }

    private static string Missing(string run, DateOnly? asOf) =>
        run != Latest ? "There is no such run."
        : asOf is null ? "No run has become a point of the series yet."
        : "No run stands for this date or an earlier one.";

    private static string Why(StoredRun run) => run.State switch
    {
        RunState.Queued => "The run waits in the queue; its results can be read once it has succeeded.",
        RunState.Running => "The run is being worked; its results can be read once it has succeeded.",
        RunState.Cancelled => "The run was cancelled and left no results.",
        _ => "The run failed and left no results.",
    };
}
