using System.Net;
using System.Text.Json;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Store.Access;

namespace Portfolio.Server.Tests.Results;

public sealed class ContingencyEndpointTests(FinishedRunFixture fixture) : IClassFixture<FinishedRunFixture>
{
    private const string Address = "/v1/portfolios/works/contingency";

    private readonly HttpClient client = fixture.Server.Client();

    [Theory]
    [InlineData("")]
    [InlineData("?level=50")]
    [InlineData("?level=82.5")]
    [InlineData("?level=33.25")] // in no grid: shared out again from the iterations
    public async Task AllocationsMakeTheTotalToTheCent(string query)
    {
        var json = await (await client.ReadAsync(Address + query)).JsonAsync();
        decimal Of(string member) => json.GetProperty(member).GetDecimal();
        var lines = json.GetProperty("allocations").EnumerateArray().ToArray();
        Assert.Equal(["weir", "quay", "pumps"], lines.Select(line => line.GetProperty("project").GetString()));
        Assert.Equal(Of("total"), lines.Sum(line => line.GetProperty("allocated").GetDecimal()));
        Assert.Equal(Of("base"), lines.Sum(line => line.GetProperty("base").GetDecimal()));
        Assert.Equal(Of("total"), Of("costAtLevel") - Of("base"));
        Assert.Equal(Of("sumOfStandalone"), lines.Sum(line => line.GetProperty("standalone").GetDecimal()));
        Assert.Equal(Of("diversification"), Of("sumOfStandalone") - Of("total"));
        Assert.All(lines, line => Assert.True(line.GetProperty("error").GetDecimal() >= 0));
        Assert.All(lines, line => Assert.Equal(
            Of("total") > 0 ? (double)(line.GetProperty("allocated").GetDecimal() / Of("total")) : null,
            line.GetProperty("share").ValueKind == JsonValueKind.Null ? null : line.GetProperty("share").GetDouble(), new Near()));
        Assert.False(json.TryGetProperty("held", out _)); // nobody can say yet what is held
    }

    [Fact]
    public async Task SharesAreNullWhenNothingIsNeeded()
    {
        var json = await (await client.ReadAsync(Address + "?level=0.5")).JsonAsync();
        Assert.True(json.GetProperty("total").GetDecimal() <= 0);
        Assert.All(json.GetProperty("allocations").EnumerateArray(), line => Assert.Equal(JsonValueKind.Null, line.GetProperty("share").ValueKind));
    }

    [Fact]
    public async Task ItAgreesWithTheResults()
    {
        var row = await (await client.ReadAsync("/v1/portfolios/works/runs/latest/results/portfolio?levels=80")).JsonAsync();
        var response = await client.ReadAsync(Address);
        var json = await response.JsonAsync();
        Assert.Equal(row.GetProperty("cost").GetProperty("percentiles")[0].GetProperty("value").GetDecimal(), json.GetProperty("costAtLevel").GetDecimal());
        Assert.Equal($"{Address}?run={fixture.Run}", response.Content.Headers.ContentLocation!.OriginalString);
        Assert.Equal(await response.TextAsync(), await (await client.ReadAsync($"{Address}?run={fixture.Run}")).TextAsync());
        Assert.Equal(await response.TextAsync(), await (await client.ReadAsync($"{Address}?asOf=2027-01-04")).TextAsync());
        Assert.Equal(HttpStatusCode.NotModified, (await client.ReadAsync(Address, response.Tag())).StatusCode);
    }

    [Fact]
    public async Task CsvHasOneLineForEachProject()
    {
        var lines = (await (await client.ReadAsync(Address + "?format=csv")).TextAsync()).Split("\r\n");
        Assert.Equal("run,asOf,revision,level,project,base,allocated,error,standalone,share", lines[0]);
        Assert.Equal(["weir", "quay", "pumps"], lines[1..^1].Select(line => line.Split(',')[4]));
    }

    [Fact]
    public async Task ItIsATotal()
    {
        var limited = await fixture.Server.ClientAsync(new Grant(Right.Read, "works", ["weir"]));
        await (await limited.ReadAsync(Address)).ProblemAsync(403, "forbidden");
    }

    [Theory]
    [InlineData("?level=100", "level")]
    [InlineData("?run=0190a6f0-0000-7000-8000-00000000ffff&asOf=2027-01-04", "asOf")]
    public async Task AFaultNamesItsParameter(string query, string parameter)
    {
        var problem = await (await client.ReadAsync(Address + query)).ProblemAsync(422, "refused");
        Assert.Equal(parameter, Assert.Single(problem.GetProperty("errors").EnumerateArray()).GetProperty("subject").GetString());
    }

    private sealed class Near : IEqualityComparer<double?>
    {
        public bool Equals(double? a, double? b) => a is null ? b is null : b is { } known && Math.Abs(a.Value - known) < 1e-12;

        public int GetHashCode(double? value) => 0;
    }
}
