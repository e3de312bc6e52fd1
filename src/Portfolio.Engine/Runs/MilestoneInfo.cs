using Portfolio.Engine.Networks;
using Portfolio.Model.Documents;

namespace Portfolio.Engine.Runs;

/// <summary>A milestone that is reported on its own; <see cref="Results.DateRule.OfMilestone"/> dates it.</summary>
/// <param name="Project">Index of its project.</param>
/// <param name="Activity">As stated.</param>
/// <param name="InBranch">True when it stands in a chance branch, so that it may not happen.</param>
public sealed record MilestoneInfo(int Project, Activity Activity, bool InBranch)
{
    internal static int[] Activities(Network network) =>
        [.. Enumerable.Range(0, network.Count).Where(a => network.Activities[a].Milestone)];

    internal static IReadOnlyList<MilestoneInfo> List(Network network) =>
        [.. Activities(network).Select(a => new MilestoneInfo(network.ProjectOf[a], network.Activities[a], network.Fork[a] >= 0))];
}
