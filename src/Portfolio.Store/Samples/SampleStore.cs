using Portfolio.Store.Access;
using Portfolio.Store.Runs;

namespace Portfolio.Store.Samples;

/// <summary>The outcomes of single iterations, block by block.</summary>
public sealed class SampleStore(Database database)
{
    // Touches the row, so that in any database nobody can claim the run before this transaction has ended.
    private const string GuardSql = "update run set fence = fence where id = @Id and fence = @Fence and state = 'running'";

    private const string InsertBlockSql = """
        insert into run_block (run, block, iterations) values (@Run, @Block, @Iterations) on conflict (run, block) do nothing
        """;

    private const string InsertSql = """
        insert into sample (run, block, series, codec, bytes, checksum) values (@Run, @Block, @Series, @Codec, @Bytes, @Checksum)
        """;

    /// <summary>Stores one block of a run in one transaction. A block that is there already is left alone.</summary>
    /// <param name="block">0, 1, 2 … in the order of iterations.</param>
    /// <param name="iterations">How many iterations the block covers: the length of every series.</param>
    /// <returns>False when the lease was lost; then nothing is written.</returns>
    public Task<bool> WriteBlockAsync(
        RunLease held, int block, int iterations, IReadOnlyList<SeriesBlock> series, CancellationToken cancellation)
    {
        // Summed before the write lock is taken, which others wait for.
        SampleRow[] rows = [.. series.Select(one => SampleRow.Of(held.Run.Id, block, one))];
        return database.WriteAsync(
            async open =>
            {
                if (await open.ExecuteAsync(GuardSql, new { held.Run.Id, held.Fence }) == 0)
                    return false;
                if (await open.ExecuteAsync(InsertBlockSql, new { Run = held.Run.Id, Block = block, Iterations = iterations }) == 0)
                    return true;
                await open.ExecuteEachAsync(InsertSql, rows);
                return true;
            },
            cancellation);
    }

    private const string BlocksSql = "select block from run_block where run = @Id order by block";

    /// <summary>The blocks that need not be worked again, rising.</summary>
    public async Task<IReadOnlyList<int>> ListBlocksAsync(RunLease held, CancellationToken cancellation) =>
        await database.ReadAsync(open => open.ListAsync<int>(BlocksSql, new { held.Run.Id }), cancellation);

    private const string SeriesSql = """
        select run, block, series, codec, bytes, checksum from sample where run = @Id and series in (@Keys) order by series, block
        """;

    /// <summary>Several series of a run that is worked, by name; those that are not kept are left out.</summary>
    /// <exception cref="StoreDamagedException">Stored bytes are not the ones that were written.</exception>
    public async Task<IReadOnlyDictionary<string, KeptSeries>> ReadSeriesAsync(
        RunLease held, IReadOnlyList<string> series, CancellationToken cancellation)
    {
        var rows = await database.ReadAsync(
            open => open.ListOfAsync<SampleRow>(SeriesSql, series, new { held.Run.Id }), cancellation);
        rows.ForEach(row => row.Check());
        return rows.GroupBy(row => row.Series).ToDictionary(kept => kept.Key, kept => new KeptSeries([.. kept]), StringComparer.Ordinal);
    }

    /// <summary>
    /// A series written with <see cref="SeriesBlock.OfMinutes"/>, over all blocks in order; null when it is not kept or not the caller's to
    /// read.
    /// </summary>
    /// <exception cref="StoreDamagedException">Stored bytes are not the ones that were written.</exception>
    public async Task<int[]?> ReadMinutesAsync(Caller caller, string portfolio, string run, string series, CancellationToken cancellation)
    {
        var rows = await ReadAsync(caller, portfolio, run, series, cancellation);
        return rows.Count == 0 ? null : new KeptSeries(rows).ToMinutes();
    }

    /// <summary>
    /// A series written with <see cref="SeriesBlock.OfMoney"/>, over all blocks in order; null when it is not kept or not the caller's to
    /// read.
    /// </summary>
    /// <exception cref="StoreDamagedException">Stored bytes are not the ones that were written.</exception>
    public async Task<double[]?> ReadMoneyAsync(Caller caller, string portfolio, string run, string series, CancellationToken cancellation)
    {
        var rows = await ReadAsync(caller, portfolio, run, series, cancellation);
        return rows.Count == 0 ? null : new KeptSeries(rows).ToMoney();
    }

    private static readonly string ReadSql = $"""
        select s.run, s.block, s.series, s.codec, s.bytes, s.checksum from sample s join run r on r.id = s.run
        where s.run = @Run and s.series = @Series and r.portfolio = @Portfolio and {Granted.Part(Right.Read, "@Portfolio", "@Project")}
        order by s.block
        """;

    private async Task<List<SampleRow>> ReadAsync(
        Caller caller, string portfolio, string run, string series, CancellationToken cancellation)
    {
        var project = SeriesNames.ProjectOf(series);
        var rows = await database.ReadAsync(
            open => open.ListAsync<SampleRow>(
                ReadSql, new { Caller = caller.KeyId, open.Now, Portfolio = portfolio, Run = run, Series = series, Project = project }),
            cancellation);
        rows.ForEach(row => row.Check());
        return rows;
    }
}
