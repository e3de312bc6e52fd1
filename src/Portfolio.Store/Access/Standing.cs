namespace Portfolio.Store.Access;

/// <summary>
/// Where a caller stands before a write: decided inside the transaction that writes, by the same conditions as every read.
/// </summary>
/// <param name="Exists">There is such a portfolio.</param>
/// <param name="Known">The caller has some grant on it; otherwise it must not learn that it exists.</param>
/// <param name="Whole">The asked right, on the whole of it.</param>
/// <param name="Some">The asked right, at least on single projects.</param>
internal sealed record Standing(bool Exists, bool Archived, bool Known, bool Whole, bool Some)
{
    private static string Sql(Right right) => $"""
        select case when exists (select 1 from portfolio p where p.id = @Portfolio) then 1 else 0 end as found,
          case when exists (select 1 from portfolio p where p.id = @Portfolio and p.archived_at is not null) then 1 else 0 end as archived,
          case when {Granted.Any("@Portfolio")} then 1 else 0 end as known,
          case when {Granted.Whole(right, "@Portfolio")} then 1 else 0 end as whole,
          case when {Granted.Some(right, "@Portfolio")} then 1 else 0 end as part
        """;

    public static async Task<Standing> ReadAsync(StoreTransaction open, Caller caller, Right right, string portfolio)
    {
        var row = (await open.FirstAsync<Row>(Sql(right), new { Caller = caller.KeyId, open.Now, Portfolio = portfolio }))!;
        return new Standing(row.Found == 1, row.Archived == 1, row.Known == 1, row.Whole == 1, row.Part == 1);
    }

    private sealed record Row
    {
        public long Found { get; init; }
        public long Archived { get; init; }
        public long Known { get; init; }
        public long Whole { get; init; }
        public long Part { get; init; }
    }
}
