using Portfolio.Store.Access;
using Portfolio.Store.Runs;

namespace Portfolio.Store.Samples;

/// <summary>The outcomes of single iterations, block by block.</summary>
public sealed class SampleStore(Database database)
{
    /// <summary>Stores one block of a run in one transaction. A block that is there already is left alone.</summary>
    /// <param name="block">0, 1, 2 … in the order of iterations.</param>
    /// <param name="iterations">How many iterations the block covers: the length of every series.</param>
    /// <returns>False when the lease was lost; then nothing is written.</returns>
    public Task<bool> WriteBlockAsync(RunLease held, int block, int iterations, IReadOnlyList<SeriesBlock> series, CancellationToken cancellation) =>
        throw new NotSupportedException(database.ToString());

    /// <summary>The blocks that need not be worked again, rising.</summary>
    public Task<IReadOnlyList<int>> ListBlocksAsync(RunLease held, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>Names of the series of a run, by name, as far as the caller may read them.</summary>
    public Task<IReadOnlyList<string>> ListSeriesAsync(Caller caller, string portfolio, string run, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>A series written with <see cref="SeriesBlock.OfMinutes"/>, over all blocks in order; null when it is not kept or not the caller's to read.</summary>
    /// <exception cref="StoreDamagedException">Stored bytes are not the ones that were written.</exception>
    public Task<int[]?> ReadMinutesAsync(Caller caller, string portfolio, string run, string series, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>A series written with <see cref="SeriesBlock.OfMoney"/>, over all blocks in order; null when it is not kept or not the caller's to read.</summary>
    /// <exception cref="StoreDamagedException">Stored bytes are not the ones that were written.</exception>
    public Task<double[]?> ReadMoneyAsync(Caller caller, string portfolio, string run, string series, CancellationToken cancellation) => throw new NotSupportedException();
}
