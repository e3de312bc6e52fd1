using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Runs;

namespace Portfolio.Server.Tests;

/// <summary>Parameters of addresses that cannot be read or taken: named one by one, the same way everywhere (422).</summary>
public sealed class ParameterTests(ServerFixture fixture) : IClassFixture<ServerFixture>
{
    private readonly HttpClient client = fixture.Server.Client();

    [Theory]
    [InlineData("document?revision=first", "revision")]
    [InlineData("document?asOf=5-January", "asOf")]
    [InlineData("document?revision=1&asOf=2027-01-04", "asOf")]
    [InlineData("settings?revision=first", "revision")]
    [InlineData("revisions?limit=0", "limit")]
    [InlineData("revisions?limit=many", "limit")]
    [InlineData("revisions?cursor=next", "cursor")]
    [InlineData("runs?limit=1001", "limit")]
    [InlineData("runs/latest?asOf=5-January", "asOf")]
    [InlineData("runs/RUN?asOf=2027-01-04", "asOf")]
    [InlineData("runs/RUN/results?asOf=2027-01-04", "asOf")]
    [InlineData("runs/latest/results?limit=0", "limit")]
    [InlineData("contingency?run=RUN&asOf=2027-01-04", "asOf")]
    [InlineData("series?every=year", "every")]
    public async Task AParameterThatCannotBeTakenIsNamed(string address, string parameter)
    {
        var run = await RunAsync("asked");
        var answer = await client.ReadAsync("/v1/portfolios/asked/" + address.Replace("RUN", run));
        var fault = Assert.Single((await answer.ProblemAsync(422, "refused")).GetProperty("errors").EnumerateArray());
        Assert.Equal(
            ("", parameter, "parameter.invalid"),
            (fault.GetProperty("path").GetString(), fault.GetProperty("subject").GetString(), fault.GetProperty("code").GetString()));
    }

    [Theory]
    [InlineData("revisions")]
    [InlineData("projects")]
    [InlineData("runs")]
    [InlineData("events")]
    [InlineData("subscriptions")]
    public async Task APortfolioThatIsNotThereHasNoEmptyLists(string list) =>
        await (await client.ReadAsync("/v1/portfolios/never/" + list)).ProblemAsync(404, "not-found");

    [Fact]
    public async Task ANoteThatIsTooLongIsNamed()
    {
        var answer = await client.PutJsonAsync($"/v1/portfolios/noted/document?note={new string('n', 501)}", Samples.Document());
        Assert.Equal([("", "parameter.invalid")], (await answer.ProblemAsync(422, "refused")).Faults());
    }

    [Theory]
    [InlineData("a%20b")]
    [InlineData("-a")]
    [InlineData("ufer%C3%BC")]
    [InlineData("a%2Fb")]
    [InlineData("aaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaa")]
    public async Task APortfolioIsNamedLikeAnythingElse(string id)
    {
        var refused = await (await client.PutJsonAsync($"/v1/portfolios/{id}/document", "{}")).ProblemAsync(422, "refused");
        Assert.Equal(("", "id.format"), refused.Faults()[0]);
        Assert.True(refused.Faults().Count > 1, "What is wrong with the document is said as well.");
        await (await client.PutJsonAsync($"/v1/portfolios/{id}/document", Samples.Document())).ProblemAsync(422, "refused");
    }

    private async Task<string> RunAsync(string portfolio)
    {
        await client.PutJsonAsync($"/v1/portfolios/{portfolio}/document", Samples.Document());
        return (await client.SucceedAsync(portfolio, """{"iterations":10}""")).GetProperty("id").GetString()!;
    }
}
