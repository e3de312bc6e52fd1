using System.Text;
using System.Text.Json.Nodes;

namespace Portfolio.Server.Tests.Outside;

/// <summary>
/// Simulations against a simulator that shares no code and draws its own random numbers, at P10, P50, P80 and P90 and in the mean.
/// </summary>
public sealed class SimulationTests
{
    private const int Iterations = 20_000;

    /// <summary>
    /// The simulator outside takes milliseconds for an iteration with pools; such documents are small unless tests may take long.
    /// </summary>
    [Theory]
    [InlineData(4, 50, 0, null, 20_000, false)]
    [InlineData(2, 20, 2, "passing", 2_000, false)]
    [InlineData(2, 20, 2, "inOrder", 2_000, false)]
    [InlineData(6, 40, 3, "passing", 20_000, true)]
    [InlineData(6, 40, 3, "inOrder", 20_000, true)]
    public async Task InventedPortfoliosAgree(int projects, int activities, int pools, string? poolRule, int outside, bool isLong)
    {
        Assert.SkipWhen(isLong && !SharedFolder.Long, "Takes long: set PORTFOLIO_LONG=1.");
        var document = await Invent(projects, activities, pools);
        if (poolRule is not null)
            document["settings"]!["poolRule"] = poolRule;
        await Agree([Encoding.UTF8.GetBytes(document.ToJsonString())], outside);
    }

    [Theory]
    [InlineData(null, 20_000)]
    [InlineData("passing", 2_000)]
    [InlineData("inOrder", 2_000)]
    public async Task RandomDocumentsAgree(string? poolRule, int outside)
    {
        var count = poolRule is null ? 12 : 4;
        var seeds = Enumerable.Range(301, SharedFolder.Long ? count * 5 : count);
        await Agree([.. seeds.Select(seed => RandomDocument.Json(seed, poolRule))], outside);
    }

    /// <summary>Strong ties of every kind, so that leaving any of them out would show in the totals.</summary>
    [Fact]
    public Task StrongDependenceAgrees() => Agree([StrongDependence.Json()], Iterations);

    private static async Task Agree(IReadOnlyList<byte[]> documents, int outside)
    {
        var answers = await Oracle.Simulate([.. documents.Select(d => new OracleJob(d, outside))], TestContext.Current.CancellationToken);
        for (var i = 0; i < documents.Count; i++)
        {
            var plan = Documents.Compile(documents[i]);
            Assert.NotEmpty(answers[i].Scopes);
            var differences = Agreement.Differences(plan, plan.Run(1, Iterations), answers[i]);
            Assert.True(differences.Length == 0, $"document {i}:\n{differences}");
        }
    }

    private static async Task<JsonNode> Invent(int projects, int activities, int pools)
    {
        string[] sizes = ["--projects", $"{projects}", "--activities", $"{activities}", "--pools", $"{pools}", "--drivers", "6"];
        return JsonNode.Parse(await Python.Run([SharedFolder.Check("make_portfolio.py"), .. sizes], "", TestContext.Current.CancellationToken))!;
    }
}
