using System.Net;
using Microsoft.Extensions.DependencyInjection;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Runs;
using Portfolio.Server.Tests.Subscriptions;
using Portfolio.Store.Access;
using Portfolio.Store.Outbox;

namespace Portfolio.Server.Tests.Events;

public sealed class EventFeedTests : IAsyncDisposable
{
    private const string Address = "/v1/portfolios/p/events";

    private readonly PortfolioServer server = new();

    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    [Fact]
    public async Task WhatHappenedIsReadInOrderAsCloudEvents()
    {
        var client = server.Client();
        await client.PutJsonAsync("/v1/portfolios/p/document", RunSamples.Uncertain());
        var run = await client.SucceedAsync("p", """{"iterations":20,"recorded":true}""");
        var events = await client.ItemsAsync(Address);
        Assert.Equal(
            ["portfolio.revision.created", "portfolio.run.queued", "portfolio.run.succeeded"], events.Select(told => told.Text("type")));
        var last = events[^1];
        Assert.Equal(
            ("1.0", "/v1/portfolios/p", run.Text("id"), "2027-01-04T12:00:00Z", "application/json"),
            (last.Text("specversion"), last.Text("source"), last.Text("subject"), last.Text("time"), last.Text("datacontenttype")));
        Assert.Equal(("2027-01-04", true), (last.GetProperty("data").Text("asOf"), last.GetProperty("data").GetProperty("represents").GetBoolean()));
        Assert.Equal(3, events.Select(told => told.Text("id")).Distinct().Count());
    }

    [Fact]
    public async Task ReadersReadOnFromTheLastEventTheySaw()
    {
        var client = server.Client();
        for (var days = 1; days <= 5; days++)
            await client.PutDocumentAsync(Samples.Document(days: days));
        await client.PutJsonAsync("/v1/portfolios/q/document", Samples.Document());
        var all = await client.ItemsAsync(Address);
        Assert.Equal(["1", "2", "3", "4", "5"], all.Select(told => told.Text("subject")));
        var first = await client.ReadAsync(Address + "?limit=2");
        var next = (await first.JsonAsync()).Text("next");
        Assert.Equal(all[1].Text("id"), next);
        Assert.Equal($"<{Address}?limit=2&after={next}>; rel=\"next\"", first.Headers.GetValues("Link").Single());
        Assert.Equal(["3", "4", "5"], (await client.ItemsAsync($"{Address}?after={next}")).Select(told => told.Text("subject")));
        var end = await client.ReadAsync($"{Address}?after={all[^1].Text("id")}");
        Assert.Equal("""{"items":[]}""", await end.TextAsync());
    }

    [Theory]
    [InlineData("never")]
    [InlineData("7")]
    [InlineData("01976e56-2a00-7000-8000-zz0000000000")]
    [InlineData("5f0c6a1e-1111-4111-8111-000000000000")]
    [InlineData("01ffffff-ffff-7000-8000-000000000000")]
    public async Task WhatIsNoEventsIdIsRefused(string after)
    {
        var client = server.Client();
        await client.PutJsonAsync("/v1/portfolios/p/document", Samples.Document());
        var faults = (await (await client.ReadAsync($"{Address}?after={after}")).ProblemAsync(422, "refused")).Faults();
        Assert.Equal([("", "parameter.invalid")], faults);
    }

    [Fact]
    public async Task AnEventThatIsNoLongerKeptIsGoneAndTheNewestStays()
    {
        var client = server.Client();
        for (var days = 1; days <= 3; days++)
            await client.PutDocumentAsync(Samples.Document(days: days));
        var all = await client.ItemsAsync(Address);
        await server.SettledAsync();
        server.Clock.Advance(TimeSpan.FromDays(89));
        await client.PutDocumentAsync(Samples.Document(days: 4));
        await server.SettledAsync();
        Assert.Equal(0, await ForgetAsync());
        server.Clock.Advance(TimeSpan.FromDays(1.5));
        Assert.Equal(3, await ForgetAsync());
        Assert.Equal(["4"], (await client.ItemsAsync(Address)).Select(told => told.Text("subject")));
        await (await client.ReadAsync($"{Address}?after={all[2].Text("id")}")).ProblemAsync(410, "events-expired");
        server.Clock.Advance(TimeSpan.FromDays(400));
        Assert.Equal(0, await ForgetAsync());
        var kept = Assert.Single(await client.ItemsAsync(Address));
        Assert.Equal(HttpStatusCode.OK, (await client.ReadAsync($"{Address}?after={kept.Text("id")}")).StatusCode);
    }

    [Fact]
    public async Task AKeyLimitedToProjectsReadsEventsAboutTheseAlone()
    {
        var client = server.Client();
        await client.PutDocumentAsync(SubscriptionScene.Certain(5, statusDate: "2026-11-01"));
        await client.SubscribeAsync("https://hooks.harbour.example/", """{"type":"estimates.stale","days":30}""");
        await server.Services.GetRequiredService<Server.Events.EstimateAges>().LookAsync(Cancellation);
        Assert.Equal(2, (await client.EventsAsync("portfolio.estimates.stale")).Count);
        var reader = await server.ClientAsync(new Grant(Right.Read, "p", ["quay"]));
        Assert.Equal("project/quay", Assert.Single(await reader.ItemsAsync(Address)).Text("subject"));
        var stranger = await server.ClientAsync(new Grant(Right.Admin, "q"));
        await (await stranger.ReadAsync(Address)).ProblemAsync(404, "not-found");
        var submitter = await server.ClientAsync(new Grant(Right.Submit, "p"));
        await (await submitter.ReadAsync(Address)).ProblemAsync(403, "forbidden");
    }

    private Task<int> ForgetAsync() => server.Services.GetRequiredService<OutboxStore>()
        .ForgetAsync(Caller.System, server.Clock.GetUtcNow().AddDays(-90), Cancellation);

    public ValueTask DisposeAsync() => server.DisposeAsync();
}
