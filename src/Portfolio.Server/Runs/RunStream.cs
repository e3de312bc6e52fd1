using System.Net.ServerSentEvents;
using System.Runtime.CompilerServices;
using Portfolio.Server.Contracts.Runs;
using Portfolio.Server.Jobs;
using Portfolio.Store.Access;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Runs;

/// <summary>The progress of a run as it comes, until it has ended, the client has gone or the server stops.</summary>
internal sealed class RunStream(RunStore runs, RunProgress progress, IHostApplicationLifetime process)
{
    private static readonly TimeSpan Every = TimeSpan.FromMilliseconds(500);

    // Something is said now and then even when nothing changes, so that both ends notice a broken connection.
    private const int SilentRounds = 30;

    public async IAsyncEnumerable<SseItem<RunProgressJson>> FollowAsync(
        Caller caller, StoredRun first, [EnumeratorCancellation] CancellationToken cancellation)
    {
        using var ends = CancellationTokenSource.CreateLinkedTokenSource(cancellation, process.ApplicationStopping);
        RunProgressJson? said = null;
        var silent = 0;
        for (var run = first; run is not null; run = await NextAsync(caller, run, ends.Token))
        {
            var now = new RunProgressJson { Id = run.Id, State = RunWords.State(run.State), Progress = progress.Of(run) };
            if (run.FinishedAt is not null)
            {
                yield return new SseItem<RunProgressJson>(now, "ended");
                yield break;
            }
            if (now == said && ++silent < SilentRounds)
                continue;
            (said, silent) = (now, 0);
            yield return new SseItem<RunProgressJson>(now, "progress");
        }
    }

    /// <summary>The run after a while; null when there is nobody left to tell, or no right to be told.</summary>
    private async Task<StoredRun?> NextAsync(Caller caller, StoredRun run, CancellationToken ends)
    {
        await Task.Delay(Every, ends).ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
        return ends.IsCancellationRequested ? null : await runs.FindAsync(caller, run.Portfolio, run.Id, CancellationToken.None);
    }
}
