using Portfolio.Engine;
using Portfolio.Engine.Results;
using Portfolio.Store.Samples;

namespace Portfolio.Server.Results;

/// <summary>
/// Reads the iterations of one series at a time, all blocks in order, by the names of <see cref="SeriesNames"/>; null when a series is not
/// kept. It runs on a worker's own thread and therefore waits for storage instead of yielding.
/// </summary>
/// <param name="Minutes">Finishes: minutes, <see cref="int.MinValue"/> where it does not happen.</param>
/// <param name="Money">Costs: whole minor units.</param>
public sealed record SampleReader(Func<string, int[]?> Minutes, Func<string, double[]?> Money)
{
    /// <summary>The samples with the plan's base values, as the result arithmetic wants them.</summary>
    internal SampleSource With(Plan plan, int iterations)
    {
        var milestones = plan.Milestones.Index().ToDictionary(entry => (entry.Item.Project, entry.Item.Activity.Id), entry => entry.Index);
        return new(iterations, OfProject, OfMilestone);

        ProjectSamples OfProject(int p)
        {
            var id = plan.Document.Projects[p].Id;
            var (finishes, costs) = (Read(Minutes, SeriesNames.Finish(id)), Read(Money, SeriesNames.Cost(id)));
            return new(finishes, costs, plan.Base.Finish[p], (long)plan.Base.Cost[p]);
        }

        MilestoneSamples OfMilestone(int p, int a)
        {
            var project = plan.Document.Projects[p];
            var id = project.Activities[a].Id;
            return new(Read(Minutes, SeriesNames.Milestone(project.Id, id)), plan.Base.MilestoneFinish[milestones[(p, id)]]);
        }
    }

    private static T[] Read<T>(Func<string, T[]?> reader, string series) =>
        reader(series) ?? throw new InvalidOperationException($"The iterations of '{series}' are not kept.");
}
