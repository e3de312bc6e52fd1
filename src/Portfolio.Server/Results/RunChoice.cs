using Portfolio.Server.Problems;
using Portfolio.Store.Access;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Results;

/// <summary>Finds the run that a request means and has results.</summary>
internal sealed class RunChoice(RunStore runs)
{
    public const string Latest = "latest";

    /// <param name="run">An id, or <see cref="Latest"/>.</param>
    /// <param name="asOf">With <see cref="Latest"/>: the point of this date or of the nearest earlier one.</param>
    /// <exception cref="RequestRefused">404 when there is none, 409 when it has no results.</exception>
    public async Task<StoredRun> ChooseAsync(Caller caller, string portfolio, string run, DateOnly? asOf, CancellationToken cancellation)
    {
        var found = run != Latest ? await runs.FindAsync(caller, portfolio, run, cancellation)
            : asOf is { } date ? await runs.FindPointAsync(caller, portfolio, date, cancellation)
            : await runs.FindLatestAsync(caller, portfolio, cancellation);
        if (found is null) throw new RequestRefused(Problem.NotFound(Missing(run, asOf)));
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
