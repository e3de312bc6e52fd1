namespace Portfolio.Engine.Results;

/// <summary>One bin of a distribution with both ends included.</summary>
/// <typeparam name="T">A date, or whole minor units.</typeparam>
/// <param name="Count">Iterations in it.</param>
/// <param name="Share">Count over the iterations in which it happens, 0–1.</param>
/// <param name="Cumulative">Share of those that lie in this bin or before: the chance of being done by <paramref name="To"/>.</param>
public readonly record struct Bin<T>(T From, T To, int Count, double Share, double Cumulative);

/// <summary>Width of the bins of a finish.</summary>
public enum DateBin
{
    Day,
    Week,
    Month,
}

/// <summary>Histogram and cumulative table of the iterations of one scope; empty bins between others are listed, none outside.</summary>
public static class DistributionTable
{
    /// <summary>The finish by day, week or month.</summary>
    /// <param name="finishes">Minutes, one for each iteration; <see cref="Instants.Never"/> is left out.</param>
    /// <param name="dates">How instants become dates.</param>
    /// <param name="bin">Width of the bins.</param>
    /// <param name="weekEnds">Last day of a week.</param>
    /// <param name="most">More bins than this are not made.</param>
    /// <returns>Bins by date; null when there would be more than <paramref name="most"/>.</returns>
    public static IReadOnlyList<Bin<DateOnly>>? OfFinish(
        ReadOnlySpan<int> finishes, DateRule dates, DateBin bin, DayOfWeek weekEnds, int most)
    {
        using var sorted = SortedSamples.Of(finishes);
        var bins = new List<Bin<DateOnly>>();
        var before = 0;
        for (var from = sorted.Count > 0 ? First(dates.Date(sorted.Values[0]), bin, weekEnds) : default; before < sorted.Count;)
        {
            if (bins.Count == most) return null;
            var to = Last(from, bin);
            var day = Instants.ToDay(to);
            var upTo = sorted.CountWhile(instant => dates.Day(instant) <= day);
            bins.Add(new(from, to, upTo - before, (double)(upTo - before) / sorted.Count, (double)upTo / sorted.Count));
            (before, from) = (upTo, to.AddDays(1));
        }
        return bins;
    }

    /// <summary>The cost in a number of bins of equal width, as nearly as whole minor units allow.</summary>
    /// <param name="costs">Whole minor units, one for each iteration, at least one.</param>
    /// <param name="count">Bins, at least 1; fewer are made when there are fewer different amounts between the ends.</param>
    public static IReadOnlyList<Bin<long>> OfCost(ReadOnlySpan<double> costs, int count)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(count, 1);
        using var sorted = SortedSamples.Of(costs);
        var lowest = sorted.Values[0];
        var width = (Int128)sorted.Values[^1] - lowest + 1;
        var bins = new Bin<long>[(int)Int128.Min(count, width)];
        var before = 0;
        for (var i = 0; i < bins.Length; i++)
        {
            var from = lowest + (long)(width * i / bins.Length);
            var to = lowest + (long)(width * (i + 1) / bins.Length) - 1;
            var upTo = sorted.CountWhile(cost => cost <= to);
            bins[i] = new(from, to, upTo - before, (double)(upTo - before) / sorted.Count, (double)upTo / sorted.Count);
            before = upTo;
        }
        return bins;
    }

    private static DateOnly First(DateOnly date, DateBin bin, DayOfWeek weekEnds) => bin switch
    {
        DateBin.Month => new(date.Year, date.Month, 1),
        DateBin.Week => date.AddDays(-(((int)date.DayOfWeek - (int)weekEnds + 6) % 7)),
        _ => date,
    };

    private static DateOnly Last(DateOnly from, DateBin bin) => bin switch
    {
        DateBin.Month => from.AddMonths(1).AddDays(-1),
        DateBin.Week => from.AddDays(6),
        _ => from,
    };
}
