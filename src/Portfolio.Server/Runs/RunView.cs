using Portfolio.Server.Contracts.Runs;
using Portfolio.Server.Jobs;
using Portfolio.Server.Problems;
using Portfolio.Server.Results;
using Portfolio.Store.Access;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Runs;

/// <summary>Runs as they are shown: found by id or as the latest point, with the progress that only this process knows.</summary>
internal sealed class RunView(RunStore runs, RunProgress progress)
{
    /// <param name="run">An id, or <see cref="RunChoice.Latest"/>.</param>
    /// <param name="asOf">With the latter: the point of this date or of the nearest earlier one.</param>
    /// <exception cref="RequestRefused">There is none for this caller.</exception>
    public async Task<StoredRun> FindAsync(Caller caller, string portfolio, string run, DateOnly? asOf, CancellationToken cancellation)
    {
        if (asOf is not null && run != RunChoice.Latest)
            throw new RequestRefused(Problem.BadRequest("'asOf' goes with 'latest' only."));
        var found = run != RunChoice.Latest ? await runs.FindAsync(caller, portfolio, run, cancellation)
            : asOf is { } date ? await runs.FindPointAsync(caller, portfolio, date, cancellation)
            : await runs.FindLatestAsync(caller, portfolio, cancellation);
        return found
            ?? throw new RequestRefused(Problem.NotFound(
                run == RunChoice.Latest ? "No run stands for a date yet." : "There is no such run."));
    }

    public RunJson Of(StoredRun run, Caller caller) =>
        RunJson.From(run, progress.Of(run), run.Warnings is null ? null : KeptWarnings.Read(new SeenRun(caller, run)).All);
}
