using Portfolio.Engine.Runs;
using Portfolio.Server.Results;
using Portfolio.Server.Telemetry;
using Portfolio.Store.Documents;
using Portfolio.Store.Runs;
using Portfolio.Store.Samples;

namespace Portfolio.Server.Jobs;

/// <summary>
/// The work on one claimed run: the missing blocks, then the results. Safe to begin again at any point: blocks that are stored are kept.
/// </summary>
internal sealed class RunAttempt(DocumentStore documents, SampleStore samples, RunProgress progress, int threads)
{
    /// <summary>Works all blocks that are missing, stores them as they are finished, and builds what the run leaves behind.</summary>
    /// <exception cref="RunFailed">It cannot succeed.</exception>
    /// <exception cref="LeaseLost">Another worker has it.</exception>
    public async Task<RunResult> WorkAsync(RunLease held, CancellationToken cancellation)
    {
        FrozenRevision revision;
        using (ServerTelemetry.Spans.StartActivity("run.compile"))
            revision = await FrozenRevision.ReadAsync(documents, held.Run, cancellation);
        var gaps = BlockGaps.Of(held.Run.Iterations, await samples.ListBlocksAsync(held, cancellation));
        if (gaps.Count > 0)
            await WorkBlocksAsync(held, revision, gaps, cancellation);
        using (ServerTelemetry.Spans.StartActivity("run.result"))
            return await EngineThreads.RunAsync(() => FinishedRun.Build(
                revision.Plan, SamplesAhead.Of(samples, held, revision.Plan), Facts(held.Run, revision), cancellation));
    }

    private async Task WorkBlocksAsync(RunLease held, FrozenRevision revision, IReadOnlyList<BlockGap> gaps, CancellationToken cancellation)
    {
        using var stop = CancellationTokenSource.CreateLinkedTokenSource(cancellation);
        var storing = new BlockStoring(samples, held, revision.Plan);
        var stored = storing.StoreAsync(stop.Token);
        var worked = EngineThreads.RunAsync(() => Simulate(held.Run, revision, gaps, storing, stop.Token));
        // Whichever fails first ends the other; its exception is the one that matters.
        var first = await Task.WhenAny(stored, worked);
        if (!first.IsCompletedSuccessfully)
            await stop.CancelAsync();
        await Task.WhenAll(stored, worked).ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
        cancellation.ThrowIfCancellationRequested();
        await first;
        await Task.WhenAll(stored, worked);
    }

    private bool Simulate(
        StoredRun run, FrozenRevision revision, IReadOnlyList<BlockGap> gaps, BlockStoring storing, CancellationToken cancellation)
    {
        try
        {
            var before = run.Iterations - gaps.Sum(gap => gap.Count);
            foreach (var gap in gaps)
            {
                var done = before;
                var options = new RunOptions(threads, worked => progress.Report(run.Id, done + worked));
                revision.Plan.Run(run.Seed, gap.First, gap.Count, options, block => storing.Add(block, cancellation), cancellation);
                before += gap.Count;
            }
            return true;
        }
        finally
        {
            storing.Complete();
        }
    }

    private static RunFacts Facts(StoredRun run, FrozenRevision revision) =>
        new(run.Id, run.AsOf, run.Revision, run.Seed, run.Iterations, revision.PartHashes, run.Overlay);
}
