using System.Globalization;
using System.Text;
using System.Text.Json.Nodes;
using Portfolio.Engine.Results;

namespace Portfolio.Server.Tests.Outside;

/// <summary>
/// Published benchmark networks and real projects. Networks: Kolisch and Sprecher, PSPLIB, EJOR 96 (1997) 205–216; Homberger, Int. Trans.
/// Oper. Res. 14 (2007) 565–589. Houses: Batselier and Vanhoucke, Int. J. Project Management 33 (2015) 697–710.
/// </summary>
public sealed class PublishedDataTests
{
    private static readonly DateOnly NetworkStart = new(2027, 1, 4);

    [Fact]
    public void EveryNetworkHasItsCriticalPathAndItsMakespanWithPools()
    {
        var differences = new StringBuilder();
        var rows = File.ReadAllLines(SharedFolder.Data("networks", "expected.csv")).Skip(1).Select(line => line.Split(',')).ToList();
        Assert.Equal(89, rows.Count);
        foreach (var row in rows)
        {
            int Expected(int column) => int.Parse(row[column], CultureInfo.InvariantCulture);
            var document = JsonNode.Parse(File.ReadAllText(SharedFolder.Data("networks", row[0] + ".json")))!;
            var dispatched = Makespan(document);
            foreach (var activity in document["projects"]!.AsArray().SelectMany(p => p!["activities"]!.AsArray()))
                activity!.AsObject().Remove("demands");
            var path = Makespan(document);
            if ((path, dispatched) != (Expected(3), Expected(6)) || dispatched < Expected(4))
            {
                differences.AppendLine(
                    $"{row[0]}: path {path} (expected {Expected(3)}), with pools {dispatched} (expected {Expected(6)}, at least {Expected(4)})");
            }
        }
        Assert.True(differences.Length == 0, differences.ToString());
    }

    [Fact]
    public void HousesFinishOnTheirPublishedBaselines()
    {
        var plan = Documents.Compile(File.ReadAllBytes(SharedFolder.Data("houses.json")));
        string[] baselines = ["2017-02-07", "2017-04-18", "2017-05-09", "2017-05-29"];
        Assert.Equal(baselines, plan.Base.Finish.Select(f => Dice.Date(default(DateRule).Date(f))));
    }

    [Fact]
    public async Task HousesAgreeWithTheSimulatorOutsideWithinTwoDays()
    {
        var document = File.ReadAllBytes(SharedFolder.Data("houses.json"));
        var outside = (await Oracle.Simulate([new OracleJob(document, 40_000)], TestContext.Current.CancellationToken))[0];
        var plan = Documents.Compile(document);
        var samples = plan.Run(1, 20_000);
        Assert.Equal("", Agreement.Differences(plan, samples, outside));
        var all = Enumerable.Range(0, 20_000).Select(k => samples.Finish.Max(row => row[k]));
        var projects = plan.Document.Projects.Index().Select(p => ($"project/{p.Item.Id}", (IEnumerable<int>)samples.Finish[p.Index]));
        foreach (var (scope, finish) in projects.Append(("programme/houses", all)).Append(("portfolio", all)))
        {
            var sorted = finish.Order().ToArray();
            foreach (var level in outside.Scopes[scope].Finish.Levels.Where(l => l.Level is 50 or 80))
            {
                var theirs = (long)Math.Round((outside.Epoch + level.Value) * Instants.MinutesPerDay);
                var days = Instants.DayEndingAt(sorted[(int)(sorted.Length * level.Level / 100) - 1]) - Instants.DayEndingAt(theirs);
                Assert.True(Math.Abs(days) <= 2, $"{scope} P{level.Level} is {days} days later.");
            }
        }
    }

    private static double Makespan(JsonNode document)
    {
        var plan = Documents.Compile(Encoding.UTF8.GetBytes(document.ToJsonString()));
        return (plan.Base.Finish.Max() - Instants.ToDay(NetworkStart) * Instants.MinutesPerDay) / (double)Instants.MinutesPerDay;
    }
}
