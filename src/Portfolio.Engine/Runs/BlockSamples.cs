namespace Portfolio.Engine.Runs;

/// <summary>
/// The outcomes of one block of iterations: block b holds iterations b · <see cref="Size"/> …, the last may be shorter. Rows are in
/// document order, one entry per iteration. Finishes are minutes since 1970-01-01, costs whole minor units.
/// </summary>
public sealed class BlockSamples
{
    /// <summary>Iterations in a full block.</summary>
    public const int Size = 4096;

    /// <summary>Finish of a milestone in an iteration in which it does not happen.</summary>
    public const int Absent = int.MinValue;

    internal BlockSamples(int block, int count, int projects, int milestones)
    {
        (Block, Count) = (block, count);
        Finish = Rows<int>(projects, count);
        Cost = Rows<double>(projects, count);
        MilestoneFinish = Rows<int>(milestones, count);
    }

    public int Block { get; }

    public int Count { get; }

    /// <summary>[project][iteration]; of a project without activities all <see cref="Absent"/>.</summary>
    public int[][] Finish { get; }

    /// <summary>[project][iteration].</summary>
    public double[][] Cost { get; }

    /// <summary>[milestone][iteration].</summary>
    public int[][] MilestoneFinish { get; }

    // Every entry is written before the block is handed over.
    private static T[][] Rows<T>(int rows, int count) =>
        [.. Enumerable.Range(0, rows).Select(_ => GC.AllocateUninitializedArray<T>(count))];
}
