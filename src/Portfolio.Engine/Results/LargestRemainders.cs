namespace Portfolio.Engine.Results;

/// <summary>
/// Whole parts of a whole total: every part is rounded down and what is left goes, one unit each, to the largest fractions; ties go to the
/// one that stands first. Balinski and Young, <i>Fair Representation</i>, 2nd ed. (2001), chapter 3 (there Hamilton's method).
/// </summary>
public static class LargestRemainders
{
    /// <summary>Rounds figures so that they make the total exactly.</summary>
    /// <param name="total">What the parts make together, in minor units.</param>
    /// <param name="figures">Finite, of either sign, adding up to about the total; what they miss is spread evenly.</param>
    /// <returns>One whole part for each figure, in the same order; empty without figures.</returns>
    public static long[] Round(long total, ReadOnlySpan<double> figures)
    {
        var count = figures.Length;
        if (count == 0) return [];
        var parts = new long[count];
        var fractions = new double[count];
        var places = new int[count];
        var left = total;
        for (var i = 0; i < count; i++)
        {
            var floor = Math.Floor(figures[i]);
            (parts[i], fractions[i], places[i]) = ((long)floor, figures[i] - floor, i);
            left -= parts[i];
        }
        var toEach = (left - (left % count + count) % count) / count; // 0 unless the figures miss the total
        Array.Sort(places, (a, b) => fractions[b].CompareTo(fractions[a]) is not 0 and var order ? order : a.CompareTo(b));
        for (var i = 0; i < count; i++) parts[places[i]] += toEach + (i < left - toEach * count ? 1 : 0);
        return parts;
    }

    /// <summary>Shares a total in proportion to weights.</summary>
    /// <param name="total">Minor units, of either sign.</param>
    /// <param name="weights">Finite and not negative; when all are 0 everyone gets the same.</param>
    public static long[] Share(long total, ReadOnlySpan<double> weights)
    {
        var sum = 0.0;
        foreach (var weight in weights) sum += weight;
        var figures = new double[weights.Length];
        for (var i = 0; i < figures.Length; i++) figures[i] = sum > 0 ? total * (weights[i] / sum) : (double)total / figures.Length;
        return Round(total, figures);
    }
}
