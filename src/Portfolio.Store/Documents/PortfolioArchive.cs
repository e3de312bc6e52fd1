using Portfolio.Store.Access;
using Portfolio.Store.Audit;
using Portfolio.Store.Deliveries;
using Portfolio.Store.Outbox;
using Portfolio.Store.Runs;

namespace Portfolio.Store.Documents;

/// <summary>The answer to archiving.</summary>
/// <param name="Entry">The portfolio as it is now; null unless accepted or unchanged.</param>
/// <param name="Refusal">What the condition said.</param>
public sealed record ArchiveResult(WriteOutcome Outcome, PortfolioEntry? Entry = null, object? Refusal = null);

/// <summary>Closes a portfolio for good: it stays readable, takes no more writes or runs, and its id is not used again.</summary>
public sealed class PortfolioArchive(Database database)
{
    /// <summary>Needs <see cref="Right.Admin"/> on the whole portfolio. A second time changes nothing.</summary>
    /// <param name="condition">Looks at what is there; what it returns refuses the archiving.</param>
    /// <param name="joining">Called last inside the transaction with the portfolio as it then is; null for none.</param>
    public Task<ArchiveResult> ArchiveAsync(
        Caller caller, string portfolio, Func<Head, object?> condition,
        Func<StoreTransaction, PortfolioEntry, CancellationToken, Task>? joining, CancellationToken cancellation) => database.WriteAsync(
        async open =>
        {
            var standing = await Standing.ReadAsync(open, caller, Right.Admin, portfolio);
            if (!standing.Exists || !standing.Known)
                return new ArchiveResult(WriteOutcome.NotFound);
            if (!standing.Whole)
                return new ArchiveResult(WriteOutcome.Forbidden);
            if (condition((await Head.FindAsync(open, portfolio))!) is { } refusal)
                return new ArchiveResult(WriteOutcome.Refused, Refusal: refusal);
            if (!standing.Archived)
                await CloseAsync(open, caller, portfolio);
            var entry = (await DocumentStore.FindEntryAsync(open, caller, portfolio))!;
            if (joining is not null)
                await joining(open, entry, cancellation);
            return new ArchiveResult(standing.Archived ? WriteOutcome.Unchanged : WriteOutcome.Accepted, entry);
        },
        cancellation);

    private const string ArchiveSql = "update portfolio set archived_at = @Now where id = @Portfolio";

    private const string ScheduleOffSql = "update schedule set enabled = 0, changed_at = @Now where portfolio = @Portfolio and enabled = 1";

    private static async Task CloseAsync(StoreTransaction open, Caller caller, string portfolio)
    {
        await open.ExecuteAsync(ArchiveSql, new { Portfolio = portfolio, open.Now });
        await open.ExecuteAsync(ScheduleOffSql, new { Portfolio = portfolio, open.Now });
        await OpenRuns.StopAsync(open, caller, portfolio);
        await OpenDeliveries.StopAsync(open, portfolio);
        await AuditChain.AppendAsync(open, caller.KeyId, "portfolio.archive", $"portfolios/{portfolio}", new { });
        await OutboxStore.AppendAsync(open, portfolio, "portfolio.archived", portfolio, new { });
    }
}
