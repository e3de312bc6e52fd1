using Portfolio.Server.Tests.Hosting;

namespace Portfolio.Server.Tests;

/// <summary>Refused documents: everything wrong is named, and nothing is kept.</summary>
public sealed class RefusedDocumentTests(ServerFixture fixture) : IClassFixture<ServerFixture>
{
    private readonly HttpClient client = fixture.Server.Client();

    [Fact]
    public async Task TenDifferentFaultsComeInOneAnswer()
    {
        const string document = """
            {"settings":{"name":"Ten","weekEnds":"Friday","fiscalYearStart":"02-30","seed":1.5,"indices":[]},
             "projects":[{"id":"p","statusDate":"2027-13-01","correlation":1e999,"activities":[
               {"id":"A","duration":{"type":"gamma"}},
               {"id":"B","duration":{"type":"pert","low":"1","mode":2,"high":3}},
               {"id":"C","duration":1,"predecessors":[{"activity":"A","type":"XX"}]}]}]}
            """;
        var problem = await (await client.PutJsonAsync("/v1/portfolios/ten/document", document)).ProblemAsync(422, "refused");
        (string, string)[] expected =
        [
            ("/settings", "member.missing"),
            ("/settings/weekEnds", "value.unknown"),
            ("/settings/fiscalYearStart", "date.format"),
            ("/settings/seed", "number.not-whole"),
            ("/settings/indices", "member.reserved"),
            ("/projects/0/statusDate", "date.format"),
            ("/projects/0/correlation", "number.not-finite"),
            ("/projects/0/activities/0/duration/type", "type.unknown"),
            ("/projects/0/activities/1/duration/low", "member.kind"),
            ("/projects/0/activities/2/predecessors/0/type", "type.unknown"),
        ];
        Assert.Equal(expected, problem.Faults());
        Assert.Equal("p/B", problem.GetProperty("errors")[8].GetProperty("subject").GetString());
        await (await client.ReadAsync("/v1/portfolios/ten/document")).ProblemAsync(404, "not-found");
        Assert.DoesNotContain("\"ten\"", await (await client.ReadAsync("/v1/portfolios")).TextAsync());
    }

    [Fact]
    public async Task ShapeMeaningAndArithmeticAreReportedTogether()
    {
        const string document = """
            {"settings":{"name":"Three","currency":"EUR","drivers":[{"id":"d","durationFactor":1.1}],
                         "dependence":{"pairs":[{"between":["driver/d","project/p"],"rank":0.9},{"between":["driver/d","project/q"],"rank":0.9},
                                                {"between":["project/p","project/q"],"rank":-0.9}]}},
             "projects":[{"id":"p","statusDate":"2027-01-04","activities":[
               {"id":"A","duration":{"type":"pert","low":1,"mode":2,"high":30,"lowPercentile":10,"highPercentile":90}},
               {"id":"A","duration":2},
               {"id":"C","duration":1e999}]},
              {"id":"q","statusDate":"2027-01-04"}]}
            """;
        var problem = await (await client.PutJsonAsync("/v1/portfolios/three/document", document)).ProblemAsync(422, "refused");
        Assert.Equal(
            [("/settings/dependence", "dependence.not-positive"), ("/projects/0/activities/1/id", "id.duplicate"), ("/projects/0/activities/2/duration", "number.not-finite")],
            problem.Faults().Where(fault => fault.Code != "distribution.negative"));
    }

    [Theory]
    [InlineData("{\"settings\":\n{\"name\":\"x\",}}", "/settings/name", "json.malformed", 2)]
    [InlineData("{\"settings\":{\"name\":\"x\"},\n\"projets\":[]}", "/projets", "member.unknown", 2)]
    [InlineData("{\"settings\":{\"name\":\"x\",\"name\":\"y\"}}", "/settings/name", "member.duplicate", 1)]
    [InlineData("{\"settings\":[]}", "/settings", "member.kind", 1)]
    [InlineData("{\"settings\":{\"indices\":[[[[[[[[[[[[[[[[[]]]]]]]]]]]]]]]]]}}", "/settings/indices/0/0/0/0/0/0/0/0/0/0/0/0/0/0", "json.depth", 1)]
    public async Task UnreadableTextNamesTheFirstPlace(string document, string path, string code, int line)
    {
        var problem = await (await client.PutJsonAsync("/v1/portfolios/unread/document", document)).ProblemAsync(400, "malformed");
        Assert.Equal([(path, code)], problem.Faults());
        Assert.Equal(line, problem.GetProperty("errors")[0].GetProperty("line").GetInt32());
        Assert.DoesNotContain("System.", problem.ToString());
        Assert.DoesNotContain("Json", problem.GetProperty("detail").GetString()!.Replace("JSON", ""));
        await (await client.ReadAsync("/v1/portfolios/unread/document")).ProblemAsync(404, "not-found");
    }

    [Fact]
    public async Task ARefusedReplacementLeavesWhatWasThere()
    {
        await client.PutJsonAsync("/v1/portfolios/kept/document", Samples.Document());
        await (await client.PutJsonAsync("/v1/portfolios/kept/document", "{}", "*")).ProblemAsync(422, "refused");
        Assert.Equal(Samples.Document(), await (await client.ReadAsync("/v1/portfolios/kept/document")).TextAsync());
    }

    [Fact]
    public async Task AThousandFaultsAreListedAndTheRestCounted()
    {
        var activities = string.Join(",", Enumerable.Range(0, 1003).Select(i => $$"""{"id":"A{{i}}","duration":{"type":"x"} }"""));
        var document = $$"""{"settings":{"name":"n","currency":"EUR"},"projects":[{"id":"p","statusDate":"2027-01-04","activities":[{{activities}}]}]}""";
        var problem = await (await client.PutJsonAsync("/v1/portfolios/many/document", document)).ProblemAsync(422, "refused");
        Assert.Equal(1000, problem.GetProperty("errors").GetArrayLength());
        Assert.Equal(3, problem.GetProperty("errorsOmitted").GetInt32());
    }
}
