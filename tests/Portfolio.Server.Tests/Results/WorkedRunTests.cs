using System.Text.Json;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Runs;

namespace Portfolio.Server.Tests.Results;

/// <summary>From the document to the figures, through HTTP alone and worked by the server's own worker.</summary>
public sealed class WorkedRunTests(ServerFixture fixture) : IClassFixture<ServerFixture>
{
    [Fact]
    public async Task WhatIsPostedIsWorkedAndReadBack()
    {
        var client = fixture.Server.Client();
        await FinishedRuns.PutAsync(fixture.Server, "whole");
        var run = await client.SucceedAsync("whole", $$"""{"iterations":{{SmallPortfolio.Iterations}},"recorded":true}""");
        var expected = SmallPortfolio.Finish(SmallPortfolio.Plan(), SmallPortfolio.Facts());
        Assert.Equal(expected.ResultDigest, run.GetProperty("resultDigest").GetString());
        Assert.NotEqual(0, run.GetProperty("warnings").GetArrayLength());

        var list = await (await client.ReadAsync("/v1/portfolios/whole/runs/latest/results")).JsonAsync();
        foreach (var (row, kept) in list.GetProperty("items").EnumerateArray().Zip(FinishedRunTests.Rows(expected).Values))
        {
            Assert.Equal(kept.Scope, row.GetProperty("scope").GetString());
            Assert.Equal(kept.Finish.Mean?.ToString("yyyy-MM-dd", null), row.GetProperty("finish").GetProperty("mean").GetString());
        }
        foreach (var address in new[] { "series?metric=cost", "contingency", "runs/latest/distribution", "runs/latest/results?levels=33.25" })
            Assert.Equal(JsonValueKind.Object, (await (await client.ReadAsync($"/v1/portfolios/whole/{address}")).JsonAsync()).ValueKind);
    }
}
