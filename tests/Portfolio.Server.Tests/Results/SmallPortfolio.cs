using System.Text;
using Portfolio.Engine;
using Portfolio.Engine.Runs;
using Portfolio.Model.Rules;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Results;
using Portfolio.Store.Runs;
using Portfolio.Store.Samples;

namespace Portfolio.Server.Tests.Results;

/// <summary>Four invented projects in two programmes, one of them without activities; a milestone at the end and one in a chance branch.</summary>
internal static class SmallPortfolio
{
    public const int Iterations = 5_000;

    public const string Settings = """
        {"name":"Water and harbour","currency":"EUR","confidence":[50,80,82.5],"weekEnds":"sun",
         "commitments":{"finish":"2027-12-31","budget":400000.00,"programmes":{"locks":{"finish":"2027-09-30"}}}}
        """;

    public static readonly string[] Projects =
    [
        """
        {"id":"weir","programme":"locks","statusDate":"2026-11-30","commitments":{"finish":"2027-04-30","budget":120000},
         "activities":[
          {"id":"A","duration":{"type":"pert","low":40,"mode":60,"high":120},
           "cost":{"fixed":{"type":"triangular","low":20000.005,"mode":30000,"high":60000},"perDay":333.33}},
          {"id":"B","duration":{"type":"uniform","low":10,"high":90},"predecessors":["A"],"cost":{"perDay":750.5}},
          {"id":"M","milestone":true,"predecessors":["B"],"commitment":"2027-05-31"}]}
        """,
        """{"id":"plans","programme":"locks","statusDate":"2026-11-30"}""",
        """
        {"id":"quay","programme":"harbour","statusDate":"2026-11-30",
         "activities":[
          {"id":"A","duration":{"type":"normal","mean":100,"sd":20,"min":0},"cost":{"fixed":50000}},
          {"id":"R","duration":30,"predecessors":["A"],"cost":{"fixed":{"type":"uniform","low":1000,"high":9000}}},
          {"id":"S","milestone":true,"predecessors":["A"]}],
         "chanceBranches":[{"id":"find","branches":[{"id":"wreck","probability":0.3,"activities":["R","S"]},{"id":"clear","probability":0.7}]}]}
        """,
        """
        {"id":"pumps","programme":"locks","statusDate":"2026-11-30","overhead":{"perDay":99.99},
         "activities":[{"id":"A","duration":{"type":"lognormal","mean":150,"sd":40},"cost":{"perDay":{"type":"uniform","low":100,"high":500}}}]}
        """,
    ];

    public static Plan Plan(string settings = Settings, params string[] projects)
    {
        var parts = (projects.Length > 0 ? projects : Projects).Select(project => (ReadOnlyMemory<byte>)Encoding.UTF8.GetBytes(project)).ToArray();
        var document = DocumentReader.FromParts(Encoding.UTF8.GetBytes(settings), parts);
        var valid = ValidPortfolio.Check(document, out var faults);
        Assert.Empty(faults);
        return Engine.Plan.Compile(valid!);
    }

    public static RunFacts Facts(string run = "0190a6f0-0000-7000-8000-000000000001", int iterations = Iterations, long seed = 1) =>
        new(run, new DateOnly(2026, 12, 1), 7, seed, iterations, ["aa", "bb"]);

    public static RunResult Finish(Plan plan, RunFacts facts, int threads = 2) =>
        FinishedRun.Build(plan, Samples(plan, facts, threads), facts, TestContext.Current.CancellationToken);

    /// <summary>Works a run in memory.</summary>
    public static SampleReader Samples(Plan plan, RunFacts facts, int threads = 2)
    {
        var blocks = new SortedDictionary<int, BlockSamples>();
        plan.Run(facts.Seed, 0, facts.Iterations, new RunOptions(threads), block => { lock (blocks) blocks.Add(block.Block, block); });
        var minutes = new Dictionary<string, int[]>();
        var money = new Dictionary<string, double[]>();
        foreach (var (p, project) in plan.Document.Projects.Index())
        {
            minutes[SeriesNames.Finish(project.Id)] = [.. blocks.Values.SelectMany(block => block.Finish[p])];
            money[SeriesNames.Cost(project.Id)] = [.. blocks.Values.SelectMany(block => block.Cost[p])];
        }
        foreach (var (m, milestone) in plan.Milestones.Index())
        {
            var series = SeriesNames.Milestone(plan.Document.Projects[milestone.Project].Id, milestone.Activity.Id);
            minutes[series] = [.. blocks.Values.SelectMany(block => block.MilestoneFinish[m])];
        }
        return new(minutes.GetValueOrDefault, money.GetValueOrDefault);
    }
}
