using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Parts;
using Portfolio.Store.Access;

namespace Portfolio.Server.Tests.Updates;

/// <summary>Updates sent as a table.</summary>
public sealed class UpdateTableTests(ServerFixture fixture) : IClassFixture<ServerFixture>
{
    private static int next;

    private readonly HttpClient client = fixture.Server.Client();

    private Task<string> PortfolioAsync() => client.PortfolioAsync($"tabled-{Interlocked.Increment(ref next)}");

    [Theory]
    [InlineData("project,statusDate,overhead.actual\r\nweir,2027-02-01,7.25\r\n", """{"updates":[{"project":"weir","statusDate":"2027-02-01","overhead":{"actual":7.25}}]}""")]
    [InlineData("\uFEFFproject,activity,statusDate,actualStart,remaining.type,remaining.low,remaining.mode,remaining.high\nweir,,2027-02-01,,,,,\nweir,A10,,2027-01-05,pert,1,2.5,4\n", """{"updates":[{"project":"weir","statusDate":"2027-02-01","activities":[{"id":"A10","actualStart":"2027-01-05","remaining":{"type":"pert","low":1,"mode":2.5,"high":4}}]}]}""")]
    [InlineData("project,activity,create,duration,cost.fixed,cost.actual,cost.perDay.type,cost.perDay.value\nweir,A10,,12,,5,constant,3\nquay,B30,TRUE,4,9,,,\n", """{"updates":[{"project":"weir","activities":[{"id":"A10","duration":12,"cost":{"actual":5,"perDay":{"type":"constant","value":3}}}]},{"project":"quay","create":true,"activities":[{"id":"B30","duration":4,"cost":{"fixed":9}}]}]}""")]
    [InlineData("activity,project,duration.type,duration.low,duration.high,name,tags.fund\nA20,weir,uniform,1,2,\"Stop, \"\"log\"\"\",eu\nA10,weir,,,,null,\n", """{"updates":[{"project":"weir","activities":[{"id":"A20","name":"Stop, \"log\"","tags":{"fund":"eu"},"duration":{"type":"uniform","low":1,"high":2}},{"id":"A10","name":null}]}]}""")]
    [InlineData("project,overhead,programme,priority\nweir,null,null,3\n", """{"updates":[{"project":"weir","overhead":null,"programme":null,"priority":3}]}""")]
    [InlineData("project,activity,milestone,duration.type,duration.low,commitment\nweir,A30,true,null,null,2027-09-01\n", null)]
    public async Task ATableSaysWhatTheEqualJsonSays(string csv, string? json)
    {
        var (tabled, spoken) = (await PortfolioAsync(), await PortfolioAsync());
        if (json is null)
        {
            Assert.Equal(["activity.unknown 2:2"], await (await client.UpdateTableAsync(tabled, csv)).WhereAsync());
            return;
        }
        await (await client.UpdateAsync(spoken, json)).WrittenAsync(200, 2);
        await (await client.UpdateTableAsync(tabled, csv)).WrittenAsync(200, 2);
        Assert.Equal(await client.DocumentAsync(spoken), await client.DocumentAsync(tabled));
    }

    [Theory]
    [InlineData("project,activity,colour,predecessors,name,name\nweir,A10,red,A20,n,m\n", "column.unknown 1:3", "column.list 1:4", "column.repeated 1:6")]
    [InlineData("project,activity,duration,cost.actual,milestone\nweir,A10,\"1,5\",5e,yes\n", "cell.value 2:3", "cell.value 2:4", "cell.value 2:5")]
    [InlineData("project,activity,statusDate\nweir,A10,2027-02-01\n", "cell.place 2:3")]
    [InlineData("project,activity,actualStart\nweir,,2027-02-01\n", "cell.place 2:3")]
    [InlineData("project,activity,duration,duration.type\nweir,A10,4,constant\n", "cell.conflict 2:4")]
    [InlineData("project,activity\nweir,A10,extra\n,A10\n", "row.cells 2:2", "member.missing 3:1")]
    [InlineData("activity\nA10\n", "member.missing 1:1", "member.missing 2:1")]
    [InlineData("", "member.missing 1:1")]
    [InlineData("project,activity,name\nweir,A10,a\nquay,B10,\"two\nlines\"\nweir,A10,b\nweir,,x\nweir,,y\n", "text.control 3:3", "id.duplicate 5:2", "id.duplicate 7:1")]
    [InlineData("project,activity,remaining.type,remaining.low,remaining.mode,remaining.high,actualStart,statusDate\nweir,,,,,,,2027-02-01\nweir,A10,pert,5,2,9,2027-01-05,\n", "distribution.order 3:3")]
    [InlineData("project,activity,remaining.type,remaining.low,actualStart,statusDate\nweir,,,,,2027-02-01\nweir,A10,gamma,5,2027-01-05,\n", "type.unknown 3:3")]
    [InlineData("project,name\ndam,x\nweir,\n", "project.unknown 2:1")]
    [InlineData("project,activity,create,duration\nweir,A98,maybe,1\n", "cell.value 2:3")]
    [InlineData("project,priority\nweir,1.5\n", "number.not-whole 2:2")]
    public async Task WhatIsWrongIsNamedByLineAndCell(string csv, params string[] faults)
    {
        var portfolio = await PortfolioAsync();
        var before = await client.DocumentAsync(portfolio);
        Assert.Equal(faults, await (await client.UpdateTableAsync(portfolio, csv)).WhereAsync());
        Assert.Equal(before, await client.DocumentAsync(portfolio));
    }

    [Fact]
    public async Task BrokenQuotesAndForeignLettersAreNoTable()
    {
        var portfolio = await PortfolioAsync();
        var broken = await (await client.UpdateTableAsync(portfolio, "project,name\nquay,q\nweir,\"x\" y\n")).ProblemAsync(400, "malformed");
        Assert.Equal(3, broken.GetProperty("errors")[0].GetProperty("line").GetInt32());
        var latin = new StringContent("project,name\nweir,x\n", System.Text.Encoding.Latin1, "text/csv");
        await (await client.PostAsync($"{portfolio}/updates", latin, TestContext.Current.CancellationToken)).ProblemAsync(415, "unsupported-media-type");
    }

    [Fact]
    public async Task LettersOfAnotherEncodingAreNotKeptInPieces()
    {
        var portfolio = await PortfolioAsync();
        var sent = new ByteArrayContent(System.Text.Encoding.Latin1.GetBytes("project,name\nquay,q\nweir,Schleuse Süd\n"));
        sent.Headers.ContentType = new("text/csv");
        var refused = await (await client.PostAsync($"{portfolio}/updates", sent, TestContext.Current.CancellationToken)).ProblemAsync(400, "malformed");
        var fault = Assert.Single(refused.GetProperty("errors").EnumerateArray());
        Assert.Equal(("table.malformed", 3), (fault.GetProperty("code").GetString(), fault.GetProperty("line").GetInt32()));
        Assert.False(fault.TryGetProperty("path", out _), "Line and column stand for it.");
    }

    [Theory]
    [InlineData(";")]
    [InlineData("\t")]
    public async Task AnotherSignBetweenCellsIsSaid(string sign)
    {
        var refused = await client.UpdateTableAsync(await PortfolioAsync(), $"project{sign}name\n");
        Assert.Contains("separated by commas", (await refused.ProblemAsync(422, "refused")).GetProperty("errors")[0].GetProperty("message").GetString());
    }

    [Fact]
    public async Task AWideTableIsReadInTimeThatGrowsWithItsCells()
    {
        // Half a minute is the longest a request may take: far more than these cells need, far less than each with each.
        var (tags, cells) = (string.Join(',', Enumerable.Range(0, 60_000).Select(i => $"tags.t{i}")), string.Join(',', Enumerable.Repeat("\u0001", 60_000)));
        await (await client.UpdateTableAsync(await PortfolioAsync(), $"{tags},project\n{cells},weir\n")).ProblemAsync(422, "refused");
    }

    [Fact]
    public async Task WhoMaySubmitIsToldTheCellsBeyondItsRight()
    {
        var portfolio = await PortfolioAsync();
        var submitter = await fixture.Server.ClientAsync(new Grant(Right.Submit, portfolio["/v1/portfolios/".Length..], ["weir"]));
        var answer = await submitter.UpdateTableAsync(portfolio, "project,activity,name,statusDate\nweir,A10,n,\nweir,,n,2027-02-01\n");
        Assert.Equal(["right.missing 3:3"], await answer.WhereAsync(403, "forbidden"));
        Assert.Equal(["right.missing 2:1"], await (await submitter.UpdateTableAsync(portfolio, "project\nquay\n")).WhereAsync(403, "forbidden"));
    }
}
