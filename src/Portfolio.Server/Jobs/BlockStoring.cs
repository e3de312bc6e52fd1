using System.Diagnostics;
using System.Threading.Channels;
using Portfolio.Engine;
using Portfolio.Engine.Runs;
using Portfolio.Server.Telemetry;
using Portfolio.Store.Runs;
using Portfolio.Store.Samples;

namespace Portfolio.Server.Jobs;

/// <summary>
/// Carries finished blocks from the threads of the engine to the one writer of the store. The queue is short: when the store is slower,
/// the engine waits, and memory stays bounded.
/// </summary>
internal sealed class BlockStoring(SampleStore samples, RunLease held, Plan plan)
{
    private const int Waiting = 2;

    private readonly Channel<PackedBlock> queue =
        Channel.CreateBounded<PackedBlock>(new BoundedChannelOptions(Waiting) { SingleReader = true });

    /// <summary>Called from the engine's own threads, which do the packing, and may wait.</summary>
    public void Add(BlockSamples block, CancellationToken cancellation)
    {
        var waiting = queue.Writer.WriteAsync(new(block.Block, block.Count, [.. Series(block)]), cancellation);
        if (!waiting.IsCompletedSuccessfully)
            waiting.AsTask().GetAwaiter().GetResult();
    }

    /// <summary>No more blocks will come.</summary>
    public void Complete() => queue.Writer.TryComplete();

    /// <summary>Stores blocks until there are no more.</summary>
    /// <exception cref="LeaseLost">The run belongs to another worker now.</exception>
    public async Task StoreAsync(CancellationToken cancellation)
    {
        await foreach (var block in queue.Reader.ReadAllAsync(cancellation))
        {
            using var span = ServerTelemetry.Spans.StartActivity("run.block");
            span?.SetTag("portfolio.run", held.Run.Id).SetTag("portfolio.block", block.Number).SetTag("portfolio.iterations", block.Count);
            if (!await samples.WriteBlockAsync(held, block.Number, block.Count, block.Series, cancellation))
                throw new LeaseLost();
            span?.SetStatus(ActivityStatusCode.Ok);
        }
    }

    private IEnumerable<SeriesBlock> Series(BlockSamples block)
    {
        var projects = plan.Document.Projects;
        for (var p = 0; p < projects.Count; p++)
        {
            if (projects[p].Activities.Count == 0)
                continue;
            yield return SeriesBlock.OfMinutes(SeriesNames.Finish(projects[p].Id), block.Finish[p]);
            yield return SeriesBlock.OfMoney(SeriesNames.Cost(projects[p].Id), block.Cost[p]);
        }
        for (var m = 0; m < plan.Milestones.Count; m++)
        {
            var milestone = plan.Milestones[m];
            var name = SeriesNames.Milestone(projects[milestone.Project].Id, milestone.Activity.Id);
            yield return SeriesBlock.OfMinutes(name, block.MilestoneFinish[m]);
        }
    }

    private sealed record PackedBlock(int Number, int Count, IReadOnlyList<SeriesBlock> Series);
}
