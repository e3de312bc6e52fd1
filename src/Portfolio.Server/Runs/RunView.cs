using Portfolio.Server.Contracts.Runs;
using Portfolio.Server.Jobs;
using Portfolio.Server.Results;
using Portfolio.Store.Access;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Runs;

/// <summary>Runs as they are shown, with the progress that only this process knows.</summary>
internal sealed class RunView(RunProgress progress)
{
    public RunJson Of(StoredRun run, Caller caller)
    {
        var shown = RunJson.From(run, progress.Of(run), run.Warnings is null ? null : KeptWarnings.Read(new SeenRun(caller, run)).All);
        // The reason may name projects that a key limited to others must not learn of.
        return run.Error is null || caller.Holds(Right.Read, run.Portfolio)
            ? shown
            : shown with { Error = "The run failed; who reads the whole portfolio is told why." };
    }
}
