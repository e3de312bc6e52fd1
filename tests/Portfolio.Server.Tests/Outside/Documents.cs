using Portfolio.Engine;
using Portfolio.Engine.Runs;
using Portfolio.Model.Rules;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Documents;

namespace Portfolio.Server.Tests.Outside;

/// <summary>From the text of a document to a plan and its samples, through the same reading and checking as a request.</summary>
internal static class Documents
{
    public static Plan Compile(byte[] json)
    {
        var valid = new DocumentCheck(ModelLimits.Default).Check(DocumentReader.OfStored.ReadDocument(json), json, out var faults);
        Assert.Empty(faults);
        return Plan.Compile(valid!);
    }

    /// <summary>All samples of a run, in order.</summary>
    public static Samples Run(this Plan plan, long seed, int iterations, int threads = 2)
    {
        var samples = new Samples(plan, iterations);
        plan.Run(seed, 0, iterations, new RunOptions(threads), samples.Take);
        return samples;
    }
}

/// <summary>The samples of a whole run: finishes in minutes since 1970, costs in whole minor units, [row][iteration].</summary>
internal sealed class Samples
{
    public Samples(Plan plan, int iterations)
    {
        Finish = [.. plan.Base.Finish.Select(_ => new int[iterations])];
        Cost = [.. plan.Base.Finish.Select(_ => new double[iterations])];
        Milestone = [.. plan.Base.MilestoneFinish.Select(_ => new int[iterations])];
    }

    public int[][] Finish { get; }

    public double[][] Cost { get; }

    public int[][] Milestone { get; }

    /// <summary>Takes a block of iterations; blocks may come in any order and from several threads.</summary>
    public void Take(BlockSamples block)
    {
        var first = block.Block * BlockSamples.Size;
        for (var p = 0; p < Finish.Length; p++)
        {
            block.Finish[p].CopyTo(Finish[p], first);
            block.Cost[p].CopyTo(Cost[p], first);
        }
        for (var m = 0; m < Milestone.Length; m++)
            block.MilestoneFinish[m].CopyTo(Milestone[m], first);
    }
}
