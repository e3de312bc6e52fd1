using System.Net;
using System.Net.Http.Headers;
using System.Text;
using Ical.Net.CalendarComponents;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Results;
using Portfolio.Server.Tests.Runs;
using Portfolio.Store.Access;
using static Portfolio.Server.Tests.Subscriptions.SubscriptionScene;

namespace Portfolio.Server.Tests.Feeds;

public sealed class CalendarTests(FinishedRunFixture finished) : IClassFixture<FinishedRunFixture>
{
    private const string Address = "/v1/portfolios/works/calendar.ics";

    private readonly PortfolioServer server = finished.Server;

    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    private static async Task<IReadOnlyList<CalendarEvent>> EventsAsync(HttpResponseMessage answer)
    {
        Assert.True(answer.IsSuccessStatusCode, await answer.TextAsync());
        Assert.Equal("text/calendar; charset=utf-8", answer.Content.Headers.ContentType!.ToString());
        return [.. Ical.Net.Calendar.Load(await answer.TextAsync())!.Events];
    }

    private static string Uid(string scope) => $"p80/{scope}@works";

    [Fact]
    public async Task DatesAreThoseOfTheResults()
    {
        var client = server.Client();
        var events = (await EventsAsync(await client.ReadAsync(Address))).ToDictionary(entry => entry.Uid!);
        foreach (var row in await client.ItemsAsync("/v1/portfolios/works/runs/latest/results?levels=80"))
        {
            var (scope, finish) = (row.Text("scope"), row.GetProperty("finish"));
            var entry = events[Uid(scope)];
            Assert.Equal(
                (finish.GetProperty("percentiles")[0].Text("value"), false), ($"{entry.Start!.Date:yyyy-MM-dd}", entry.Start.HasTime));
            Assert.Equal(entry.Start.Date.AddDays(1), entry.End!.Date);
            var promised = finish.TryGetProperty("commitment", out var commitment);
            Assert.Equal(promised, events.TryGetValue($"promised/{scope}@works", out var promise));
            if (promised)
                Assert.Equal(commitment.Text("date"), $"{promise!.Start!.Date:yyyy-MM-dd}");
        }
        var whole = events[Uid("portfolio")];
        Assert.Equal("P80 Water and harbour", whole.Summary);
        Assert.Contains("As of 2027-01-03, revision 1, run " + finished.Run, whole.Description, StringComparison.Ordinal);
        Assert.Contains("Caution: ", whole.Description, StringComparison.Ordinal);
        Assert.Equal("P80 weir: M", events[Uid("milestone/weir/M")].Summary);
        Assert.Contains("It happens in 3", events[Uid("milestone/quay/S")].Description, StringComparison.Ordinal);
        Assert.StartsWith("Promised: weir (", events["promised/project/weir@works"].Summary);
    }

    [Fact]
    public async Task TheTextIsFoldedAndEndsItsLinesAsTheStandardWants()
    {
        var bytes = await (await server.Client().ReadAsync(Address)).Content.ReadAsByteArrayAsync(Cancellation);
        var text = Encoding.UTF8.GetString(bytes);
        Assert.StartsWith("BEGIN:VCALENDAR\r\n", text);
        Assert.EndsWith("END:VCALENDAR\r\n", text);
        Assert.DoesNotContain("\n", text.Replace("\r\n", "", StringComparison.Ordinal), StringComparison.Ordinal);
        Assert.All(text.Split("\r\n"), line => Assert.InRange(Encoding.UTF8.GetByteCount(line), 0, 75));
        Assert.Contains("\r\nVERSION:2.0\r\n", text, StringComparison.Ordinal);
        Assert.Contains("\r\nDTSTAMP:20270104T120000Z\r\n", text, StringComparison.Ordinal);
        Assert.Contains("\r\nDTSTART;VALUE=DATE:20271231\r\n", text, StringComparison.Ordinal);
        Assert.Contains("\r\nTRANSP:TRANSPARENT\r\n", text, StringComparison.Ordinal);
    }

    [Fact]
    public async Task ItIsTheSameWheneverItIsAskedForAndNotSentTwice()
    {
        var client = server.Client();
        var first = await client.ReadAsync(Address);
        var second = await client.ReadAsync(Address + "?level=80&run=" + finished.Run);
        Assert.Equal(await first.TextAsync(), await second.TextAsync());
        Assert.Equal(first.Tag(), second.Tag());
        var again = await client.ReadAsync(Address, first.Tag());
        Assert.Equal((HttpStatusCode.NotModified, first.Tag()), (again.StatusCode, again.Tag()));
        var other = await client.ReadAsync(Address + "?level=50");
        Assert.NotEqual(first.Tag(), other.Tag());
        Assert.Contains(await EventsAsync(other), entry => entry.Uid == "p50/portfolio@works");
    }

    [Fact]
    public async Task CalendarProgramsPresentTheKeyAsPassword()
    {
        var client = server.Client(key: null);
        await (await client.ReadAsync(Address)).ProblemAsync(401, "unauthorized");
        var basic = Convert.ToBase64String(Encoding.UTF8.GetBytes("calendar:" + PortfolioServer.AdminKey));
        client.DefaultRequestHeaders.Authorization = new AuthenticationHeaderValue("Basic", basic);
        Assert.NotEmpty(await EventsAsync(await client.ReadAsync(Address)));
    }

    [Fact]
    public async Task AKeyLimitedToProjectsSeesTheirDatesAlone()
    {
        var reader = await server.ClientAsync(new Grant(Right.Read, "works", ["weir"]));
        var own = await reader.ReadAsync(Address);
        Assert.Equal(
            ["p80/milestone/weir/M@works", "p80/project/weir@works", "promised/milestone/weir/M@works", "promised/project/weir@works"],
            (await EventsAsync(own)).Select(entry => entry.Uid).Order());
        Assert.DoesNotContain("Water and harbour", await own.TextAsync(), StringComparison.Ordinal);
        Assert.NotEqual(own.Tag(), (await server.Client().ReadAsync(Address)).Tag());
        await (await (await server.ClientAsync(new Grant(Right.Read, "other"))).ReadAsync(Address)).ProblemAsync(404, "not-found");
    }

    [Theory]
    [InlineData("?level=100", 422)]
    [InlineData("?asOf=tomorrow", 422)]
    [InlineData("?run=RUN&asOf=2027-01-03", 422)]
    [InlineData("?asOf=2027-01-02", 404)]
    [InlineData("?run=none", 404)]
    public async Task WhatCannotBeFoundIsSaid(string query, int status) =>
        Assert.Equal(status, (int)(await server.Client().ReadAsync(Address + query.Replace("RUN", finished.Run))).StatusCode);

    [Fact]
    public async Task TheSequenceRisesWhenTheFiguresChangeAndNamesAreKept()
    {
        await using var alone = new PortfolioServer();
        var client = alone.Client();
        var sequences = new List<int>();
        foreach (var days in new[] { 5, 5, 9, 9, 5 })
        {
            await client.PutDocumentAsync(Certain(days).Replace("\"id\":\"weir-lock\"", "\"id\":\"weir-lock\",\"name\":\"Wehr für die Schleuse; neu, größer\"", StringComparison.Ordinal));
            await client.SucceedAsync("p");
            var events = await EventsAsync(await client.ReadAsync("/v1/portfolios/p/calendar.ics"));
            sequences.Add(Assert.Single(events.Select(entry => entry.Sequence).Distinct()));
            Assert.Equal("P80 Wehr für die Schleuse; neu, größer", events.Single(entry => entry.Uid == "p80/project/weir-lock@p").Summary);
            alone.Clock.Advance(TimeSpan.FromDays(1));
        }
        Assert.Equal([0, 0, 1, 1, 2], sequences);
    }
}
