namespace Portfolio.Store.Idempotency;

/// <summary>
/// Answers to accepted writes, each kept in the transaction of its effect: there is never one without the other. The row decides, also
/// between processes.
/// </summary>
public sealed class AnswerStore(Database database)
{
    /// <summary>How long an answer is given again.</summary>
    public static readonly TimeSpan KeptFor = TimeSpan.FromHours(48);

    private const string FindSql = """
        select request, status, headers, body from kept_answer
        where caller = @Caller and address = @Address and key = @Key and kept_at > @Expired
        """;

    /// <summary>The answer that the write was given; null when there is none, or none any more.</summary>
    public async Task<KeptAnswer?> FindAsync(WriteKey write, CancellationToken cancellation)
    {
        var row = await database.ReadAsync(
            open => open.FirstAsync<Row>(FindSql, new { write.Caller, write.Address, write.Key, Expired = Expired(open) }), cancellation);
        return row is null ? null : new KeptAnswer(row.Request, (int)row.Status, row.Headers, row.Body);
    }

    private const string KeepSql = """
        insert into kept_answer (caller, address, key, request, status, headers, body, kept_at)
        values (@Caller, @Address, @Key, @Request, @Status, @Headers, @Body, @Now)
        on conflict (caller, address, key) do update
          set request = excluded.request, status = excluded.status, headers = excluded.headers, body = excluded.body,
            kept_at = excluded.kept_at
          where kept_answer.kept_at <= @Expired
        """;

    /// <summary>Keeps the answer in the transaction that has its effect.</summary>
    /// <exception cref="AnsweredAlreadyException">The same write has its answer: this one must not have another effect.</exception>
    public static async Task KeepAsync(StoreTransaction open, WriteKey write, KeptAnswer answer)
    {
        var row = new
        {
            write.Caller, write.Address, write.Key, answer.Request, answer.Status, answer.Headers, answer.Body, open.Now,
            Expired = Expired(open),
        };
        if (await open.ExecuteAsync(KeepSql, row) == 0)
            throw new AnsweredAlreadyException();
    }

    private const string OldSql = "select count(*) from (select 1 from kept_answer where kept_at <= @Expired limit 1) found";

    private const string ForgetSql = "delete from kept_answer where kept_at <= @Expired";

    /// <summary>A chore: forgets what is no longer given again, and says how many they were.</summary>
    public async Task<int> ForgetAsync(CancellationToken cancellation) =>
        await database.ReadAsync(open => open.FirstAsync<long>(OldSql, new { Expired = Expired(open) }), cancellation) == 0
            ? 0
            : await database.WriteAsync(open => open.ExecuteAsync(ForgetSql, new { Expired = Expired(open) }), cancellation);

    private static long Expired(StoreTransaction open) => (open.Now.ToInstant() - KeptFor).ToMicroseconds();

    private sealed record Row
    {
        public string Request { get; init; } = "";
        public long Status { get; init; }
        public string Headers { get; init; } = "";
        public byte[] Body { get; init; } = [];
    }
}
