using Portfolio.Engine.Results;
using Portfolio.Server.Contracts.Results;

namespace Portfolio.Server.Results;

/// <summary>The figures of one point of a series. What a run does not have, such as a level that was not kept then, stays out.</summary>
internal static class PointFigures
{
    public static SeriesPointJson OfFinish(SeriesPointJson point, Grid grid, Level level)
    {
        var at = FinishSummary.At(grid, level);
        return point with
        {
            Value = Date(at?.Value),
            SamplingLow = Date(at?.SamplingLow),
            SamplingHigh = Date(at?.SamplingHigh),
            Base = grid.Base is { } known ? new(Instants.ToDate((int)known.Value)) : null,
        };
    }

    public static SeriesPointJson OfCost(SeriesPointJson point, Grid grid, Level level, int digits) => Less(0, point, grid, level, digits);

    /// <summary>The portfolio's contingency: its cost at the level less its base.</summary>
    public static SeriesPointJson OfContingency(SeriesPointJson point, Grid grid, Level level, int digits) =>
        Less(grid.Base!.Value.Value, point, grid, level, digits);

    /// <summary>What is allocated to some projects together; the sampling bounds of a sum of allocations are not known.</summary>
    public static SeriesPointJson OfParts(SeriesPointJson point, Contingency contingency, IReadOnlyList<string> projects, int digits)
    {
        var lines = contingency.Allocations.Where(line => projects.Contains(line.Project, StringComparer.Ordinal)).ToArray();
        var allocated = lines.Sum(line => line.Allocated);
        var error = lines.Length == 1 ? lines[0].Error : null;
        return point with
        {
            Value = Money(allocated, digits),
            SamplingLow = Money(allocated - error, digits),
            SamplingHigh = Money(allocated + error, digits),
            Base = Money(lines.Sum(line => line.Base), digits),
        };
    }

    /// <summary>The point with what has changed since the one before it.</summary>
    public static SeriesPointJson Changed(SeriesPointJson? before, SeriesPointJson point) => point with
    {
        ChangeDays = point.Value?.Date is { } date && before?.Value?.Date is { } earlier ? date.DayNumber - earlier.DayNumber : null,
        Change = point.Value?.Money - before?.Value?.Money,
    };

    private static SeriesPointJson Less(long minor, SeriesPointJson point, Grid grid, Level level, int digits)
    {
        var at = grid.At(level);
        return point with
        {
            Value = Money(at?.Value - minor, digits),
            SamplingLow = Money(at?.SamplingLow - minor, digits),
            SamplingHigh = Money(at?.SamplingHigh - minor, digits),
            Base = Money(grid.Base?.Value, digits),
        };
    }

    private static DateOrMoney? Date(DateOnly? date) => date is { } known ? new(known) : null;

    private static DateOrMoney? Money(long? minor, int digits) => minor is { } known ? new(MinorUnits.ToMoney(known, digits)) : null;
}
