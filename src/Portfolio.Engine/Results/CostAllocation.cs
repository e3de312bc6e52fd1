namespace Portfolio.Engine.Results;

/// <summary>
/// Shares the portfolio's contingency out to its projects at many levels at once, to the minor unit, with the sampling error of each share.
/// Made on the portfolio's cost; then every project is added in document order; then closed. Not safe to share between threads.
/// </summary>
public sealed class CostAllocation
{
    private readonly IReadOnlyList<Level> levels;
    private readonly int iterations;
    private readonly LocalFit whole;
    private readonly LocalFit[] sections;
    private readonly List<long> bases = [];
    private readonly List<double[]> figures = [];
    private readonly List<long[]?> errors = [];

    /// <param name="portfolioCosts">Whole minor units, one for each iteration: the sum of the projects' costs.</param>
    /// <param name="levels">Rising levels.</param>
    public CostAllocation(ReadOnlySpan<double> portfolioCosts, IReadOnlyList<Level> levels)
    {
        this.levels = levels;
        iterations = portfolioCosts.Length;
        whole = new(portfolioCosts, levels);
        sections = new LocalFit[iterations < SectionError.Sections ? 0 : SectionError.Sections];
        for (var s = 0; s < sections.Length; s++) sections[s] = new(portfolioCosts[SectionError.Of(s, iterations)], levels);
    }

    /// <summary>Adds the next project.</summary>
    /// <param name="costs">Whole minor units, one for each iteration.</param>
    /// <param name="baseCost">Minor units in the base plan.</param>
    public void Add(ReadOnlySpan<double> costs, long baseCost)
    {
        var overall = new double[levels.Count];
        whole.At(costs, overall);
        bases.Add(baseCost);
        figures.Add(overall);
        errors.Add(sections.Length == 0 ? null : Errors(costs, overall));
    }

    /// <summary>The shares of the projects in the order in which they were added; at every level they make the total contingency.</summary>
    public IReadOnlyList<AllocatedCost> Close()
    {
        var allocated = figures.Select(_ => new long[levels.Count]).ToArray();
        var column = new double[figures.Count];
        for (var level = 0; level < levels.Count; level++)
        {
            for (var project = 0; project < column.Length; project++) column[project] = figures[project][level] - bases[project];
            var parts = LargestRemainders.Round((long)whole.Total(level) - bases.Sum(), column);
            for (var project = 0; project < column.Length; project++) allocated[project][level] = parts[project];
        }
        return [.. allocated.Select((shares, project) => new AllocatedCost(levels, shares, errors[project]))];
    }

    private long[] Errors(ReadOnlySpan<double> costs, ReadOnlySpan<double> overall)
    {
        var bySection = new double[sections.Length][];
        for (var s = 0; s < sections.Length; s++)
            sections[s].At(costs[SectionError.Of(s, iterations)], bySection[s] = new double[levels.Count]);
        var result = new long[levels.Count];
        Span<double> section = stackalloc double[SectionError.Sections];
        for (var level = 0; level < result.Length; level++)
        {
            for (var s = 0; s < sections.Length; s++) section[s] = bySection[s][level];
            result[level] = (long)Math.Round(SectionError.Of(overall[level], section), MidpointRounding.AwayFromZero);
        }
        return result;
    }
}
