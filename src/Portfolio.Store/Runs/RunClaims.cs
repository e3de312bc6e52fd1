using Portfolio.Store.Access;

namespace Portfolio.Store.Runs;

/// <summary>Who works on a run, and for how long.</summary>
public sealed class RunClaims(Database database)
{
    // A run whose worker vanished goes first; then the portfolio that was served longest ago, so that none starves behind another's queue.
    private static readonly string NextSql = $"""
        select r.id, r.engine_version from run r
        where r.state in ('queued', 'running') and (r.state = 'queued' or r.lease_until <= @Now)
          and {Granted.Whole(Right.Admin, "r.portfolio")}
        order by case r.state when 'running' then 0 else 1 end,
          coalesce((select max(s.started_at) from run s where s.portfolio = r.portfolio), 0), r.sequence
        limit 1
        """;

    // The condition is asked again: where several processes write, another may have been quicker.
    private const string ClaimSql = """
        update run set state = 'running', fence = fence + 1, attempt = attempt + 1, owner = @Owner, lease_until = @LeaseUntil,
          engine_version = @EngineVersion, started_at = coalesce(started_at, @Now)
        where id = @Id and (state = 'queued' or state = 'running' and lease_until <= @Now)
        """;

    private const string ClaimedSql = $"select {RunRow.Columns} from run r where r.id = @Id";

    /// <summary>
    /// Takes the next run: one whose lease ran out first, else the oldest of the portfolio that was served longest ago. Null when there is
    /// none. Blocks that another engine version has written are dropped, so that no run mixes two.
    /// </summary>
    /// <param name="owner">Names the worker, for people.</param>
    public Task<RunLease?> ClaimAsync(
        Caller caller, string owner, string engineVersion, TimeSpan lease, CancellationToken cancellation) => database.WriteAsync(
        async open =>
        {
            if (await open.FirstAsync<RunRow>(NextSql, new { Caller = caller.KeyId, open.Now }) is not { } next)
                return null;
            var claim = new { next.Id, Owner = owner, LeaseUntil = After(open, lease), EngineVersion = engineVersion, open.Now };
            if (await open.ExecuteAsync(ClaimSql, claim) == 0)
                return null;
            if (next.EngineVersion is not null && next.EngineVersion != engineVersion)
                await RunBlocks.DropAsync(open, next.Id);
            var row = (await open.FirstAsync<RunRow>(ClaimedSql, new { next.Id }))!;
            return new RunLease(row.ToRun(), row.Fence, caller);
        },
        cancellation);

    private const string RenewSql = """
        update run set lease_until = @LeaseUntil where id = @Id and fence = @Fence and state = 'running' returning cancel_requested
        """;

    /// <summary>Asks for more time from now on.</summary>
    public Task<LeaseState> RenewAsync(RunLease held, TimeSpan lease, CancellationToken cancellation) => database.WriteAsync(
        async open => await open.FirstAsync<long?>(RenewSql, new { held.Run.Id, held.Fence, LeaseUntil = After(open, lease) }) switch
        {
            null => LeaseState.Lost,
            0 => LeaseState.Held,
            _ => LeaseState.CancelRequested,
        },
        cancellation);

    private const string ReleaseSql = """
        update run set state = 'queued', owner = null, lease_until = null where id = @Id and fence = @Fence and state = 'running'
        """;

    /// <summary>
    /// Puts the run back into the queue, keeping its blocks; for a worker that stops in good order. False when the lease was lost.
    /// </summary>
    public Task<bool> ReleaseAsync(RunLease held, CancellationToken cancellation) =>
        database.WriteAsync(async open => await open.ExecuteAsync(ReleaseSql, new { held.Run.Id, held.Fence }) == 1, cancellation);

    private static readonly string ExpireSql = $"""
        update run set lease_until = @Now where state = 'running' and lease_until > @Now and {Granted.Whole(Right.Admin, "run.portfolio")}
        """;

    /// <summary>Ends all leases, so that runs go on at once. For the start of a process that has the storage to itself.</summary>
    /// <returns>How many there were.</returns>
    public Task<int> ExpireAllAsync(Caller caller, CancellationToken cancellation) =>
        database.WriteAsync(open => open.ExecuteAsync(ExpireSql, new { Caller = caller.KeyId, open.Now }), cancellation);

    private static long After(StoreTransaction open, TimeSpan lease) => open.Now.ToInstant().Add(lease).ToMicroseconds();
}
