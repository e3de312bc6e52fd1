using Portfolio.Engine;
using Portfolio.Server.Results;
using Portfolio.Store.Runs;
using Portfolio.Store.Samples;

namespace Portfolio.Server.Jobs;

/// <summary>
/// The iterations of a worked run for its results, which want one series after the other in the order of the document: whoever asks for
/// one gets the next few read with it, so that storage need not be asked thousands of times.
/// </summary>
internal sealed class SamplesAhead
{
    private const int Ahead = 16;

    private readonly SampleStore samples;
    private readonly RunLease held;
    private readonly string[] order;
    private readonly Dictionary<string, int> places;
    private IReadOnlyDictionary<string, KeptSeries> near = new Dictionary<string, KeptSeries>();

    private SamplesAhead(SampleStore samples, RunLease held, IEnumerable<string> order)
    {
        (this.samples, this.held, this.order) = (samples, held, [.. order]);
        places = this.order.Index().ToDictionary(entry => entry.Item, entry => entry.Index, StringComparer.Ordinal);
    }

    /// <summary>Projects and milestones are each read ahead by themselves: projects are asked twice.</summary>
    public static SampleReader Of(SampleStore samples, RunLease held, Plan plan)
    {
        var active = plan.Document.Projects.Where(project => project.Activities.Count > 0);
        var projects = new SamplesAhead(
            samples, held, active.SelectMany(project => new[] { SeriesNames.Finish(project.Id), SeriesNames.Cost(project.Id) }));
        var milestones = new SamplesAhead(
            samples, held, plan.Milestones.Select(
                milestone => SeriesNames.Milestone(plan.Document.Projects[milestone.Project].Id, milestone.Activity.Id)));
        return new(
            series => (projects.Find(series) ?? milestones.Find(series))?.ToMinutes(),
            series => projects.Find(series)?.ToMoney());
    }

    private KeptSeries? Find(string series)
    {
        if (!places.TryGetValue(series, out var place))
            return null;
        if (!near.ContainsKey(series))
            near = samples.ReadSeriesAsync(held, order[place..Math.Min(place + Ahead, order.Length)], CancellationToken.None)
                .GetAwaiter().GetResult();
        return near.GetValueOrDefault(series);
    }
}
