namespace Portfolio.Engine.Results;

/// <summary>
/// Which order statistics of n independent iterations bound a percentile with 95 % confidence, whatever the distribution:
/// David and Nagaraja, <i>Order Statistics</i>, 3rd ed. (2003), section 7.1. Ranks 1…n; a bound that does not exist is null.
/// </summary>
/// <param name="Low">The largest r with P(B ≤ r − 1) ≤ 2.5 %, B ~ Bin(n, p).</param>
/// <param name="High">The smallest s with P(B ≥ s) ≤ 2.5 %.</param>
public readonly record struct SamplingRanks(int? Low, int? High)
{
    private const double Tail = 0.025;

    // Terms this much smaller than the largest are left out: together they are far below the rounding of the rest.
    private const double Negligible = 1e-25;

    /// <summary>The ranks for one level; takes in the order of √n steps.</summary>
    /// <param name="level">The level whose percentile is bounded.</param>
    /// <param name="n">Iterations, at least 1.</param>
    public static SamplingRanks Of(Level level, int n)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(n, 1);
        var (first, terms) = BinomialTerms(level.Probability, n);
        var limit = Tail * terms.Sum();
        var sum = 0.0;
        var low = first;
        while (low - first < terms.Count && (sum += terms[low - first]) <= limit) low++;
        sum = 0;
        var high = first + terms.Count;
        while (high > first && (sum += terms[high - 1 - first]) <= limit) high--;
        return new(low >= 1 ? low : null, high <= n ? high : null);
    }

    /// <summary>
    /// Probabilities of B = first, first + 1, … up to a common factor, from the ratio of neighbours
    /// P(i)/P(i − 1) = (n − i + 1)p / (i(1 − p)), outwards from the mode: no factorial, no cancellation.
    /// </summary>
    private static (int First, List<double> Terms) BinomialTerms(double p, int n)
    {
        var odds = p / (1 - p);
        var mode = Math.Min((int)((n + 1) * p), n);
        var terms = new List<double>();
        var term = 1.0;
        for (var i = mode; i >= 0 && term > Negligible; term *= i / ((n - i + 1.0) * odds), i--) terms.Add(term);
        terms.Reverse();
        var first = mode - terms.Count + 1;
        term = 1.0;
        for (var i = mode + 1; i <= n && (term *= (n - i + 1.0) * odds / i) > Negligible; i++) terms.Add(term);
        return (first, terms);
    }
}
