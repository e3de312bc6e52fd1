using System.Net;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Runs;
using Portfolio.Store.Access;

namespace Portfolio.Server.Tests;

public sealed class ArchiveTests
{
    private const string Address = "/v1/portfolios/weir";

    [Fact]
    public async Task AnArchivedPortfolioIsReadAndNoLongerWrittenOrRun()
    {
        // Nobody works, so that what is queued stays so.
        await using var server = new PortfolioServer(null, ("Roles", "api"));
        var client = server.Client();
        await client.PutJsonAsync(Address + "/document", Samples.Document());
        await client.PutJsonAsync(Address + "/schedule", """{"cron":"30 2 * * *"}""");
        var run = await client.RunAsync("weir");

        var archived = await (await client.RemoveAsync(Address)).JsonAsync();
        Assert.Equal(("weir", "2027-01-04T12:00:00Z"), (archived.Text("portfolio"), archived.Text("archivedAt")));
        Assert.Equal("cancelled", (await client.ReadRunAsync("weir", run)).State());
        Assert.False((await (await client.ReadAsync(Address + "/schedule")).JsonAsync()).GetProperty("enabled").GetBoolean());
        Assert.Equal(Samples.Document(), await (await client.ReadAsync(Address + "/document")).TextAsync());
        var listed = (await (await client.ReadAsync("/v1/portfolios")).JsonAsync()).GetProperty("items")[0];
        Assert.Equal("2027-01-04T12:00:00Z", listed.Text("archivedAt"));

        await (await client.PutJsonAsync(Address + "/document", Samples.Document("again"), "*")).ProblemAsync(409, "archived");
        await (await client.PutJsonAsync(Address + "/document", Samples.Document("again"))).ProblemAsync(409, "archived");
        await (await client.PutJsonAsync(Address + "/schedule", """{"cron":"30 2 * * *"}""")).ProblemAsync(409, "archived");
        await (await client.PostRunAsync("weir")).ProblemAsync(409, "archived");

        server.Clock.Advance(TimeSpan.FromHours(1));
        Assert.Equal("2027-01-04T12:00:00Z", (await (await client.RemoveAsync(Address)).JsonAsync()).Text("archivedAt"));
        Assert.Equal(archived.ToString(), (await (await client.ReadAsync(Address)).JsonAsync()).ToString());
        var told = (await (await client.ReadAsync("/v1/audit?action=portfolio.archive")).JsonAsync()).GetProperty("items");
        Assert.Equal(1, told.GetArrayLength());
    }

    [Fact]
    public async Task TheConditionIsHonouredAndTheRightNeeded()
    {
        await using var server = new PortfolioServer();
        await server.Client().PutJsonAsync(Address + "/document", Samples.Document());
        var tag = (await server.Client().ReadAsync(Address + "/document")).Tag();
        await (await (await server.ClientAsync(new Grant(Right.Manage, "weir"))).RemoveAsync(Address)).ProblemAsync(403, "forbidden");
        await (await (await server.ClientAsync(new Grant(Right.Admin, "weir", ["weir"]))).RemoveAsync(Address)).ProblemAsync(403, "forbidden");
        await (await (await server.ClientAsync(new Grant(Right.Admin, "other"))).RemoveAsync(Address)).ProblemAsync(404, "not-found");
        await (await server.Client().RemoveAsync("/v1/portfolios/none")).ProblemAsync(404, "not-found");
        await (await server.Client().RemoveAsync(Address, "\"another\"")).ProblemAsync(412, "precondition-failed");
        var owner = await server.ClientAsync(new Grant(Right.Admin, "weir"));
        Assert.Equal(HttpStatusCode.OK, (await owner.RemoveAsync(Address, tag)).StatusCode);
    }

    [Fact]
    public async Task ARunAtWorkIsStopped()
    {
        await using var server = new PortfolioServer();
        var client = server.Client();
        await client.PutJsonAsync(Address + "/document", Samples.Document());
        var run = await client.RunAsync("weir", """{"iterations":1000000}""");
        await client.RemoveAsync(Address);
        var ended = await client.UntilAsync("weir", run, "cancelled", "succeeded");
        Assert.Equal("cancelled", ended.State());
    }
}
