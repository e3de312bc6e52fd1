using System.Text.Json;
using Portfolio.Server.Tests.Hosting;

namespace Portfolio.Server.Tests.Results;

public sealed class DistributionEndpointTests(FinishedRunFixture fixture) : IClassFixture<FinishedRunFixture>
{
    private readonly HttpClient client = fixture.Server.Client();

    [Theory]
    [InlineData("scope=portfolio", 5000)]
    [InlineData("scope=programme/locks&bin=day", 5000)]
    [InlineData("scope=project/weir&bin=month", 5000)]
    [InlineData("metric=cost&bin=7", 5000)]
    [InlineData("metric=cost&scope=project/quay", 5000)]
    public async Task BinsFollowOneAnotherAndHoldAllIterations(string query, int iterations)
    {
        var json = await ReadAsync(query);
        var bins = json.GetProperty("bins").EnumerateArray().ToArray();
        Assert.Equal(iterations, json.GetProperty("iterations").GetInt32());
        Assert.Equal(iterations, bins.Sum(bin => bin.GetProperty("count").GetInt32()));
        Assert.Equal(1, bins[^1].GetProperty("cumulative").GetDouble());
        foreach (var (before, after) in bins.Zip(bins.Skip(1)))
        {
            if (after.GetProperty("from").ValueKind == JsonValueKind.String)
                Assert.Equal(DateOnly.Parse(before.GetProperty("to").GetString()!, null).AddDays(1), DateOnly.Parse(after.GetProperty("from").GetString()!, null));
            else
                Assert.Equal(before.GetProperty("to").GetDecimal() + 0.01m, after.GetProperty("from").GetDecimal());
        }
    }

    [Fact]
    public async Task WeeksEndWhereTheSettingsSay()
    {
        var bins = (await ReadAsync("scope=project/weir&bin=week")).GetProperty("bins").EnumerateArray();
        Assert.All(bins, bin => Assert.Equal(DayOfWeek.Sunday, DateOnly.Parse(bin.GetProperty("to").GetString()!, null).DayOfWeek));
    }

    [Fact]
    public async Task TheCumulativeTableAgreesWithTheCommitmentsProbability()
    {
        var row = await (await client.ReadAsync("/v1/portfolios/works/runs/latest/results/project/weir")).JsonAsync();
        var commitment = row.GetProperty("finish").GetProperty("commitment");
        var bin = (await ReadAsync("scope=project/weir&bin=day")).GetProperty("bins").EnumerateArray()
            .Single(bin => bin.GetProperty("to").GetString() == commitment.GetProperty("date").GetString());
        Assert.Equal(commitment.GetProperty("probability").GetDouble(), bin.GetProperty("cumulative").GetDouble());
    }

    [Fact]
    public async Task OnlyIterationsInWhichAMilestoneHappensCount()
    {
        var row = await (await client.ReadAsync("/v1/portfolios/works/runs/latest/results/milestone/quay/S")).JsonAsync();
        var json = await ReadAsync("scope=milestone/quay/S");
        Assert.Equal(row.GetProperty("happens").GetDouble() * 5000, json.GetProperty("iterations").GetInt32(), 1e-9);
    }

    private async Task<JsonElement> ReadAsync(string query) =>
        await (await client.ReadAsync($"/v1/portfolios/works/runs/latest/distribution?{query}")).JsonAsync();
}
