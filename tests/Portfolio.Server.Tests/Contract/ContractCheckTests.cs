using System.Net;
using Xunit.Sdk;

namespace Portfolio.Server.Tests.Contract;

/// <summary>That the check of every answer finds what it is there for.</summary>
public sealed class ContractCheckTests
{
    private const string Description = """
        {"paths":{"/v1/works":{"get":{"operationId":"listWorks","responses":{
            "200":{"headers":{"ETag":{"required":true}},"content":{"application/json":{"schema":{"$ref":"#/components/schemas/Work"}}}},
            "304":{},
            "404":{"content":{"application/problem+json":{"schema":{"$ref":"#/components/schemas/Problem"}}}}}}}},
         "components":{"schemas":{
            "Work":{"type":"object","required":["due"],"properties":{"due":{"type":"string","format":"date"},"parts":{"$ref":"#/components/schemas/Work"}}},
            "Problem":{"type":"object","required":["status"],"properties":{"status":{"type":"integer"}}}}}}
        """;

    [Theory]
    [InlineData(200, "application/json", """{"due":"2027-01-04","more":1}""", null)]
    [InlineData(304, null, "", null)]
    [InlineData(404, "application/problem+json", """{"status":404}""", null)]
    [InlineData(201, "application/json", """{"due":"2027-01-04"}""", "describes only 200, 304, 404")]
    [InlineData(200, "text/csv", "due", "media type text/csv")]
    [InlineData(200, "application/json", "{}", "required properties")]
    [InlineData(200, "application/json", """{"due":"4 January"}""", "format")]
    [InlineData(200, "application/json", """{"due":"2027-01-04","parts":{"due":1}}""", "/parts/due")]
    [InlineData(404, "application/problem+json", """{"status":500}""", "status is another")]
    [InlineData(404, null, "", "media type none")]
    [InlineData(304, "text/plain", "x", "body is not described")]
    public async Task AnAnswerIsHeldAgainstItsOperation(int status, string? type, string body, string? flaw)
    {
        var answer = new HttpResponseMessage((HttpStatusCode)status) { Content = new StringContent(body) };
        answer.Content.Headers.ContentType = type is null ? null : new(type);
        answer.Headers.ETag = new("\"1\"");
        Assert.Equal(flaw is null, await FlawAsync(HttpMethod.Get, "/v1/works", answer) is null);
        if (flaw is not null)
            Assert.Contains(flaw, await FlawAsync(HttpMethod.Get, "/v1/works", answer), StringComparison.OrdinalIgnoreCase);
    }

    [Fact]
    public async Task HeadersPathsAndMethodsAreHeldToAsWell()
    {
        var untagged = new HttpResponseMessage(HttpStatusCode.OK) { Content = new StringContent("""{"due":"2027-01-04"}""", null, "application/json") };
        Assert.Contains("ETag", await FlawAsync(HttpMethod.Get, "/v1/works", untagged));
        Assert.Contains("no such path", await FlawAsync(HttpMethod.Get, "/v1/quays", untagged));
        Assert.Contains("no such method", await FlawAsync(HttpMethod.Put, "/v1/works", untagged));
        Assert.Null(await FlawAsync(HttpMethod.Get, "/elsewhere", untagged));
    }

    [Fact]
    public void OfTwoTemplatesTheOneWithoutParametersIsMeant()
    {
        var api = new DescribedApi("""{"paths":{"/v1/keys/{key}":{"get":{"responses":{}}},"/v1/keys/self":{"get":{"responses":{}}}}}""");
        Assert.Equal("/v1/keys/self", Assert.Single(api.At("/v1/keys/self")).Template);
        Assert.Equal("/v1/keys/{key}", Assert.Single(api.At("/v1/keys/other")).Template);
        Assert.Empty(api.At("/v1/keys/other/more"));
    }

    private static async Task<string?> FlawAsync(HttpMethod method, string address, HttpResponseMessage answer)
    {
        var check = new ContractCheck(new DescribedApi(Description)) { InnerHandler = new Answering(answer) };
        using var client = new HttpClient(check) { BaseAddress = new Uri("http://localhost") };
        var request = new HttpRequestMessage(method, address);
        return (await Record.ExceptionAsync(() => client.SendAsync(request, TestContext.Current.CancellationToken)) as FailException)?.Message;
    }

    private sealed class Answering(HttpResponseMessage answer) : HttpMessageHandler
    {
        protected override Task<HttpResponseMessage> SendAsync(HttpRequestMessage request, CancellationToken cancellationToken) =>
            Task.FromResult(answer);
    }
}
