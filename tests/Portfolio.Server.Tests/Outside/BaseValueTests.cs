using System.Text;
using Portfolio.Engine;
using Portfolio.Engine.Results;
using Portfolio.Engine.Runs;
using Portfolio.Model.Documents;

namespace Portfolio.Server.Tests.Outside;

/// <summary>
/// Base values against a simulator that shares no code: to the day and the cent, on documents that use every rule at once.
/// </summary>
public sealed class BaseValueTests
{
    // In few documents one of these decides a date; found among thousands by leaving the rule out on one side.
    private static readonly int[] RareCases =
    [
        1247, 1936, 2122, // the latest finish moved back to the end of work
        1544, 2469, // a place in the order held by work of no length
        279, 293, 308, // finished work behind unfinished bounds no latest finish
        94, 211, 236, // latest finishes through links into other projects
    ];

    private static readonly int[] Seeds =
        SharedFolder.Long ? [.. Enumerable.Range(1, 3_000)] : [.. Enumerable.Range(1, 200).Union(RareCases)];

    [Fact]
    public async Task BaseValuesOfRandomDocumentsAreThoseOfTheSimulatorOutside()
    {
        var documents = Seeds.Select(seed => RandomDocument.Json(seed, RuleOf(seed))).ToList();
        var answers = await Oracle.Base(documents, TestContext.Current.CancellationToken);
        Assert.Equal(Seeds.Length, answers.Count);
        var differences = new StringBuilder();
        for (var i = 0; i < Seeds.Length; i++)
        {
            foreach (var difference in Differences(Documents.Compile(documents[i]), answers[i]))
                differences.AppendLine($"document {Seeds[i]}, {RuleOf(Seeds[i]) ?? "no pools"}: {difference}");
        }
        Assert.True(differences.Length == 0, differences.ToString());
    }

    /// <summary>A generator that no longer makes some rule would leave it unchecked in silence.</summary>
    [Theory]
    [InlineData("\"SS\"")]
    [InlineData("\"FF\"")]
    [InlineData("\"SF\"")]
    [InlineData("\"lag\":-")]
    [InlineData("\"predecessors\":[\"project-")]
    [InlineData("\"calendar\":\"every-day\"")]
    [InlineData("\"remaining\"")]
    [InlineData("\"actualFinish\"")]
    [InlineData("\"milestone\":true")]
    [InlineData("\"earliestStart\"")]
    [InlineData("\"capacityChanges\"")]
    [InlineData("\"demands\"")]
    [InlineData("\"chanceBranches\"")]
    [InlineData("\"taken\":true")]
    [InlineData("\"overhead\"")]
    [InlineData("\"type\":\"uniform\"")]
    [InlineData("\"type\":\"triangular\"")]
    [InlineData("\"type\":\"pert\"")]
    [InlineData("\"type\":\"normal\"")]
    [InlineData("\"type\":\"lognormal\"")]
    [InlineData("\"type\":\"discrete\"")]
    [InlineData("\"type\":\"percentiles\"")]
    [InlineData("\"lowPercentile\"")]
    public void RandomDocumentsUseEveryRule(string written)
    {
        var users = Seeds.Count(seed => Encoding.UTF8.GetString(RandomDocument.Json(seed, RuleOf(seed) ?? "passing")).Contains(written));
        Assert.True(users > Seeds.Length / 5, $"{written} stands in {users} of {Seeds.Length} documents.");
    }

    private static string? RuleOf(int seed) => (seed % 5) switch { 0 => null, 1 or 2 => "passing", _ => "inOrder" };

    private static IEnumerable<string> Differences(Plan plan, OracleAnswer<OracleBase> answer)
    {
        var ours = OurBase(plan).ToDictionary(row => row.Scope.ToString());
        foreach (var scope in ours.Keys.Union(answer.Scopes.Keys).Order(StringComparer.Ordinal))
        {
            if (!ours.TryGetValue(scope, out var mine) || !answer.Scopes.TryGetValue(scope, out var theirs))
                yield return $"{scope} has a base value on one side only";
            else if (mine.Date != theirs.Date)
                yield return $"{scope} finishes on {mine.Date:yyyy-MM-dd}, outside on {theirs.Date:yyyy-MM-dd} ({Time(theirs.Time, answer.Epoch)})";
            else if (theirs.Cost is { } cost && !SameMoney(mine, cost * plan.MinorPerUnit))
                yield return $"{scope} costs {mine.Minor} minor units, outside {cost * plan.MinorPerUnit}";
        }
    }

    // Rounded once for each project, so that a sum of n may be off by n halves; the simulator outside rounds nothing.
    private static bool SameMoney(BaseRow row, double minor) => Math.Abs(row.Minor - minor) <= row.Projects * 0.5 + 1e-4;

    private static IEnumerable<BaseRow> OurBase(Plan plan)
    {
        var projects = plan.Document.Projects.Index().Where(p => p.Item.Activities.Count > 0)
            .Select(p => (p.Item, Finish: plan.Base.Finish[p.Index], Cost: plan.Base.Cost[p.Index])).ToList();
        foreach (var (project, finish, cost) in projects)
            yield return new BaseRow(Scope.OfProject(project.Id), default(DateRule).Date(finish), cost, 1);
        foreach (var programme in projects.Where(p => p.Item.Programme is not null).GroupBy(p => p.Item.Programme!))
            yield return Together(Scope.OfProgramme(programme.Key), [.. programme.Select(p => (p.Finish, p.Cost))]);
        yield return Together(Scope.Portfolio, [.. projects.Select(p => (p.Finish, p.Cost))]);
        foreach (var (index, milestone) in plan.Milestones.Index())
        {
            var project = plan.Document.Projects[milestone.Project];
            var rule = DateRule.OfMilestone(project, milestone.Activity);
            if (plan.Base.MilestoneFinish[index] is var finish and not BlockSamples.Absent)
                yield return new BaseRow(Scope.OfMilestone(project.Id, milestone.Activity.Id), rule.Date(finish), 0, 0);
        }
    }

    private static BaseRow Together(Scope scope, (int Finish, double Cost)[] projects) =>
        new(scope, default(DateRule).Date(projects.Max(p => p.Finish)), projects.Sum(p => p.Cost), projects.Length);

    private static string Time(double days, int epoch) =>
        new DateTime(1970, 1, 1).AddMinutes(Math.Round((epoch + days) * Instants.MinutesPerDay)).ToString("yyyy-MM-dd HH:mm", null);

    private sealed record BaseRow(Scope Scope, DateOnly Date, double Minor, int Projects);
}
