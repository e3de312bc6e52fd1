using System.Text.Json;
using Portfolio.Store.Access;

namespace Portfolio.Store.Outbox;

/// <summary>Events, written in the transaction of the fact they tell. A key limited to projects reads those about one of them.</summary>
public sealed partial class OutboxStore(Database database)
{
    private static readonly string ReadSql = $"""
        select {OutboxRow.Columns} from outbox o
        where o.sequence > @Cursor and (@Portfolio is null or o.portfolio = @Portfolio)
          and {Granted.Part(Right.Read, "o.portfolio", "o.project")}
        order by o.sequence limit @Limit
        """;

    /// <summary>Events after the cursor (0: from the first), oldest first.</summary>
    /// <param name="portfolio">Only this one; null for all.</param>
    public Task<IReadOnlyList<OutboxEvent>> ReadAfterAsync(
        Caller caller, string? portfolio, long cursor, int limit, CancellationToken cancellation) =>
        database.ReadAsync(open => ReadAsync(open, caller, portfolio, cursor, limit), cancellation);

    private static async Task<IReadOnlyList<OutboxEvent>> ReadAsync(
        StoreTransaction open, Caller caller, string? portfolio, long cursor, int limit)
    {
        var asked = new { Caller = caller.KeyId, open.Now, Portfolio = portfolio, Cursor = cursor, Limit = limit };
        return [.. (await open.ListAsync<OutboxRow>(ReadSql, asked)).Select(row => row.ToEvent())];
    }

    private const string InsertSql = """
        insert into outbox (sequence, id, at, portfolio, kind, subject, project, payload)
        select coalesce(max(sequence), 0) + 1, @Id, @Now, @Portfolio, @Kind, @Subject, @Project, @Payload from outbox
        """;

    internal static Task AppendAsync(
        StoreTransaction open, string portfolio, string kind, string subject, object payload) =>
        AppendAsync(open, new NewEvent(portfolio, kind, subject, payload));

    internal static Task AppendAsync(StoreTransaction open, NewEvent told) => open.ExecuteAsync(
        InsertSql,
        new
        {
            Id = Guid.CreateVersion7(open.Now.ToInstant()).ToString(),
            open.Now,
            told.Portfolio,
            told.Kind,
            told.Subject,
            told.Project,
            Payload = JsonSerializer.Serialize(told.Payload, JsonSerializerOptions.Web),
        });
}
