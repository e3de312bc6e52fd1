using System.Net;
using System.Net.Http.Headers;
using System.Text;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Runs;

namespace Portfolio.Server.Tests;

/// <summary>Every limit is a setting, and what is beyond it is told so; nothing of it is kept.</summary>
public sealed class LimitTests
{
    [Fact]
    public async Task AKeyThatAsksTooFastIsTurnedAwayAndOthersAreNot()
    {
        await using var server = new PortfolioServer(null, ("Limits:RequestsPerSecond", "20"));
        var (fast, slow) = (server.Client(), server.Client(key: null));
        HttpResponseMessage? turned = null;
        for (var i = 0; i < 1_000 && turned is null; i++)
        {
            var answers = await Task.WhenAll(Enumerable.Range(0, 20).Select(_ => fast.ReadAsync("/v1/portfolios")));
            turned = answers.FirstOrDefault(answer => answer.StatusCode == HttpStatusCode.TooManyRequests);
        }
        await turned!.ProblemAsync(429, "too-many-requests");
        Assert.Equal(TimeSpan.FromSeconds(1), turned!.Headers.RetryAfter?.Delta);
        await (await slow.ReadAsync("/v1/portfolios")).ProblemAsync(401, "unauthorized");
        for (var i = 0; i < 50; i++)
            Assert.Equal(HttpStatusCode.OK, (await slow.ReadAsync("/health/live")).StatusCode);
    }

    [Fact]
    public async Task ALowRateIsKeptToAsExactlyAsAHighOne()
    {
        const int rate = 2;
        await using var server = new PortfolioServer(null, ("Limits:RequestsPerSecond", $"{rate}"));
        var client = server.Client();
        var (watch, taken) = (System.Diagnostics.Stopwatch.StartNew(), 0);
        while (watch.Elapsed < TimeSpan.FromSeconds(3))
        {
            if ((await client.ReadAsync("/v1/portfolios")).StatusCode == HttpStatusCode.OK)
                taken++;
        }
        Assert.InRange(taken, rate, rate + Math.Ceiling(rate * watch.Elapsed.TotalSeconds));
    }

    [Fact]
    public async Task SoManyRunsOfAPortfolioMayWait()
    {
        await using var server = new PortfolioServer(null, ("Limits:QueuedRuns", "2"), ("Roles", "api"));
        var client = server.Client();
        foreach (var portfolio in new[] { "p", "q" })
            await client.PutJsonAsync($"/v1/portfolios/{portfolio}/document", Samples.Document());
        var first = await client.RunAsync("p");
        await client.RunAsync("p");
        var third = await client.PostRunAsync("p");
        await third.ProblemAsync(429, "queue-full");
        Assert.NotNull(third.Headers.RetryAfter?.Delta);
        await client.RunAsync("q");
        await client.DeleteAsync($"/v1/portfolios/p/runs/{first}", TestContext.Current.CancellationToken);
        await client.RunAsync("p");
    }

    [Fact]
    public async Task ARequestThatTakesTooLongIsGivenUp()
    {
        await using var server = new PortfolioServer(null, ("Limits:RequestTime", "00:00:00.300"));
        var client = server.Client();
        await client.PutJsonAsync("/v1/portfolios/p/document", Samples.Document());
        var endless = new HttpRequestMessage(HttpMethod.Post, "/v1/portfolios/p/runs") { Content = new EndlessBody() };
        var answer = await client.SendAsync(endless, HttpCompletionOption.ResponseHeadersRead, TestContext.Current.CancellationToken);
        await answer.ProblemAsync(503, "timeout");
        Assert.NotNull(answer.Headers.RetryAfter?.Delta);
        Assert.Equal(0, (await (await client.ReadAsync("/v1/portfolios/p/runs")).JsonAsync()).GetProperty("items").GetArrayLength());
    }

    [Theory]
    [InlineData("Projects", "1", """{"settings":{"name":"n","currency":"EUR"},"projects":[{"id":"a","statusDate":"2027-01-04"},{"id":"b","statusDate":"2027-01-04"}]}""")]
    [InlineData("Activities", "1", """{"settings":{"name":"n","currency":"EUR"},"projects":[{"id":"a","statusDate":"2027-01-04","activities":[{"id":"A","duration":1},{"id":"B","duration":1}]}]}""")]
    [InlineData("Points", "2", """{"settings":{"name":"n","currency":"EUR"},"projects":[{"id":"a","statusDate":"2027-01-04","activities":[{"id":"A","duration":{"type":"percentiles","points":[{"p":0,"value":1},{"p":50,"value":2},{"p":100,"value":3}]}}]}]}""")]
    [InlineData("CalendarDates", "1", """{"settings":{"name":"n","currency":"EUR","calendars":[{"id":"c","workingWeekdays":["mon"],"nonWorkingDates":["2027-01-04","2027-01-11"]}]},"projects":[]}""")]
    [InlineData("CapacityChanges", "1", """{"settings":{"name":"n","currency":"EUR","pools":[{"id":"c","capacity":1,"capacityChanges":[{"from":"2027-01-04","capacity":2},{"from":"2027-01-05","capacity":1}]}]},"projects":[]}""")]
    [InlineData("PairedNodes", "2", """{"settings":{"name":"n","currency":"EUR","drivers":[{"id":"d","durationFactor":{"type":"uniform","low":1,"high":2}},{"id":"e","durationFactor":{"type":"uniform","low":1,"high":2}},{"id":"f","durationFactor":{"type":"uniform","low":1,"high":2}}],"dependence":{"pairs":[{"between":["driver/d","driver/e"],"rank":0.1},{"between":["driver/e","driver/f"],"rank":0.1}]}},"projects":[]}""")]
    [InlineData("Iterations", "1000", """{"settings":{"name":"n","currency":"EUR","iterations":1001},"projects":[]}""")]
    [InlineData("Levels", "2", """{"settings":{"name":"n","currency":"EUR","confidence":[50,80,90]},"projects":[]}""")]
    public async Task ADocumentBeyondALimitIsRefused(string limit, string most, string document)
    {
        await using var server = new PortfolioServer(null, ($"Limits:{limit}", most));
        await using var roomy = new PortfolioServer();
        Assert.Equal(HttpStatusCode.Created, (await roomy.Client().PutJsonAsync("/v1/portfolios/p/document", document)).StatusCode);
        var refused = await (await server.Client().PutJsonAsync("/v1/portfolios/p/document", document)).ProblemAsync(422, "refused");
        var fault = Assert.Single(refused.Faults());
        Assert.True(fault.Code is "limit.exceeded" or "iterations.range", fault.ToString());
        await (await server.Client().ReadAsync("/v1/portfolios/p/document")).ProblemAsync(404, "not-found");
    }

    [Theory]
    [InlineData("Body", "1024", "POST", "runs", 413)]
    [InlineData("Body", "1024", "PUT", "schedule", 413)]
    [InlineData("DocumentBody", "1024", "PUT", "document", 413)]
    public async Task ABodyBeyondItsLimitIsNotTaken(string limit, string most, string method, string address, int status)
    {
        await using var server = new PortfolioServer(null, ($"Limits:{limit}", most));
        var client = server.Client();
        await client.PutJsonAsync("/v1/portfolios/p/document", Samples.Document());
        foreach (var announced in new[] { true, false })
        {
            HttpContent body = announced ? new ByteArrayContent(new byte[1025]) : new StreamContent(new UnseekableBytes(1025));
            body.Headers.ContentType = new MediaTypeHeaderValue("application/json");
            var request = new HttpRequestMessage(new HttpMethod(method), $"/v1/portfolios/p/{address}") { Content = body };
            await (await client.SendAsync(request, TestContext.Current.CancellationToken)).ProblemAsync(status, "too-large");
        }
    }

    [Theory]
    [InlineData("runs", "POST")]
    [InlineData("schedule", "PUT")]
    [InlineData("document", "PUT")]
    public async Task JsonDeeperThanItsLimitCannotBeRead(string address, string method)
    {
        await using var server = new PortfolioServer();
        var client = server.Client();
        await client.PutJsonAsync("/v1/portfolios/p/document", Samples.Document());
        var deep = $$"""{"settings":{{string.Concat(Enumerable.Repeat("[", 20))}}1{{string.Concat(Enumerable.Repeat("]", 20))}}}""";
        var request = new HttpRequestMessage(new HttpMethod(method), $"/v1/portfolios/p/{address}") { Content = new StringContent(deep, null, "application/json") };
        if (address == "document")
            request.Headers.TryAddWithoutValidation("If-Match", "*");
        await (await client.SendAsync(request, TestContext.Current.CancellationToken)).ProblemAsync(400, "malformed");
    }

    [Fact]
    public async Task LevelsBinsAndIterationsOfARequestAreLimited()
    {
        await using var server = new PortfolioServer(null, ("Limits:Levels", "2"), ("Limits:Bins", "5"), ("Limits:Iterations", "100"));
        var client = server.Client();
        await client.PutJsonAsync("/v1/portfolios/p/document", """
            {"settings":{"name":"n","currency":"EUR","iterations":100,"confidence":[50]},"projects":[{"id":"a","statusDate":"2027-01-04","activities":[{"id":"A","duration":1,"cost":{"fixed":{"type":"uniform","low":1,"high":9}}}]}]}
            """);
        await (await client.PostRunAsync("p", """{"iterations":101}""")).ProblemAsync(422, "refused");
        await (await client.PostRunAsync("p", """{"iterations":9}""")).ProblemAsync(422, "refused");
        await client.SucceedAsync("p", """{"iterations":100}""");
        await (await client.ReadAsync("/v1/portfolios/p/runs/latest/results?levels=1,2,3")).ProblemAsync(422, "refused");
        Assert.Equal(HttpStatusCode.OK, (await client.ReadAsync("/v1/portfolios/p/runs/latest/results?levels=1,2")).StatusCode);
        const string histogram = "/v1/portfolios/p/runs/latest/distribution?metric=cost&bin=";
        await (await client.ReadAsync(histogram + "6")).ProblemAsync(422, "refused");
        Assert.Equal(HttpStatusCode.OK, (await client.ReadAsync(histogram + "5")).StatusCode);
    }

    private sealed class UnseekableBytes(int length) : MemoryStream(Encoding.ASCII.GetBytes(new string(' ', length)))
    {
        public override bool CanSeek => false;
    }

    /// <summary>Begins and never ends.</summary>
    private sealed class EndlessBody : HttpContent
    {
        public EndlessBody() => Headers.ContentType = new("application/json");

        protected override async Task SerializeToStreamAsync(Stream stream, TransportContext? context)
        {
            await stream.WriteAsync("{"u8.ToArray());
            await stream.FlushAsync();
            await Task.Delay(Timeout.Infinite, TestContext.Current.CancellationToken);
        }

        protected override bool TryComputeLength(out long length) => (length = 0) > 0;
    }
}
