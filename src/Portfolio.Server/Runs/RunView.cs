using Portfolio.Server.Contracts.Runs;
using Portfolio.Server.Jobs;
using Portfolio.Server.Results;
using Portfolio.Store.Access;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Runs;

/// <summary>Runs as they are shown, with the progress that only this process knows.</summary>
internal sealed class RunView(RunProgress progress)
{
    public RunJson Of(StoredRun run, Caller caller) =>
        RunJson.From(run, progress.Of(run), run.Warnings is null ? null : KeptWarnings.Read(new SeenRun(caller, run)).All);
}
