using System.Net;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Runs;

namespace Portfolio.Server.Tests;

/// <summary>What is asked for in which form, and what is said when there is none (RFC 9110).</summary>
public sealed class RepresentationTests(ServerFixture fixture) : IClassFixture<ServerFixture>
{
    private readonly HttpClient client = fixture.Server.Client();

    [Theory]
    [InlineData("document", "text/html", 406)]
    [InlineData("document", "application/json;q=0, text/html", 406)]
    [InlineData("document", "text/html, */*;q=0.1", 200)]
    [InlineData("document", "application/*", 200)]
    [InlineData("document", "not a media type", 200)]
    [InlineData("document", "application/json; charset=utf-8", 200)]
    [InlineData("document", "application/json; charset=UTF-8;q=0, application/json", 406)]
    [InlineData("document", "application/json; charset=utf-16", 406)]
    [InlineData("runs/RUN/results", "text/csv;charset=utf-8", 200)]
    [InlineData("runs", "text/csv", 406)]
    [InlineData("revisions", "application/json", 200)]
    [InlineData("runs/RUN/results", "text/csv", 200)]
    [InlineData("runs/RUN/results", "application/json", 200)]
    [InlineData("runs/RUN/results", "image/png", 406)]
    [InlineData("runs/RUN/results?format=csv", "image/png", 200)]
    [InlineData("runs/RUN/progress", "text/event-stream", 200)]
    [InlineData("runs/RUN/progress", "application/json", 406)]
    [InlineData("series", "text/csv;q=0.5, application/json;q=0.4", 200)]
    public async Task ARequestSaysWhatItAccepts(string address, string accept, int status)
    {
        var run = await RunAsync("accepted");
        var request = new HttpRequestMessage(HttpMethod.Get, "/v1/portfolios/accepted/" + address.Replace("RUN", run));
        request.Headers.TryAddWithoutValidation("Accept", accept);
        var answer = await client.SendAsync(request, TestContext.Current.CancellationToken);
        Assert.Equal(status, (int)answer.StatusCode);
        if (status == 406)
            await answer.ProblemAsync(406, "not-acceptable");
        if (address.Contains("results", StringComparison.Ordinal) || address == "series")
            Assert.Contains("Accept", answer.Headers.Vary);
    }

    [Fact]
    public async Task AWriteWhoseAnswerIsNotAcceptedIsNotMade()
    {
        var request = new HttpRequestMessage(HttpMethod.Put, "/v1/portfolios/unaccepted/document")
        {
            Content = new StringContent(Samples.Document(), null, "application/json"),
        };
        request.Headers.Add("Accept", "text/csv");
        await (await client.SendAsync(request, TestContext.Current.CancellationToken)).ProblemAsync(406, "not-acceptable");
        await (await client.ReadAsync("/v1/portfolios/unaccepted/document")).ProblemAsync(404, "not-found");
    }

    [Theory]
    [InlineData("document", "PUT", "text/plain")]
    [InlineData("document", "PUT", null)]
    [InlineData("runs", "POST", "text/csv")]
    [InlineData("runs", "POST", null)]
    [InlineData("schedule", "PUT", "application/xml")]
    [InlineData("schedule", "PUT", null)]
    public async Task ABodyIsJsonByItsOwnAccount(string address, string method, string? type)
    {
        await client.PutJsonAsync("/v1/portfolios/typed/document", Samples.Document());
        var body = new ByteArrayContent("{}"u8.ToArray());
        body.Headers.ContentType = type is null ? null : new(type);
        var request = new HttpRequestMessage(new HttpMethod(method), $"/v1/portfolios/typed/{address}") { Content = body };
        await (await client.SendAsync(request, TestContext.Current.CancellationToken)).ProblemAsync(415, "unsupported-media-type");
    }

    [Theory]
    [InlineData("document", "DELETE")]
    [InlineData("document", "PATCH")]
    [InlineData("runs", "PUT")]
    [InlineData("schedule", "POST")]
    [InlineData("series", "POST")]
    public async Task AMethodThatIsNotServedIsToldWhichAre(string address, string method)
    {
        await client.PutJsonAsync("/v1/portfolios/methods/document", Samples.Document());
        var answer = await client.SendAsync(new HttpRequestMessage(new HttpMethod(method), $"/v1/portfolios/methods/{address}"), TestContext.Current.CancellationToken);
        await answer.ProblemAsync(405, "method-not-allowed");
        Assert.NotEmpty(answer.Content.Headers.Allow);
    }

    [Theory]
    [InlineData("document")]
    [InlineData("revisions")]
    [InlineData("runs")]
    [InlineData("runs/RUN")]
    [InlineData("runs/RUN/progress")]
    [InlineData("runs/RUN/results/portfolio")]
    [InlineData("nowhere")]
    public async Task HeadAnswersLikeGetWithoutABody(string address)
    {
        var run = await RunAsync("headed");
        address = "/v1/portfolios/headed/" + address.Replace("RUN", run);
        var get = await client.ReadAsync(address);
        var head = await client.SendAsync(new HttpRequestMessage(HttpMethod.Head, address), TestContext.Current.CancellationToken);
        Assert.Equal(get.StatusCode, head.StatusCode);
        Assert.Equal(get.Tag(), head.Tag());
        Assert.Equal(get.Content.Headers.ContentType, head.Content.Headers.ContentType);
        if (head.StatusCode == HttpStatusCode.OK)
            Assert.Equal("", await head.TextAsync());
    }

    private async Task<string> RunAsync(string portfolio)
    {
        await client.PutJsonAsync($"/v1/portfolios/{portfolio}/document", Samples.Document());
        return (await client.SucceedAsync(portfolio, """{"iterations":100,"recorded":true}""")).Text("id");
    }
}
