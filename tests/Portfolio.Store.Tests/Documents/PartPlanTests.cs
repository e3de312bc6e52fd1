using System.Text;
using CsCheck;
using Portfolio.Store.Documents;

namespace Portfolio.Store.Tests.Documents;

public sealed class PartPlanTests
{
    private static PartRow Row(string project, long position) => new() { Project = project, Position = position, Hash = Hash(project) };

    private static string Hash(string text) => ContentHash.Of(Encoding.UTF8.GetBytes(text));

    private static ProposedPart Part(string project, string? text = null) => new(project, Encoding.UTF8.GetBytes(text ?? project));

    [Fact]
    public void Equal_bytes_change_nothing() =>
        Assert.Empty(PartPlan.Make([Row("", 0), Row("a", 1), Row("b", 5)], new Change([Part("b"), Part("")])));

    [Fact]
    public void A_changed_project_keeps_its_place_and_a_new_one_goes_last() =>
        Assert.Equal(
            [("a", 1), ("c", 6)],
            PartPlan.Make([Row("", 0), Row("a", 1), Row("b", 5)], new Change([Part("c"), Part("a", "x")])).Select(
                part => (part.Project, part.Position)));

    [Fact]
    public void A_new_order_moves_whatever_stands_before_its_forerunner() =>
        Assert.Equal(
            [("a", 4), ("b", 5)],
            PartPlan.Make([Row("", 0), Row("a", 1), Row("b", 2), Row("c", 3)], new Change([]) { Order = ["c", "a", "b"] })
                .Select(part => (part.Project, part.Position)).OrderBy(part => part.Position));

    [Fact]
    public void Contradictions_are_refused()
    {
        PartRow[] head = [Row("", 0), Row("a", 1)];
        Assert.Throws<ArgumentException>(() => PartPlan.Make(head, new Change([Part("a", "x")]) { Removed = ["a"] }));
        Assert.Throws<ArgumentException>(() => PartPlan.Make(head, new Change([]) { Order = ["a", "b"] }));
        Assert.Throws<ArgumentException>(() => PartPlan.Make(head, new Change([Part("b")]) { Order = ["a"] }));
        Assert.Throws<ArgumentException>(() => PartPlan.Make(head, new Change([Part("b"), Part("b")])));
    }

    [Fact]
    public void Applying_any_plan_gives_the_document_that_was_asked_for() =>
        Gen.Select(Gen.Int[0, 8].HashSet[0, 9], Gen.Int[0, 8].HashSet[0, 9], Gen.Int[0, 2].Array[9])
            .Sample((before, after, versions) =>
            {
                PartRow[] head = [Row("", 0), .. before.Select((project, index) => Row($"p{project}", 3 * index + 1))];
                ProposedPart[] parts = [Part(""), .. after.Select(project => Part($"p{project}", versions[project] == 0 ? null : $"v{versions[project]}"))];
                var sent = parts.Select(part => part.Project).ToArray();
                var change = new Change(parts) { Removed = [.. head.Select(row => row.Project).Except(sent)], Order = sent[1..] };
                var plan = PartPlan.Make(head, change);
                var applied = head.ToDictionary(row => row.Project, row => (row.Position, Hash: (string?)row.Hash));
                foreach (var part in plan)
                    applied[part.Project] = (part.Position, part.After);
                var left = applied.Where(entry => entry.Value.Hash is not null).OrderBy(entry => entry.Value.Position).ToArray();
                Assert.Equal(sent, left.Select(entry => entry.Key));
                Assert.Equal(parts.Select(part => ContentHash.Of(part.Bytes)), left.Select(entry => entry.Value.Hash!));
                Assert.All(plan, part => Assert.True(
                    part.Before != part.After || head.Single(row => row.Project == part.Project).Position != part.Position));
            });
}
