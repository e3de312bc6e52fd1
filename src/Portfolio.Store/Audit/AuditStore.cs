using Portfolio.Store.Access;
using Portfolio.Store.Outbox;

namespace Portfolio.Store.Audit;

/// <summary>The append-only trail, each entry chained to the one before by SHA-256.</summary>
public sealed class AuditStore(Database database)
{
    /// <summary>Appends within a transaction that somebody else commits.</summary>
    /// <param name="detail">An object that serialises to JSON.</param>
    public Task AppendAsync(StoreTransaction transaction, Caller caller, string action, string @object, object detail) =>
        AuditChain.AppendAsync(transaction, caller.KeyId, action, @object, detail);

    /// <summary>Appends in a transaction of its own.</summary>
    public Task AppendAsync(Caller caller, string action, string @object, object detail, CancellationToken cancellation) =>
        database.WriteAsync(
            async open =>
            {
                await AuditChain.AppendAsync(open, caller.KeyId, action, @object, detail);
                return true;
            },
            cancellation);

    // Microseconds.
    private const long Minute = 60_000_000;

    private static readonly string KnownSql = $"select count(*) from portfolio p where p.id = @Portfolio and {Granted.Any("p.id")}";

    /// <summary>
    /// Appends about content of a portfolio that was refused, and tells those who listen, when there is such a portfolio for the caller:
    /// of each key once a minute, so that one which posts without end does not drown what else is told.
    /// </summary>
    public Task AppendRefusedPostAsync(
        Caller caller, string portfolio, string action, string @object, object detail, CancellationToken cancellation) =>
        database.WriteAsync(
            async open =>
            {
                await AuditChain.AppendAsync(open, caller.KeyId, action, @object, detail);
                if (await open.FirstAsync<long>(KnownSql, new { Caller = caller.KeyId, open.Now, Portfolio = portfolio }) > 0
                    && await EventDistribution.TakeAgainAsync(open, portfolio, EventDistribution.Refused + caller.KeyId, Minute))
                {
                    var payload = new { action, by = new { key = caller.KeyId, caller.Name }, refused = detail };
                    await OutboxStore.AppendAsync(open, portfolio, "post.refused", @object, payload);
                }
                return true;
            },
            cancellation);

    // Ids and actions may hold the signs that "like" gives a meaning; besides, the databases disagree about letters' case in it.
    private static readonly string ListSql = $"""
        select sequence, at, actor, action, object, detail, prev_hash, hash from audit
        where (@Before is null or sequence < @Before)
          and (@Actor is null or actor = @Actor)
          and (@Action is null or substr(action, 1, length(@Action)) = @Action)
          and (@Object is null or object = @Object or substr(object, 1, length(@Object) + 1) = @Object || '/')
          and (@From is null or at >= @From) and (@Until is null or at < @Until)
          and {Granted.Everywhere(Right.Admin)}
        order by sequence desc limit @Limit
        """;

    /// <summary>Entries that the question asks for, newest first; none unless the caller administers all portfolios.</summary>
    /// <param name="question">Null: everything.</param>
    public async Task<IReadOnlyList<AuditEntry>> ListAsync(
        Caller caller, AuditQuestion? question, int limit, CancellationToken cancellation)
    {
        var asked = question ?? new AuditQuestion();
        var rows = await database.ReadAsync(
            open => open.ListAsync<AuditRow>(
                ListSql,
                new
                {
                    Caller = caller.KeyId,
                    open.Now,
                    asked.Before,
                    asked.Actor,
                    asked.Action,
                    Object = asked.Portfolio is null ? null : $"portfolios/{asked.Portfolio}",
                    From = asked.From?.ToMicroseconds(),
                    Until = asked.Until?.ToMicroseconds(),
                    Limit = limit,
                }),
            cancellation);
        return [.. rows.Select(ToEntry)];
    }

    /// <summary>Recomputes the whole chain from entry 1.</summary>
    public Task<AuditVerification> VerifyAsync(CancellationToken cancellation) => database.ReadAsync(
        open => AuditChain.VerifyAsync(open.StreamAsync<AuditRow>(AuditChain.AllSql), cancellation), cancellation);

    private static AuditEntry ToEntry(AuditRow row) => new()
    {
        Sequence = row.Sequence,
        At = row.At.ToInstant(),
        Actor = row.Actor,
        Action = row.Action,
        Object = row.Object,
        Detail = row.Detail,
        PreviousHash = row.PrevHash,
        Hash = row.Hash,
    };
}
