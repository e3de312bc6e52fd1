using System.Diagnostics;
using Microsoft.Extensions.Options;
using Portfolio.Engine;
using Portfolio.Server.Telemetry;
using Portfolio.Store;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;
using Portfolio.Store.Runs;
using Portfolio.Store.Samples;

namespace Portfolio.Server.Jobs;

/// <summary>
/// Works queued runs, and runs whose worker has vanished, one after the other until there are none. Claims first, finishes last; to be
/// woken twice, or killed at any point, does no harm.
/// </summary>
public sealed class RunWorker(
    RunClaims claims, RunEndings endings, DocumentStore documents, SampleStore samples, RunSignal signal, RunProgress progress,
    EventSignal events, RunMeasures measures, TimeProvider clock, IOptions<EngineOptions> options, ILogger<RunWorker> log)
{
    private readonly EngineOptions settings = options.Value;
    private readonly SemaphoreSlim free = new(options.Value.Runs);
    private readonly string owner = $"{Environment.MachineName}/{Environment.ProcessId}";
    private int asked;

    /// <summary>
    /// Works until no run is left. When this process works as many runs as it may already, those who work are told to look again.
    /// </summary>
    /// <param name="stopping">The process ends: the run goes back to the queue and keeps its blocks.</param>
    public async Task WorkAsync(CancellationToken stopping)
    {
        Interlocked.Exchange(ref asked, 1);
        // Asked again after the place is given up: a question that came just before must not be lost.
        while (Volatile.Read(ref asked) == 1 && !stopping.IsCancellationRequested && await free.WaitAsync(0, CancellationToken.None))
        {
            try
            {
                Interlocked.Exchange(ref asked, 0);
                while (!stopping.IsCancellationRequested
                    && await claims.ClaimAsync(Caller.System, owner, Plan.EngineVersion, settings.Lease, stopping) is { } held)
                    await WorkAsync(held, stopping);
            }
            finally
            {
                free.Release();
            }
        }
    }

    private async Task WorkAsync(RunLease held, CancellationToken stopping)
    {
        using var span = ServerTelemetry.RunSpan(held.Run);
        using var scope = log.BeginScope(new Dictionary<string, object> { ["Run"] = held.Run.Id, ["Portfolio"] = held.Run.Portfolio });
        RunLog.Begun(log, held.Run.Id, held.Run.Attempt, held.Run.IterationsDone, held.Run.Iterations);
        var began = clock.GetTimestamp();
        var outcome = await EndAsync(held, stopping);
        progress.Forget(held.Run.Id);
        events.Give();
        measures.Ended(held.Run, outcome, clock.GetElapsedTime(began));
        span?.SetTag("portfolio.outcome", outcome).SetStatus(outcome == "failed" ? ActivityStatusCode.Error : ActivityStatusCode.Ok);
        RunLog.Ended(log, held.Run.Id, outcome);
    }

    /// <summary>Works the run and writes its end in one transaction; says which end it was.</summary>
    private async Task<string> EndAsync(RunLease held, CancellationToken stopping)
    {
        await using var watch = new LeaseWatch(claims, held, settings.Lease, clock, signal, stopping);
        try
        {
            GiveUpAfter(settings.Attempts, held.Run);
            if (held.Run.CancelRequested)
                return await endings.CancelAsync(held, CancellationToken.None) ? "cancelled" : "lost";
            var result = await new RunAttempt(documents, samples, progress, settings.ThreadsOrAll).WorkAsync(held, watch.Work);
            return await endings.SucceedAsync(held, result, CancellationToken.None) ? "succeeded" : "lost";
        }
        catch (Exception) when (watch.State == LeaseState.CancelRequested)
        {
            return await endings.CancelAsync(held, CancellationToken.None) ? "cancelled" : "lost";
        }
        catch (Exception) when (watch.State == LeaseState.Lost)
        {
            return "lost";
        }
        catch (OperationCanceledException) when (stopping.IsCancellationRequested)
        {
            return await claims.ReleaseAsync(held, CancellationToken.None) ? "released" : "lost";
        }
        catch (LeaseLost)
        {
            return "lost";
        }
        catch (StoreUnavailableException full)
        {
            // Nothing can be written about it either: the lease runs out, and the run goes on where it was once the disk takes writes
            // again.
            RunLog.Failed(log, held.Run.Id, full);
            return "lost";
        }
        catch (RunFailed known)
        {
            RunLog.CannotSucceed(log, held.Run.Id, known.Message);
            return await endings.FailAsync(held, known.Message, CancellationToken.None) ? "failed" : "lost";
        }
        catch (Exception failure)
        {
            RunLog.Failed(log, held.Run.Id, failure);
            return await endings.FailAsync(held, Reason(failure), CancellationToken.None) ? "failed" : "lost";
        }
    }

    // A stored block forgives an attempt: a long run that is interrupted often still comes to its end, one that takes the process down
    // with it does not go on for ever.
    private static void GiveUpAfter(int attempts, StoredRun run)
    {
        var blocks = run.IterationsDone / Engine.Runs.BlockSamples.Size;
        if (run.Attempt - blocks > attempts)
            throw new RunFailed($"The server stopped {run.Attempt - 1} times while it worked this run; it is not tried again.");
    }

    private static string Reason(Exception failure) => failure switch
    {
        StoreDamagedException => "Stored iterations of this run are damaged; the run must be made again.",
        _ => "The server met an error while it worked this run. The error is in its log under the run's id.",
    };
}
