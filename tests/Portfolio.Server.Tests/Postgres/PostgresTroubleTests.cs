using System.Net;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Idempotency;

namespace Portfolio.Server.Tests.Postgres;

/// <summary>Connections that end in the middle of a write, and connections that are all in use.</summary>
public sealed class PostgresTroubleTests : IAsyncLifetime
{
    private const string Address = "/v1/portfolios/p/document";

    private const string Waiting = "from pg_stat_activity where datname = current_database() and wait_event_type = 'Lock'";

    private TestPostgres database = null!;

    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    public async ValueTask InitializeAsync() => database = await TestPostgres.MakeAsync();

    public ValueTask DisposeAsync() => database is null ? ValueTask.CompletedTask : database.DisposeAsync();

    [Fact]
    public async Task AWriteWhoseConnectionEndsInTheMiddleKeepsNothingAndIsDoneOnceWhenSentAgain()
    {
        await using var server = OnPostgres();
        var client = server.Client();
        await client.PutJsonAsync(Address, Samples.Document());
        var write = Write.All["putDocument"];
        var before = await StateAsync();

        // The parts cannot be written, after the revision was.
        await using (await database.HoldAsync("lock table revision_part in share mode"))
        {
            var cut = write.SendAsync(client, "p", "cut");
            await UntilWaitingAsync(1);
            Assert.Equal(1, await database.CountAsync($"select count(pg_terminate_backend(pid, 5000)) {Waiting}"));
            var told = await cut;
            Assert.Equal((HttpStatusCode.ServiceUnavailable, "5", false), (told.Status, told.RetryAfter, told.Again));
            Assert.Contains("Nothing was kept.", told.Body, StringComparison.Ordinal);
        }
        Assert.Equal(before, await StateAsync());

        var done = await write.SendAsync(client, "p", "cut");
        Assert.Equal((HttpStatusCode.OK, false), (done.Status, done.Again));
        var after = await StateAsync();
        Assert.Equal((before.Revisions + 1, before.Audited + 1, before.Told + 1), after);
        var again = await write.SendAsync(client, "p", "cut");
        Assert.Equal((done, true), (again.Words(), again.Again));
        Assert.Equal(after, await StateAsync());
    }

    [Fact]
    public async Task WhereAllConnectionsAreInUseItIsToldSoonAndWhoeverHadOneIsAnswered()
    {
        await using var server = OnPostgres(";Maximum Pool Size=2;Timeout=1");
        var client = server.Client();
        await client.PutJsonAsync(Address, Samples.Document());
        Task<HttpResponseMessage>[] slow;
        await using (await database.HoldAsync("lock table revision_part"))
        {
            slow = [client.ReadAsync(Address), client.ReadAsync(Address)];
            await UntilWaitingAsync(2);
            var refused = await client.ReadAsync(Address).WaitAsync(TimeSpan.FromSeconds(20), Cancellation);
            await refused.ProblemAsync(503, "storage-unavailable");
            Assert.NotNull(refused.Headers.RetryAfter);
            Assert.All(slow, read => Assert.False(read.IsCompleted));
        }
        foreach (var read in slow)
            Assert.Equal(HttpStatusCode.OK, (await read).StatusCode);
        Assert.Equal(HttpStatusCode.OK, (await client.ReadAsync(Address)).StatusCode);
    }

    private async Task UntilWaitingAsync(long connections)
    {
        while (await database.CountAsync($"select count(*) {Waiting}") < connections)
            await Task.Delay(20, Cancellation);
    }

    private async Task<(long Revisions, long Audited, long Told)> StateAsync() => (
        await database.CountAsync("select count(*) from revision"),
        await database.CountAsync("select count(*) from audit"),
        await database.CountAsync("select count(*) from outbox"));

    private PortfolioServer OnPostgres(string more = "") =>
        new(null, ("Storage:Postgres", database.ConnectionString + more), ("Roles", "api"));
}
