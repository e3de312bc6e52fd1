using Portfolio.Engine.Results;
using Portfolio.Model.Documents;

namespace Portfolio.Server.Results;

/// <summary>Notices, while samples are read, which projects finish in some iteration beyond the last date there is.</summary>
internal sealed class ClampedDates
{
    private readonly HashSet<int> projects = [];

    public SampleSource Watching(SampleSource source) => source with
    {
        Project = p =>
        {
            var samples = source.Project(p);
            if (Latest(samples.Finishes.Span) >= Instants.EndOf(Instants.ToDate(Instants.LastDay))) projects.Add(p);
            return samples;
        },
    };

    /// <summary>One caution that names them in document order; none when there are none.</summary>
    public IEnumerable<Warning> Cautions(PortfolioDocument document)
    {
        if (projects.Count > 0)
        {
            yield return new(
                CautionCodes.DatesClamped,
                $"In some iterations these projects finish after {Instants.ToDate(Instants.LastDay):yyyy-MM-dd}, the last date there is; " +
                "such finishes are counted on that day.",
                [.. projects.Order().Select(p => document.Projects[p].Id)]);
        }
    }

    private static int Latest(ReadOnlySpan<int> finishes)
    {
        var latest = int.MinValue;
        foreach (var finish in finishes) latest = Math.Max(latest, finish);
        return latest;
    }
}
