using System.Text.Json;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Store.Access;

namespace Portfolio.Server.Tests.Results;

/// <summary>
/// Five points: Saturday and Sunday of one week (weeks end on Sunday), the two days after, and a first day of the next month.
/// </summary>
public sealed class SeriesFixture : IAsyncLifetime
{
    internal static readonly DateOnly[] Dates = [new(2026, 11, 28), new(2026, 11, 29), new(2026, 11, 30), new(2026, 12, 1), new(2027, 1, 3)];

    internal PortfolioServer Server { get; } = FinishedRuns.Server();

    public async ValueTask InitializeAsync()
    {
        await FinishedRuns.PutAsync(Server, "works");
        foreach (var (later, date) in Dates.Index())
            await FinishedRuns.MakeAsync(Server, "works", date, keepSamples: false, [.. SmallPortfolio.Projects.Select(project => Grown(project, later))]);
    }

    // The weir's shortest duration grows from point to point.
    private static string Grown(string project, int days) => project.Replace("\"low\":40", $"\"low\":{40 + days}", StringComparison.Ordinal);

    public ValueTask DisposeAsync() => Server.DisposeAsync();
}

public sealed class SeriesEndpointTests(SeriesFixture fixture) : IClassFixture<SeriesFixture>
{
    private const string Address = "/v1/portfolios/works/series";

    private readonly HttpClient client = fixture.Server.Client();

    [Theory]
    [InlineData("run", "2026-11-28 2026-11-29 2026-11-30 2026-12-01 2027-01-03")]
    [InlineData("day", "2026-11-28 2026-11-29 2026-11-30 2026-12-01 2027-01-03")]
    [InlineData("week", "2026-11-29 2026-12-01 2027-01-03")]
    [InlineData("month", "2026-11-30 2026-12-01 2027-01-03")]
    public async Task TheLastPointOfEachIntervalStandsForIt(string every, string dates)
    {
        var series = await ReadAsync($"every={every}&scope=project/weir");
        Assert.Equal(dates.Split(' '), Points(series).Select(point => point.GetProperty("asOf").GetString()));
    }

    [Fact]
    public async Task FinishesMoveInDays()
    {
        var points = Points(await ReadAsync("scope=project/weir&level=50"));
        Assert.False(points[0].TryGetProperty("changeDays", out _));
        var dates = points.Select(point => DateOnly.Parse(point.GetProperty("value").GetString()!, null)).ToArray();
        for (var i = 1; i < points.Length; i++) Assert.Equal(dates[i].DayNumber - dates[i - 1].DayNumber, points[i].GetProperty("changeDays").GetInt32());
        Assert.True(dates[^1] > dates[0]); // the estimate grew
        var row = await (await client.ReadAsync($"/v1/portfolios/works/runs/{points[2].GetProperty("run").GetString()}/results/project/weir")).JsonAsync();
        var level = row.GetProperty("finish").GetProperty("percentiles")[0];
        foreach (var member in new[] { "value", "samplingLow", "samplingHigh" })
            Assert.Equal(level.GetProperty(member).GetString(), points[2].GetProperty(member).GetString());
        Assert.Equal(row.GetProperty("finish").GetProperty("base").GetString(), points[2].GetProperty("base").GetString());
    }

    [Fact]
    public async Task ContingencyOfPartsIsWhatIsAllocatedAndMakesTheTotal()
    {
        var whole = Points(await ReadAsync("metric=contingency"));
        var locks = Points(await ReadAsync("metric=contingency&scope=programme/locks"));
        var harbour = Points(await ReadAsync("metric=contingency&scope=programme/harbour"));
        var weir = Points(await ReadAsync("metric=contingency&scope=project/weir"));
        for (var i = 0; i < whole.Length; i++)
        {
            Assert.Equal(Value(whole[i]), Value(locks[i]) + Value(harbour[i]));
            var json = await (await client.ReadAsync($"/v1/portfolios/works/contingency?asOf={whole[i].GetProperty("asOf").GetString()}")).JsonAsync();
            Assert.Equal(json.GetProperty("total").GetDecimal(), Value(whole[i]));
            var line = json.GetProperty("allocations")[0];
            Assert.Equal(line.GetProperty("allocated").GetDecimal(), Value(weir[i]));
            Assert.Equal(Value(weir[i]) + line.GetProperty("error").GetDecimal(), weir[i].GetProperty("samplingHigh").GetDecimal());
        }
        Assert.Equal(Value(whole[1]) - Value(whole[0]), whole[1].GetProperty("change").GetDecimal());
    }

    [Fact]
    public async Task DatesCanBeBounded()
    {
        var points = Points(await ReadAsync("metric=cost&from=2026-11-29&to=2026-11-30"));
        Assert.Equal(["2026-11-29", "2026-11-30"], points.Select(point => point.GetProperty("asOf").GetString()));
        Assert.Empty(Points(await ReadAsync("from=2030-01-01")));
    }

    [Fact]
    public async Task CsvHasOneLineForEachPoint()
    {
        var lines = (await (await client.ReadAsync($"{Address}?format=csv&scope=milestone/quay/S")).TextAsync()).Split("\r\n");
        Assert.Equal("asOf,run,revision,scope,metric,level,value,samplingLow,samplingHigh,base,change", lines[0]);
        Assert.Equal(SeriesFixture.Dates.Select(date => date.ToString("yyyy-MM-dd", null)), lines[1..^1].Select(line => line[..10]));
    }

    [Theory]
    [InlineData("scope=nothing", "scope")]
    [InlineData("metric=effort", "metric")]
    [InlineData("metric=contingency&scope=milestone/weir/M", "metric")]
    [InlineData("level=0", "level")]
    [InlineData("level=33.25", "level")] // kept by no run
    [InlineData("every=year", "every")]
    [InlineData("from=yesterday", "from")]
    public async Task AFaultNamesItsParameter(string query, string parameter)
    {
        var problem = await (await client.ReadAsync($"{Address}?{query}")).ProblemAsync(422, "refused");
        Assert.Equal(parameter, Assert.Single(problem.GetProperty("errors").EnumerateArray()).GetProperty("subject").GetString());
    }

    [Fact]
    public async Task UnknownScopesAre404AndTotalsAreForThoseWhoReadAll()
    {
        await (await client.ReadAsync($"{Address}?scope=project/none")).ProblemAsync(404, "not-found");
        var limited = await fixture.Server.ClientAsync(new Grant(Right.Read, "works", ["weir"]));
        Assert.Equal(5, Points(await (await limited.ReadAsync($"{Address}?scope=project/weir&metric=cost")).JsonAsync()).Length);
        foreach (var query in new[] { "", "?scope=programme/locks", "?metric=contingency&scope=project/weir" })
            await (await limited.ReadAsync(Address + query)).ProblemAsync(403, "forbidden");
        await (await limited.ReadAsync($"{Address}?scope=project/quay")).ProblemAsync(404, "not-found");
    }

    private async Task<JsonElement> ReadAsync(string query) => await (await client.ReadAsync($"{Address}?{query}")).JsonAsync();

    private static JsonElement[] Points(JsonElement series) => [.. series.GetProperty("points").EnumerateArray()];

    private static decimal Value(JsonElement point) => point.GetProperty("value").GetDecimal();
}
