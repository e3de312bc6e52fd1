namespace Portfolio.Engine.Results;

/// <summary>What a project brings to the contingency: its cost grid and its shares of the portfolio's.</summary>
public sealed record ProjectCost(string Project, Grid Cost, AllocatedCost Allocated);

/// <summary>One line of the contingency, minor units.</summary>
/// <param name="Project">Its id.</param>
/// <param name="Base">Cost of the base plan.</param>
/// <param name="Allocated">Its share of the total.</param>
/// <param name="Error">Half the 95 % interval of the share; null below 20 iterations.</param>
/// <param name="Standalone">Its own percentile less its base: what it would need alone.</param>
/// <param name="Share">Allocated over total; null when the total is not positive.</param>
public sealed record Allocation(string Project, long Base, long Allocated, long? Error, long Standalone, double? Share);

/// <summary>
/// The money to hold above the base so that the portfolio keeps within it at a level, and whose it is. Whole minor units, so that
/// everything
/// adds up: the allocations make the total, and <see cref="Diversification"/> is what holding it together saves (negative when levels
/// under-add).
/// </summary>
public sealed record Contingency(Level Level, long Base, long CostAtLevel, IReadOnlyList<Allocation> Allocations)
{
    public long Total => CostAtLevel - Base;

    public long SumOfStandalone => Allocations.Sum(allocation => allocation.Standalone);

    public long Diversification => SumOfStandalone - Total;

    /// <summary>What is missing when so much is held.</summary>
    public long Shortfall(long held) => Math.Max(Total - held, 0);

    /// <summary>The contingency at a level; null when a grid does not hold it.</summary>
    /// <param name="level">The level.</param>
    /// <param name="portfolio">The portfolio's cost.</param>
    /// <param name="projects">Its projects with activities, in document order.</param>
    public static Contingency? At(Level level, Grid portfolio, IReadOnlyList<ProjectCost> projects)
    {
        if (portfolio.At(level) is not { } whole) return null;
        var lines = new List<ContingencyLine>(projects.Count);
        foreach (var (project, cost, allocated) in projects)
        {
            if (cost.At(level) is not { } own || allocated.At(level) is not { } share) return null;
            var basis = cost.Base!.Value.Value;
            lines.Add(new(project, basis, share.Allocated, share.Error, own.Value - basis));
        }
        return Of(level, whole.Value, lines);
    }

    internal static Contingency Of(Level level, long costAtLevel, IReadOnlyList<ContingencyLine> lines)
    {
        var basis = lines.Sum(line => line.Base);
        var total = costAtLevel - basis;
        return new(level, basis, costAtLevel,
            [.. lines.Select(line => new Allocation(
                line.Project, line.Base, line.Allocated, line.Error, line.Standalone, total > 0 ? (double)line.Allocated / total : null))]);
    }
}

/// <summary>What is stored of a line; its share of the total follows.</summary>
internal readonly record struct ContingencyLine(string Project, long Base, long Allocated, long? Error, long Standalone);
