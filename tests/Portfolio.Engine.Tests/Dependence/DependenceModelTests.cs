using Portfolio.Engine.Dependence;
using Portfolio.Engine.Draws;
using Portfolio.Model.Documents;
using Xunit;

namespace Portfolio.Engine.Tests.Dependence;

/// <summary>Attained correlations against those stated, within 4 standard errors (1 − r²)/√n of n normal pairs, at a fixed seed.</summary>
public sealed class DependenceModelTests
{
    private const int Draws = 200_000;

    // Computed apart in Python: 2·sin(πρ/6) with mpmath 1.2.1.
    [Theory]
    [InlineData(0.1, 0.10467191248589)]
    [InlineData(0.2, 0.20905692653531)]
    [InlineData(0.25, 0.2610523844401)]
    [InlineData(0.3, 0.31286893008046)]
    [InlineData(0.5, 0.51763809020504)]
    [InlineData(0.7, 0.7167358990906)]
    [InlineData(0.9, 0.90798099947909)]
    [InlineData(-0.7, -0.7167358990906)]
    [InlineData(0, 0)]
    [InlineData(1, 1)]
    [InlineData(-1, -1)]
    public void Rank_correlation_enters_as_that_of_the_scores(double rank, double normal)
    {
        Assert.Equal(normal, RankCorrelation.ToNormal(rank), 1e-13);
        Assert.Equal(rank, RankCorrelation.FromNormal(normal), 1e-13);
    }

    [Fact]
    public void Background_programmes_and_pairs_are_attained()
    {
        var settings = Stated(["ground", "price"], 0.2, 0.5, new RankPair("project/a", "project/b", 0.1), new RankPair("project/c", "driver/ground", -0.6));
        var scores = Draw(settings, [("a", "north"), ("b", "north"), ("c", "north"), ("d", "south"), ("e", null)]);
        Attained(RankCorrelation.ToNormal(0.1), scores["a"], scores["b"]); // the pair replaces the background
        Attained(RankCorrelation.ToNormal(0.5), scores["a"], scores["c"]);
        Attained(RankCorrelation.ToNormal(0.2), scores["a"], scores["d"]);
        Attained(RankCorrelation.ToNormal(0.2), scores["d"], scores["e"]);
        Attained(RankCorrelation.ToNormal(-0.6), scores["c"], scores["ground"]);
        Attained(0, scores["ground"], scores["a"]);
        Attained(0, scores["ground"], scores["price"]);
        foreach (var row in scores.Values)
            Attained(1, row, row);
    }

    // The driver's loading times the project's own loading on that factor: r·√β, r·√(ω − β).
    [Fact]
    public void A_driver_tied_to_a_common_factor_reaches_what_lies_under_it()
    {
        var settings = Stated(["market", "weather"], 0.25, 0.6, new RankPair("driver/market", "portfolio", 0.8), new RankPair("programme/north", "driver/weather", 0.7));
        var scores = Draw(settings, [("a", "north"), ("b", "south"), ("c", null)]);
        var (beta, omega) = (RankCorrelation.ToNormal(0.25), RankCorrelation.ToNormal(0.6));
        foreach (var project in (string[])["a", "b", "c"])
            Attained(RankCorrelation.ToNormal(0.8) * Math.Sqrt(beta), scores["market"], scores[project]);
        Attained(RankCorrelation.ToNormal(0.7) * Math.Sqrt(omega - beta), scores["weather"], scores["a"]);
        Attained(0, scores["weather"], scores["b"]);
        Attained(0, scores["weather"], scores["market"]);
        Attained(1, scores["weather"], scores["weather"]);
    }

    [Fact]
    public void Nodes_that_nothing_ties_are_their_own_draws()
    {
        var scores = Draw(Stated(["ground"], 0, null), [("a", null), ("b", "north")], first: 77, count: 33);
        var own = new double[33];
        foreach (var (id, key) in new[] { ("ground", "driver/ground"), ("a", "project/a"), ("b", "project/b") })
        {
            NormalScore.Fill(1, DrawKey.Hash(key), 77, own);
            Assert.Equal(own, scores[id]);
        }
    }

    [Fact]
    public void Neither_the_order_of_the_document_nor_a_pair_elsewhere_changes_a_draw()
    {
        RankPair[] pairs = [new("project/a", "project/b", 0.4), new("project/c", "driver/ground", 0.3)];
        var before = Draw(Stated(["ground", "price"], 0.2, 0.5, pairs), [("a", "north"), ("b", null), ("c", "south"), ("d", null)], count: 500);
        var after = Draw(
            Stated(["price", "ground"], 0.2, 0.5, pairs[1], pairs[0], new RankPair("project/d", "project/e", 0.7)),
            [("e", "north"), ("d", null), ("c", "south"), ("b", null), ("a", "north")], count: 500);
        foreach (var id in (string[])["a", "b", "c", "d", "ground", "price"])
            Assert.Equal(before[id], after[id]);
    }

    [Fact]
    public void Any_split_of_the_iterations_gives_the_same_bits()
    {
        var settings = Stated(["ground"], 0.2, 0.5, new RankPair("project/a", "driver/ground", 0.4));
        (string, string?)[] projects = [("a", "north"), ("b", "north")];
        var whole = Draw(settings, projects, first: 0, count: 1000);
        foreach (var (first, count) in new[] { (0, 1), (1, 17), (512, 64), (999, 1) })
        {
            foreach (var (id, row) in Draw(settings, projects, first, count))
                Assert.Equal(whole[id][first..(first + count)], row);
        }
    }

    [Fact]
    public void Perfect_ranks_need_no_repair()
    {
        var scores = Draw(Stated(["a", "b", "c"], 0, null, new RankPair("driver/a", "driver/b", 1), new RankPair("driver/b", "driver/c", -1), new RankPair("driver/a", "driver/c", -1)), []);
        Assert.Equal(scores["a"], scores["b"]);
        Attained(-1, scores["a"], scores["c"]);
    }

    [Fact]
    public void Repair_reports_every_pair_that_changed_and_is_attained()
    {
        var settings = Stated(
            ["a", "b", "c"], 0, null, new RankPair("driver/a", "driver/b", 0.9), new RankPair("driver/a", "driver/c", 0.9), new RankPair("driver/b", "driver/c", -0.9));
        settings = settings with { Dependence = settings.Dependence with { Repair = MatrixRepair.Nearest } };
        var model = DependenceModel.Build(settings, []);
        var half = RankCorrelation.FromNormal(0.5); // the nearest matrix has ±.5
        Assert.Equal(["driver/a driver/b", "driver/a driver/c", "driver/b driver/c"], model.Repaired.Select(c => $"{c.First} {c.Second}"));
        Assert.Equal([0.9, 0.9, -0.9], model.Repaired.Select(c => Math.Round(c.Stated, 9)));
        Assert.Equal([half, half, -half], model.Repaired.Select(c => c.Used), (x, y) => Math.Abs(x - y) < 1e-8);
        var scores = Draw(settings, []);
        Attained(0.5, scores["a"], scores["b"]);
        Attained(-0.5, scores["b"], scores["c"]);
    }

    [Fact]
    public void Projects_that_dependence_cannot_reach_are_named()
    {
        var settings = Stated([], 0, 0.3, new RankPair("project/c", "project/d", 0.2));
        Project[] projects =
        [
            One("a", "north"), One("b", null), One("c", null), One("d", null) with { Correlation = 0.2 }, One("e", "north") with { Correlation = 0 },
        ];
        Assert.Equal(["a", "c", "e"], DependenceModel.Build(settings, projects).WithoutEffect);
    }

    private static void Attained(double expected, double[] x, double[] y)
    {
        var sum = 0.0;
        for (var i = 0; i < x.Length; i++)
            sum += x[i] * y[i];
        // Mean product of standard normals: variance 1 + r².
        var error = 4 * Math.Sqrt((1 + expected * expected) / x.Length);
        Assert.InRange(sum / x.Length, expected - error, expected + error);
    }

    private static Dictionary<string, double[]> Draw(Settings settings, (string Id, string? Programme)[] projects, long first = 0, int count = Draws)
    {
        var model = DependenceModel.Build(settings, [.. projects.Select(p => One(p.Id, p.Programme))]);
        var (factors, scores) = (new double[projects.Length * count], new double[settings.Drivers.Count * count]);
        model.Scores(1, first, count, factors, scores);
        var rows = projects.Select((p, k) => (p.Id, factors[(k * count)..((k + 1) * count)]));
        return rows.Concat(settings.Drivers.Select((d, k) => (d.Id, scores[(k * count)..((k + 1) * count)]))).ToDictionary(x => x.Item1, x => x.Item2);
    }

    private static Project One(string id, string? programme) => new() { Id = id, Programme = programme, StatusDate = new DateOnly(2026, 12, 1) };

    internal static Settings Stated(string[] drivers, double between, double? within, params RankPair[] pairs) => new()
    {
        Name = "Test", Currency = "EUR", Drivers = [.. drivers.Select(id => new Driver(id, null, 1, null, null))],
        Dependence = new() { BetweenProjects = between, WithinProgramme = within, Pairs = pairs, Stated = true },
    };
}
